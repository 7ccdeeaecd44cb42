import { bracket } from '../math/interp.js'
import type { GrainsOpacitySpec } from '../scene/types.js'
import type { GrainOptics } from './grains/grain-optics.js'
import { largestRadius, makeGrain } from './grains/make-grain.js'
import { scatteringAngles } from './grains/scattering-angles.js'
import { type GrainTableRequest, tabulateGrains } from './grains/tabulate-grains.js'
import type { OpacityCurves } from './opacity-curves.js'
import type { ScatteringMatrix } from './scattering-matrix.js'
import { tableLaw } from './table-law.js'
import { LONGEST, SHORTEST } from './wavelength-grid.js'

/** Larger spheres are taken to remove and scatter light as at this size parameter: they are in the limit of geometric optics. */
const LARGEST_X = 1e6

/**
 * What has to be tabulated for grains of a scene, over wavelengths (cm) that hold `shortest` and `longest` and all that dust emits.
 * Ends are shared by many scenes, so that these can share tables.
 */
export function grainRequest(
  { populations, phase }: GrainsOpacitySpec,
  shortest = SHORTEST,
  longest = LONGEST
): GrainTableRequest {
  const doublings = (ratio: number) => 2 ** Math.max(0, Math.ceil(Math.log2(ratio)))
  const circumference = 2 * Math.PI * largestRadius(populations)
  const from = Math.max(SHORTEST / doublings(SHORTEST / shortest), circumference / LARGEST_X)
  return {
    populations,
    shortest: from,
    longest: LONGEST * doublings(longest / LONGEST),
    angles: phase === 'computed' ? scatteringAngles(circumference / from) : new Float64Array(0)
  }
}

/** Opacities of grains between the rows of a table of their optics. */
export function grainsLaw(spec: GrainsOpacitySpec, optics = tabulateGrains(grainRequest(spec))): OpacityCurves {
  const { absorption, scattering, asymmetry, wavelengths: wavelength, error } = optics
  const worst = error.indexOf(Math.max(...error))
  const known = spec.populations
    .map(makeGrain)
    .flatMap(({ material, coat }) => [material.range, ...(coat ? [coat.material.range] : [])])
  return {
    ...tableLaw({ wavelength, absorption, scattering, asymmetry }),
    range: [Math.max(...known.map(([from]) => from)), Math.min(...known.map(([, to]) => to))],
    roughness: { error: error[worst], wavelength: wavelength[worst] },
    ...(optics.cosines.length > 0 && { matrix: (at: number) => matrixAt(optics, at) })
  }
}

/** The matrix between two rows of a table: their mean, weighted by what each scatters. */
function matrixAt({ wavelengths, scattering, cosines, matrix }: GrainOptics, wavelength: number): ScatteringMatrix {
  const row = bracket(wavelengths, wavelength)
  const position = Math.log(wavelength / wavelengths[row]) / Math.log(wavelengths[row + 1] / wavelengths[row])
  const share = Math.min(1, Math.max(0, position))
  const [left, right] = [(1 - share) * scattering[row], share * scattering[row + 1]]
  const part = right > 0 ? right / (left + right) : 0
  const count = cosines.length
  const mean = (element: Float64Array) =>
    Float64Array.from({ length: count }, (_, j) => (1 - part) * element[row * count + j] + part * element[(row + 1) * count + j])
  return {
    angles: cosines.map(Math.acos),
    s11: mean(matrix.s11),
    s12: mean(matrix.s12),
    s33: mean(matrix.s33),
    s34: mean(matrix.s34)
  }
}
