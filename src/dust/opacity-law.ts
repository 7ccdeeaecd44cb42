import type { OpacitySpec, PhaseLaw } from '../scene/types.js'
import { curveLaw } from './curve-law.js'
import type { GrainOptics } from './grains/grain-optics.js'
import { grainsLaw } from './grains-law.js'
import { meanCosine, normalised, rayleighMatrix, twoTermMatrix } from './matrices.js'
import type { OpacityCurves } from './opacity-curves.js'
import { powerLaw } from './power-law.js'
import type { ScatteringMatrix } from './scattering-matrix.js'
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
  return { ...curvesOf(spec, optics), phase, ...scatteringOf(phase) }
}

/** What a scattering law of the scene says beside the opacities; nothing for one that follows from the asymmetry or the grains. */
function scatteringOf(phase: PhaseLaw): Partial<Pick<OpacityLaw, 'asymmetry' | 'matrix'>> {
  if (phase === 'isotropic') return { asymmetry: () => 0 }
  const matrix = fixedMatrix(phase)
  if (!matrix) return {}
  const asymmetry = meanCosine(matrix)
  return { asymmetry: () => asymmetry, matrix: () => matrix }
}

/** The matrix of a law that is the same at all wavelengths. */
function fixedMatrix(phase: PhaseLaw): ScatteringMatrix | undefined {
  if (phase === 'rayleigh') return rayleighMatrix()
  if (typeof phase === 'string') return undefined
  return phase.kind === 'table' ? normalised(phase.table) : twoTermMatrix(phase.first, phase.second, phase.share)
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
