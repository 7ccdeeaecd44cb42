import { medianOverBulk, standardError } from '../math/stats.js'
import type { PixelFrame } from './direct.js'
import type { IntensityField } from './field.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from './ray.js'

/** Pixels looked at in each direction. */
const MOST = 16
/** Pixels that together hold this share of the flux count for precision. */
export const BULK = 0.95

export interface Survey {
  /** Median relative 1 sigma over the pixels that hold 95 % of the flux, without direct starlight. */
  error: number
  /** Mean intensity, erg/s/cm2/Hz/sr. */
  mean: number
}

/** Rings and directions of a quick look at an aperture. */
const RINGS = 40
const DIRECTIONS = 8

/** A quick look at an aperture of `radius` (cm): its integral to some per cent, RAY_VALUES numbers x cm2. */
export function surveyAperture(field: IntensityField, radius: number): Float64Array {
  const ray = new Float64Array(RAY_VALUES)
  const sum = new Float64Array(RAY_VALUES)
  const edge = Math.min(radius, field.outermost)
  const ratio = (edge / field.innermost) ** (1 / RINGS)
  for (let i = -1; i < RINGS; i++) {
    const from = i < 0 ? 0 : field.innermost * ratio ** i
    const to = field.innermost * ratio ** (i + 1)
    if (!(to > from)) continue
    const b = Math.sqrt(0.5 * (from * from + to * to))
    for (let k = 0; k < DIRECTIONS; k++) {
      const angle = (2 * Math.PI * (k + (i % 2 === 0 ? 0.25 : 0.75))) / DIRECTIONS
      field.sample(b * Math.cos(angle), b * Math.sin(angle), ray, true)
      for (let j = 0; j < RAY_VALUES; j++) sum[j] += (Math.PI * (to * to - from * from) * ray[j]) / DIRECTIONS
    }
  }
  return sum
}

/** A quick look at a picture: one ray through the middles of some of its pixels, spread evenly. */
export function survey(field: IntensityField, frame: PixelFrame): Survey {
  const { width, height, pixelWidth, pixelHeight } = frame
  const columns = Math.min(width, MOST)
  const rows = Math.min(height, MOST)
  const ray = new Float64Array(RAY_VALUES)
  const totals = new Float64Array(columns * rows)
  const errors = new Float64Array(columns * rows)
  let sum = 0
  for (let j = 0; j < rows; j++) {
    const y = (Math.floor(((j + 0.5) * height) / rows) + 0.5 - height / 2) * pixelHeight
    for (let i = 0; i < columns; i++) {
      field.sample((Math.floor(((i + 0.5) * width) / columns) + 0.5 - width / 2) * pixelWidth, y, ray, true)
      const total = ray[EMITTED] + ray[SCATTERED]
      totals[j * columns + i] = total
      errors[j * columns + i] = total > 0 ? standardError(ray.subarray(FIRST_GROUP, RAY_VALUES)) / total : 0
      sum += total
    }
  }
  return { error: sum > 0 ? medianOverBulk(errors, totals, BULK) : 0, mean: sum / (columns * rows) }
}
