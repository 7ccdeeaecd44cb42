import type { Complex } from '../../math/complex.js'
import { integrateVector, type VectorIntegral } from '../../math/vector-integral.js'
import { makeAmplitudes, writeAmplitudes } from '../mie/amplitudes.js'
import { coatedSeries } from '../mie/coated-series.js'
import { efficiencies, writeEfficiencies } from '../mie/efficiencies.js'
import { makeMieSeries } from '../mie/mie-series.js'
import { makeMatrix, writeMatrix } from '../mie/scattering-matrix.js'
import type { SizeDistribution } from './size-distribution.js'

/** Largest estimated error of an integral, relative to its scale. */
const TOLERANCE = 1e-4
/**
 * Spheres spent on one wavelength at most, for size parameters up to AFFORDABLE (without and with angles); fewer beyond, as its square
 * root, since each takes longer: half a second a wavelength. Only the narrow resonances of large transparent spheres need so many; what
 * error is left is told.
 */
const MOST_SPHERES = 30000
const LEAST_SPHERES = 300
const AFFORDABLE = { opacities: 1000, matrix: 10 }
/** Absorption below this share of the scattering need not be known as well. */
const MINOR = 1e-3
/** Width of the first panels in ln(radius). */
const FIRST_WIDTH = 1

/** Refractive indices at one wavelength, and the core's share of the radius: 0 when all is coat. */
export interface SphereIndices {
  core: Complex
  coat: Complex
  coreOverRadius: number
}

/**
 * Integral over a size distribution at one wavelength (cm). Values, each weighted by number: absorption cross section, scattering
 * cross section, scattering cross section times mean cosine (cm2), then S11, S12, S33 and S34 at every angle.
 */
export type SizeIntegrator = (wavelength: number, indices: SphereIndices) => VectorIntegral

/**
 * Integrator for wavelengths of `shortest` (cm) or more and these cosines of scattering angles.
 */
export function makeSizeIntegrator(sizes: SizeDistribution, shortest: number, cosines: ArrayLike<number>): SizeIntegrator {
  const { smallest, largest, density } = sizes
  const range: [number, number] = [Math.log(smallest), Math.log(largest)]
  const panels = Math.max(1, Math.ceil((range[1] - range[0]) / FIRST_WIDTH))
  const series = makeMieSeries((2 * Math.PI * largest * 1.000001) / shortest)
  const amplitudes = makeAmplitudes(cosines)
  const count = cosines.length
  const matrix = makeMatrix(count)
  const sphere = efficiencies(series)
  return (wavelength, { core, coat, coreOverRadius }) => {
    const write = (lnRadius: number, values: Float64Array) => {
      const radius = Math.exp(lnRadius)
      const x = (2 * Math.PI * radius) / wavelength
      coatedSeries(series, coreOverRadius * x, x, core, coat)
      writeEfficiencies(series, sphere)
      const weight = density(radius) * radius
      const area = weight * Math.PI * radius * radius
      values[0] = area * sphere.absorption
      values[1] = area * sphere.scattering
      values[2] = values[1] * sphere.asymmetry
      if (count === 0) return
      writeAmplitudes(series, amplitudes)
      writeMatrix(amplitudes, matrix)
      for (let j = 0; j < count; j++) {
        values[3 + j] = weight * matrix.s11[j]
        values[3 + count + j] = weight * matrix.s12[j]
        values[3 + 2 * count + j] = weight * matrix.s33[j]
        values[3 + 3 * count + j] = weight * matrix.s34[j]
      }
    }
    const integrand = {
      length: 3 + 4 * count,
      judged: 3 + count,
      write,
      setScales: (magnitudes: Float64Array) => setScales(magnitudes, wavelength)
    }
    const largestX = (2 * Math.PI * largest) / wavelength
    const affordable = count > 0 ? AFFORDABLE.matrix : AFFORDABLE.opacities
    const most = MOST_SPHERES * Math.sqrt(affordable / Math.max(affordable, largestX))
    return integrateVector(integrand, range, panels, TOLERANCE, Math.max(LEAST_SPHERES, most))
  }
}

/**
 * Scales of the errors: absorption itself or a thousandth of the scattering, scattering itself, for the mean cosine the scattering, and for S11 the larger of itself and
 * its mean over all directions.
 */
function setScales(magnitudes: Float64Array, wavelength: number): void {
  const scattering = magnitudes[1]
  magnitudes[0] = Math.max(magnitudes[0], MINOR * scattering)
  magnitudes[2] = scattering
  const mean = (Math.PI * scattering) / (wavelength * wavelength)
  for (let q = 3; q < magnitudes.length; q++) magnitudes[q] = Math.max(magnitudes[q], mean)
}
