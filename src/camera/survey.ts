import { bracket } from '../math/interp.js'
import { medianOverCountedBulk, standardError } from '../math/stats.js'
import type { IntensityField } from './field.js'
import type { PixelFrame } from './frame.js'
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
  overRings(nearest, edge / flattening, RINGS, DIRECTIONS, (x, y, area) => {
    if (Math.hypot(x, y * flattening) > edge) return
    round.sample(x, y, ray, true)
    for (let j = 0; j < size; j++) sum[j] += area * flattening * ray[j]
  })
  return sum
}

/**
 * A quick look at a picture: rays through the middles of some pixels, denser towards the origin of its coordinates or what is nearest to
 * that in it; each stands for its share of a ring.
 */
export function survey(field: IntensityField, { columns, rows }: PixelFrame): Survey {
  const [left, right] = [columns[0], columns[columns.length - 1]]
  const [low, high] = [rows[0], rows[rows.length - 1]]
  const area = ((right - left) * (high - low)) / ((columns.length - 1) * (rows.length - 1))
  const [x0, y0] = [Math.max(left, Math.min(right, 0)), Math.max(low, Math.min(high, 0))]
  const nearest = 0.5 * Math.sqrt(area)
  const farthest = Math.hypot(Math.max(right - x0, x0 - left), Math.max(high - y0, y0 - low))
  const ray = new Float64Array(field.size)
  const lights: number[] = []
  const errors: number[] = []
  const pixels: number[] = []
  let flux = 0
  overRings(nearest, Math.max(nearest, farthest), PICTURE_RINGS, PICTURE_DIRECTIONS, (offX, offY, covered) => {
    const count = covered / area
    const [x, y] = [x0 + offX, y0 + offY]
    if (x < left || x >= right || y < low || y >= high || !(count > 0)) return
    const [column, row] = [bracket(columns, x), bracket(rows, y)]
    field.sample(0.5 * (columns[column] + columns[column + 1]), 0.5 * (rows[row] + rows[row + 1]), ray, true)
    const light = ray[EMITTED] + ray[SCATTERED]
    lights.push(light)
    errors.push(light > 0 ? standardError(ray.subarray(FIRST_GROUP, RAY_VALUES)) / light : 0)
    pixels.push(count)
    flux += light * count
  })
  const all = pixels.reduce((sum, count) => sum + count, 0)
  return { error: flux > 0 ? medianOverCountedBulk(errors, lights, pixels, BULK) : 0, mean: flux / all }
}

/**
 * A quick look at what a picture misses: light of dust beyond its edges, without stars, as a sum of intensity over such pixels; to some per
 * cent of itself. For an observer far away: about one among the dust there is no end of it.
 */
export function surveyBeyond(field: IntensityField, { columns, rows }: PixelFrame): number {
  const [halfWidth, halfHeight] = [columns[columns.length - 1], rows[rows.length - 1]]
  const pixel = (columns[1] - columns[0]) * (rows[1] - rows[0])
  const nearest = Math.min(halfWidth, halfHeight)
  if (nearest >= field.outermost) return 0
  const ray = new Float64Array(field.size)
  let sum = 0
  overRings(nearest, field.outermost, PICTURE_RINGS, PICTURE_DIRECTIONS, (x, y, area) => {
    if (Math.abs(x) <= halfWidth && Math.abs(y) <= halfHeight) return
    field.sample(x, y, ray, false)
    sum += area * (ray[EMITTED] + ray[SCATTERED])
  })
  return sum / pixel
}

/** Points in rings, the first one within `nearest`, the others to `farthest` in equal ratios, each with the area that it stands for. */
function overRings(
  nearest: number,
  farthest: number,
  rings: number,
  directions: number,
  visit: (x: number, y: number, area: number) => void
): void {
  const ratio = (farthest / nearest) ** (1 / rings)
  for (let i = -1; i < rings; i++) {
    const from = i < 0 ? 0 : nearest * ratio ** i
    const to = nearest * ratio ** (i + 1)
    const b = Math.sqrt(0.5 * (from * from + to * to))
    const area = (Math.PI * (to * to - from * from)) / directions
    for (let k = 0; k < directions; k++) {
      const angle = (2 * Math.PI * (k + (i % 2 === 0 ? 0.25 : 0.75))) / directions
      visit(b * Math.cos(angle), b * Math.sin(angle), area)
    }
  }
}
