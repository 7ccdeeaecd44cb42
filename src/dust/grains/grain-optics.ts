import { integrate } from '../../math/quadrature.js'
import type { MatrixElements } from '../mie/scattering-matrix.js'
import type { Grain } from './grain.js'
import { makeSizeIntegrator } from './size-integrator.js'

/** Optical properties of grains at W wavelengths and A scattering angles. */
export interface GrainOptics {
  /** W wavelengths, cm. */
  wavelengths: Float64Array
  /** A cosines of scattering angles. */
  cosines: Float64Array
  /** W values, cm2 per gram of dust. */
  absorption: Float64Array
  /** W values, cm2 per gram of dust. */
  scattering: Float64Array
  /** W mean cosines of the scattering angle. */
  asymmetry: Float64Array
  /** W x A each, per sr: S11 is the probability per solid angle (1 over 4 pi sr), the others in the same unit. */
  matrix: MatrixElements
  /** W estimated relative errors of the integration over sizes, the largest of each wavelength; 1e-4 is aimed at. */
  error: Float64Array
}

/** Mie theory integrated over the sizes of `grain`, at these wavelengths (cm) and cosines of scattering angles (possibly none). */
export function grainOptics(grain: Grain, wavelengths: ArrayLike<number>, cosines: ArrayLike<number> = []): GrainOptics {
  const { sizes, material, coat } = grain
  const count = cosines.length
  const optics = emptyOptics(wavelengths, cosines)
  const { absorption, scattering, asymmetry, matrix, error } = optics
  const integrateSizes = makeSizeIntegrator(sizes, Math.min(...optics.wavelengths), cosines)
  const mass = meanMass(grain)
  const coreOverRadius = coat ? Math.cbrt(1 - coat.volume) : 0
  optics.wavelengths.forEach((wavelength, w) => {
    const core = material.index(wavelength)
    const indices = { core, coat: coat ? coat.material.index(wavelength) : core, coreOverRadius }
    const integral = integrateSizes(wavelength, indices)
    const [absorbed, scattered, forward] = integral.values
    absorption[w] = absorbed / mass
    scattering[w] = scattered / mass
    asymmetry[w] = scattered > 0 ? forward / scattered : 0
    error[w] = integral.error
    // differential cross section S11 / k^2
    const perScattering = scattered > 0 ? (wavelength / (2 * Math.PI)) ** 2 / scattered : 0
    const elements = [matrix.s11, matrix.s12, matrix.s33, matrix.s34]
    elements.forEach((element, e) => {
      const from = 3 + e * count
      element.set(
        integral.values.subarray(from, from + count).map((value) => value * perScattering),
        w * count
      )
    })
  })
  return optics
}

/** Mean mass of a grain, g, in the number unit of the size distribution. */
function meanMass({ sizes: { smallest, largest, density }, density: solid }: Grain): number {
  const volume = (lnRadius: number) => {
    const radius = Math.exp(lnRadius)
    return density(radius) * radius ** 4
  }
  return (4 / 3) * Math.PI * solid * integrate(volume, Math.log(smallest), Math.log(largest))
}

/** Room for W wavelengths and A cosines. */
export function emptyOptics(wavelengths: ArrayLike<number>, cosines: ArrayLike<number>): GrainOptics {
  const each = () => new Float64Array(wavelengths.length)
  const element = () => new Float64Array(wavelengths.length * cosines.length)
  return {
    wavelengths: Float64Array.from(wavelengths),
    cosines: Float64Array.from(cosines),
    absorption: each(),
    scattering: each(),
    asymmetry: each(),
    matrix: { s11: element(), s12: element(), s33: element(), s34: element() },
    error: each()
  }
}

/** One wavelength of some optics. */
export interface OpticsRow {
  optics: GrainOptics
  w: number
}

/** Rows of optics at the same angles, put together. */
export function opticsOfRows(rows: readonly OpticsRow[]): GrainOptics {
  const { cosines } = rows[0].optics
  const all = emptyOptics(
    rows.map(({ optics, w }) => optics.wavelengths[w]),
    cosines
  )
  const count = cosines.length
  rows.forEach(({ optics, w }, row) => {
    for (const name of ['absorption', 'scattering', 'asymmetry', 'error'] as const) all[name][row] = optics[name][w]
    for (const name of ['s11', 's12', 's33', 's34'] as const)
      all.matrix[name].set(optics.matrix[name].subarray(w * count, (w + 1) * count), row * count)
  })
  return all
}
