import type { Material } from '../materials/material.js'
import type { SizeDistribution } from './size-distribution.js'

/** Spheres of one make and many sizes. */
export interface Grain {
  material: Material
  sizes: SizeDistribution
  /** Mass over volume of a whole grain, g/cm3. */
  density: number
  /** Concentric coat around `material`, with its share of the volume (0 to 1), the same at every size. */
  coat?: { material: Material; volume: number }
}
