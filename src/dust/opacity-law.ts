import type { OpacitySpec, PhaseLaw } from '../scene/types.js'
import { curveLaw } from './curve-law.js'
import type { GrainOptics } from './grains/grain-optics.js'
import { grainsLaw } from './grains-law.js'
import type { OpacityCurves } from './opacity-curves.js'
import { powerLaw } from './power-law.js'
import { rayleighMatrix } from './rayleigh-matrix.js'
import { tableLaw } from './table-law.js'

/** Optical properties of one kind of dust, and how it scatters. */
export interface OpacityLaw extends OpacityCurves {
  phase: PhaseLaw
}

/**
 * The law a scene asks for, as the scene format defines it. The optics of grains take a while; a caller who has tabulated them, as
 * `grainRequest` asks, hands them over.
 */
export function makeOpacityLaw(spec: OpacitySpec, optics?: GrainOptics): OpacityLaw {
  const { phase } = spec
  const law = { ...curvesOf(spec, optics), phase }
  if (phase === 'rayleigh') return { ...law, asymmetry: () => 0, matrix: rayleighMatrix }
  return phase === 'isotropic' ? { ...law, asymmetry: () => 0 } : law
}

function curvesOf(spec: OpacitySpec, optics?: GrainOptics): OpacityCurves {
  switch (spec.law) {
    case 'power':
      return powerLaw(spec)
    case 'table':
      return tableLaw(spec.table)
    case 'extinction-curve':
      return curveLaw(spec)
    case 'grains':
      return grainsLaw(spec, optics)
  }
}
