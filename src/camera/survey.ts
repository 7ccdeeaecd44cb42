import { medianOverCountedBulk, standardError } from '../math/stats.js'
import type { PixelFrame } from './direct.js'
import type { IntensityField } from './field.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from './ray-values.js'
import { unflattened } from './unflattened.js'

/** Rings and directions of a quick look at a picture. */
const PICTURE_RINGS = 24
const PICTURE_DIRECTIONS = 12
/** Pixels that together hold this share of the flux count for precision. */
export const BULK = 0.95

export interface Survey {
  /** Median relative 1 sigma over the pixels that hold 95 % of the flux, without direct starlight. */
  error: number
  /** Mean intensity, erg/s/cm2/Hz/sr. */
  mean: number
}

/** Rings and directions of a quick look at an aperture. */
const RINGS = 48
const DIRECTIONS = 8
/** It begins at this share of the radius of the innermost dust: at a slant one sees the rim from within. */
const CAVITY = 0.5

/** A quick look at an aperture of `radius` (cm): its integral to some per cent, the numbers of a ray x cm2. */
export function surveyAperture(field: IntensityField, radius: number): Float64Array {
  const { flattening, size } = field
  const round = unflattened(field)
  const ray = new Float64Array(size)
  const sum = new Float64Array(size)
  const edge = Math.min(radius, field.outermost)
  const nearest = Math.min(CAVITY * field.innermost, edge)
  const ratio = (edge / flattening / nearest) ** (1 / RINGS)
  for (let i = -1; i < RINGS; i++) {
    const from = i < 0 ? 0 : nearest * ratio ** i
    const to = nearest * ratio ** (i + 1)
    const b = Math.sqrt(0.5 * (from * from + to * to))
    const weight = (Math.PI * (to * to - from * from) * flattening) / DIRECTIONS
    for (let k = 0; k < DIRECTIONS; k++) {
      const angle = (2 * Math.PI * (k + (i % 2 === 0 ? 0.25 : 0.75))) / DIRECTIONS
      const x = b * Math.cos(angle)
      const y = b * Math.sin(angle)
      if (Math.hypot(x, y * flattening) > edge) continue
      round.sample(x, y, ray, true)
      for (let j = 0; j < size; j++) sum[j] += weight * ray[j]
    }
  }
  return sum
}

/** A quick look at a picture: rays through the middles of some pixels, denser towards its centre; each stands for its share of a ring. */
export function survey(field: IntensityField, frame: PixelFrame): Survey {
  const { width, height, pixelWidth, pixelHeight } = frame
  const area = pixelWidth * pixelHeight
  const nearest = 0.5 * Math.sqrt(area)
  const farthest = 0.5 * Math.hypot(width * pixelWidth, height * pixelHeight)
  const ratio = Math.max(1, farthest / nearest) ** (1 / PICTURE_RINGS)
  const ray = new Float64Array(field.size)
  const lights: number[] = []
  const errors: number[] = []
  const pixels: number[] = []
  let flux = 0
  for (let i = -1; i < PICTURE_RINGS; i++) {
    const from = i < 0 ? 0 : nearest * ratio ** i
    const to = nearest * ratio ** (i + 1)
    const count = (Math.PI * (to * to - from * from)) / area / PICTURE_DIRECTIONS
    const b = Math.sqrt(0.5 * (from * from + to * to))
    for (let k = 0; k < PICTURE_DIRECTIONS; k++) {
      const angle = (2 * Math.PI * (k + (i % 2 === 0 ? 0.25 : 0.75))) / PICTURE_DIRECTIONS
      const column = Math.floor((b * Math.cos(angle)) / pixelWidth + width / 2)
      const row = Math.floor((b * Math.sin(angle)) / pixelHeight + height / 2)
      if (column < 0 || column >= width || row < 0 || row >= height || !(count > 0)) continue
      field.sample((column + 0.5 - width / 2) * pixelWidth, (row + 0.5 - height / 2) * pixelHeight, ray, true)
      const light = ray[EMITTED] + ray[SCATTERED]
      lights.push(light)
      errors.push(light > 0 ? standardError(ray.subarray(FIRST_GROUP, RAY_VALUES)) / light : 0)
      pixels.push(count)
      flux += light * count
    }
  }
  const all = pixels.reduce((sum, count) => sum + count, 0)
  return { error: flux > 0 ? medianOverCountedBulk(errors, lights, pixels, BULK) : 0, mean: flux / all }
}
