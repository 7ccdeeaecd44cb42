import { besselJ0 } from '../math/bessel.js'
import { dustOf, sinc } from './fourier.js'
import type { CameraSource } from './run-source.js'
import { diskVisibility } from './star-visibility.js'

/** The azimuthal mean of the visibility (its real part; the imaginary one is 0) at baselines of every direction, cgs. */
export interface VisibilityCurve {
  /** Lengths, cm, from 0. */
  baseline: Float64Array
  visibility: Float64Array
}

const STEPS = 100
const DIRECTIONS = 16

/** The mean over all directions of exp(-2 pi i q . x) is J0(2 pi q |x|); `longest` in cm. */
export function visibilityCurve(source: CameraSource, weights: Float64Array, longest: number): VisibilityCurve {
  const baseline = Float64Array.from({ length: STEPS + 1 }, (_, i) => (longest * i) / STEPS)
  const visibility = new Float64Array(baseline.length)
  weights.forEach((weight, k) => {
    if (weight === 0) return
    const { radii, fluxes } = quarter(dustOf(source, k), source)
    baseline.forEach((length, i) => {
      const q = length / source.wavelengths[k]
      let sum = 0
      for (let j = 0; j < radii.length; j++) sum += fluxes[j] * besselJ0(2 * Math.PI * q * radii[j])
      const stars = source.stars.reduce(
        (all, { east, north, radius, limbDarkening, flux }) =>
          all +
          flux[k] * diskVisibility(2 * Math.PI * q * radius, limbDarkening) * besselJ0(2 * Math.PI * q * Math.hypot(east, north)),
        0
      )
      visibility[i] += weight * (sum / meanSquare(q, source.pixel) + stars)
    })
  })
  return { baseline, visibility }
}

/** Pixels of all four quarters that lie alike, together: their distance from the centre (rad) and their flux. */
function quarter(flux: Float64Array, { width, height, pixel }: CameraSource) {
  const columns = Math.ceil(width / 2)
  const rows = Math.ceil(height / 2)
  const radii = new Float64Array(columns * rows)
  const fluxes = new Float64Array(columns * rows)
  for (let y = 0; y < height; y++) {
    const row = Math.min(y, height - 1 - y)
    for (let x = 0; x < width; x++) {
      const column = Math.min(x, width - 1 - x)
      const at = row * columns + column
      radii[at] = Math.hypot((column + 0.5 - width / 2) * pixel[0], (row + 0.5 - height / 2) * pixel[1])
      fluxes[at] += flux[y * width + x]
    }
  }
  return { radii, fluxes }
}

/** The transform of a pixel's square, averaged over directions. */
function meanSquare(q: number, [across, up]: [number, number]): number {
  let sum = 0
  for (let i = 0; i < DIRECTIONS; i++) {
    const angle = (Math.PI * (i + 0.5)) / (2 * DIRECTIONS)
    sum += sinc(q * Math.cos(angle) * across) * sinc(q * Math.sin(angle) * up)
  }
  return sum / DIRECTIONS
}
