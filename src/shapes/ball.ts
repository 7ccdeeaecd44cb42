import type { SphericalShape } from './shape.js'
import { shell } from './shell.js'

/** Uniform sphere about the origin, radius in cm. Relative density 1. */
export function ball(radius: number): SphericalShape {
  return shell(0, radius, 0)
}
