import type { GrainPopulation, SizesSpec } from '../../scene/types.js'
import { makeMaterial, porousMaterial } from '../materials/make-material.js'
import type { Grain } from './grain.js'
import { lognormalSizes, powerSizes, type SizeDistribution, tabulatedSizes } from './size-distribution.js'

/** The spheres that a scene describes. */
export function makeGrain({ constants, sizes, density: solid, porosity, coat }: GrainPopulation): Grain {
  const grain = {
    material: porousMaterial(makeMaterial(constants), porosity),
    sizes: makeSizes(sizes),
    density: solid * (1 - porosity)
  }
  if (!coat) return grain
  const { volumeFraction: volume, density } = coat
  return {
    ...grain,
    density: (1 - volume) * grain.density + volume * density,
    coat: { material: makeMaterial(coat.constants), volume }
  }
}

/** Radius of the largest of all grains, cm. */
export function largestRadius(populations: readonly GrainPopulation[]): number {
  return Math.max(...populations.map(({ sizes }) => makeSizes(sizes).largest))
}

function makeSizes(spec: SizesSpec): SizeDistribution {
  switch (spec.kind) {
    case 'power':
      return powerSizes(spec.smallest, spec.largest, spec.slope)
    case 'lognormal':
      return lognormalSizes(spec.smallest, spec.largest, spec.median, spec.width)
    case 'table':
      return tabulatedSizes(spec.radius, spec.number)
  }
}
