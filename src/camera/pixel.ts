import { standardError } from '../math/stats.js'
import type { IntensityField } from './field.js'
import { integratePatch, type Patch, type Sector } from './patch.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from './ray-values.js'
import { halvedRings, ringsBetween, wallsBetween } from './rings.js'
import { unflattened } from './unflattened.js'

/** A pixel seen from the centre under more than this angle, rad, is integrated in polar coordinates. */
const WIDE = 0.3
/** So is one that more projected walls of cells than this run through: they stand so close only at a rim. */
const CROWDED = 5
/** Largest angle of a first division, rad. */
const FAN = 0.55
/** Squares need not be better than this share of the photon noise. */
const NOISE_SHARE = 0.3
/** Quarters that differ by this many tolerances are divided even where their mean seems right. */
const SPREAD = 30
/** So is a pixel whose corners differ from its quarters by this many tolerances: a thin dark lane may hide from all rays within. */
const CORNERS = 10
/** That is looked into where a pixel is larger than this share of its distance from the centre: a disk's lane is thicker beyond. */
const LANE = 0.03
/** Half the distance of those corners over the width of the pixel. */
const CORNER = 0.499
const DEEPEST = 10
/** Share of what quarters differ among themselves that is doubted at least. */
const DISTRUST = 0.01

/**
 * Means of an intensity field over pixels. Where cells are smaller than the pixel or the pixel lies near the centre, it is a
 * patch in polar coordinates with rings at the projected walls, so that a rim much smaller than a pixel is still integrated.
 * Elsewhere it is the mean of four rays through the centres of its quarters, divided where they disagree with the ray through
 * its middle by more than `tolerance` of the pixel, or differ much among themselves or from the corners of the pixel.
 */
export class PixelIntegrator {
  /** Mean of the last pixel: the numbers of a ray. */
  readonly mean: Float64Array
  /** Estimated error of that mean from the placing of rays. */
  error = 0
  private readonly middle: Float64Array
  private readonly ray: Float64Array
  /** Sums of the rays through the quarters at each level. */
  private readonly sums: Float64Array
  /** Light of the four quarters at each level. */
  private readonly lights = new Float64Array(4 * (DEEPEST + 1))
  /** The field in which patches are divided. */
  private readonly round: IntensityField
  private allowed = 0
  /** Mean light of the corners of the pixel; NaN where they are not looked at. */
  private corners = 0
  /** The brightest ray through a quarter, and where it is. */
  private brightest = 0
  private brightestX = 0
  private brightestY = 0

  /** `floor`: intensity below which no accuracy is asked for. */
  constructor(
    private readonly field: IntensityField,
    private readonly tolerance: number,
    private readonly floor: number
  ) {
    this.mean = new Float64Array(field.size)
    this.middle = new Float64Array(field.size)
    this.ray = new Float64Array(field.size)
    this.sums = new Float64Array(FIRST_GROUP * (DEEPEST + 1))
    this.round = unflattened(field)
  }

  /** Integrates over the rectangle about (x, y), cm. */
  integrate(x: number, y: number, width: number, height: number): void {
    const { field, mean, tolerance } = this
    mean.fill(0)
    this.error = 0
    const nearX = Math.max(0, Math.abs(x) - 0.5 * width)
    const nearY = Math.max(0, Math.abs(y) - 0.5 * height)
    if (nearX * nearX + nearY * nearY >= field.outermost ** 2) return
    const patch = this.patchOf(x, y, width, height)
    if (patch) {
      const area = (width * height) / field.flattening
      const { value, error } = integratePatch(this.round, patch, tolerance, this.floor * area)
      for (let k = 0; k < field.size; k++) mean[k] = value[k] / area
      this.error = error / area
      return
    }
    const { middle } = this
    field.sample(x, y, middle, true)
    const light = middle[EMITTED] + middle[SCATTERED]
    const noise = standardError(middle.subarray(FIRST_GROUP, RAY_VALUES))
    this.allowed = Math.max(tolerance * Math.max(this.floor, light), NOISE_SHARE * noise)
    const near = Math.max(width, height) > LANE * Math.hypot(nearX, nearY)
    this.corners = near ? this.cornerLight(x, y, width, height) : Number.NaN
    this.brightest = 0
    this.divide(x, y, width, height, light, 1, 0)
    // The photon noise of the middle ray, in proportion, stands for the pixel; of the brightest one where the middle is dark.
    const all = mean[EMITTED] + mean[SCATTERED]
    if (light < 0.5 * all) field.sample(this.brightestX, this.brightestY, middle, true)
    const ratio = all > 0 ? all / (middle[EMITTED] + middle[SCATTERED]) : 0
    for (let k = FIRST_GROUP; k < field.size; k++) mean[k] = ratio * middle[k]
  }

  /** The pixel as a patch, or undefined where plain squares do. */
  private patchOf(x: number, y: number, width: number, height: number): Patch | undefined {
    const { round } = this
    const left = x - 0.5 * width
    const right = x + 0.5 * width
    const low = (y - 0.5 * height) / this.field.flattening
    const high = (y + 0.5 * height) / this.field.flattening
    const nearest = Math.hypot(Math.max(0, left, -right), Math.max(0, low, -high))
    const farthest = Math.hypot(Math.max(-left, right), Math.max(-low, high))
    const wide = Math.max(right - left, high - low) > WIDE * nearest
    if (!wide && wallsBetween(round, nearest, farthest) <= CROWDED) return undefined
    return {
      parts: rectangleParts(left, right, low, high, halvedRings(ringsBetween(round, nearest, farthest))),
      outline: (cos, sin, out) => {
        // Where the ray from the centre is inside both strips of the rectangle.
        const x1 = cos === 0 ? (left <= 0 && right >= 0 ? -Infinity : Infinity) : left / cos
        const x2 = cos === 0 ? Infinity : right / cos
        const y1 = sin === 0 ? (low <= 0 && high >= 0 ? -Infinity : Infinity) : low / sin
        const y2 = sin === 0 ? Infinity : high / sin
        out[0] = Math.max(0, Math.min(x1, x2), Math.min(y1, y2))
        out[1] = Math.min(Math.max(x1, x2), Math.max(y1, y2))
      }
    }
  }

  private cornerLight(x: number, y: number, width: number, height: number): number {
    const { field, ray } = this
    let sum = 0
    for (let q = 0; q < 4; q++) {
      field.sample(x + (q % 2 === 0 ? -CORNER : CORNER) * width, y + (q < 2 ? -CORNER : CORNER) * height, ray, false)
      sum += ray[EMITTED] + ray[SCATTERED]
    }
    return 0.25 * sum
  }

  private divide(x: number, y: number, width: number, height: number, middle: number, share: number, level: number): void {
    const { field, mean, tolerance, ray, lights, sums } = this
    const from = FIRST_GROUP * level
    sums.fill(0, from, from + FIRST_GROUP)
    let low = Number.POSITIVE_INFINITY
    let high = Number.NEGATIVE_INFINITY
    for (let q = 0; q < 4; q++) {
      const qx = x + (q % 2 === 0 ? -0.25 : 0.25) * width
      const qy = y + (q < 2 ? -0.25 : 0.25) * height
      field.sample(qx, qy, ray, false)
      for (let k = 0; k < FIRST_GROUP; k++) sums[from + k] += ray[k]
      const light = ray[EMITTED] + ray[SCATTERED]
      lights[4 * level + q] = light
      if (light < low) low = light
      if (light > high) high = light
      if (light > this.brightest) {
        this.brightest = light
        this.brightestX = qx
        this.brightestY = qy
      }
    }
    const light = 0.25 * (sums[from + EMITTED] + sums[from + SCATTERED])
    const error = Math.abs(light - middle) * share
    const allowed = Math.max(this.allowed, tolerance * Math.max(mean[EMITTED] + mean[SCATTERED], light * share))
    const hidden = level === 0 && Math.abs(light - this.corners) > CORNERS * allowed
    if (level < DEEPEST && (hidden || error > allowed * Math.sqrt(share) || (high - low) * share > SPREAD * allowed)) {
      for (let q = 0; q < 4; q++) {
        const cx = x + (q % 2 === 0 ? -0.25 : 0.25) * width
        const cy = y + (q < 2 ? -0.25 : 0.25) * height
        this.divide(cx, cy, 0.5 * width, 0.5 * height, lights[4 * level + q], 0.25 * share, level + 1)
      }
      return
    }
    this.error += share * this.doubt(level, light - middle, high - low)
    for (let k = 0; k < FIRST_GROUP; k++) mean[k] += 0.25 * share * sums[from + k]
  }

  /**
   * 1 sigma of the mean of four quarters from where their rays lie. What they and the middle differ from a plane are two numbers: for a
   * field with steps each has the scatter of single rays, half of which is the error of the mean; for a smooth one a third of the first is.
   * By chance both may be small, hence the share of the whole range.
   */
  private doubt(level: number, difference: number, range: number): number {
    const { lights } = this
    const at = 4 * level
    const twist = 0.25 * (lights[at] - lights[at + 1] - lights[at + 2] + lights[at + 3])
    return Math.sqrt(difference ** 2 / 9 + twist ** 2 / 2 + (DISTRUST * range) ** 2)
  }
}

/**
 * Parts of a rectangle between rings: divided at the angles under which its corners and its crossings with those rings are seen from
 * the origin, and further so that none is wide.
 */
function rectangleParts(left: number, right: number, low: number, high: number, rings: number[]): Sector[] {
  const around = left < 0 && right > 0 && low < 0 && high > 0
  const middle = around ? 0 : Math.atan2(low + high, left + right)
  const turn = (x: number, y: number) => {
    const angle = Math.atan2(y, x) - middle
    return angle > Math.PI ? angle - 2 * Math.PI : angle <= -Math.PI ? angle + 2 * Math.PI : angle
  }
  const corners: number[] = []
  for (const x of [left, right]) for (const y of [low, high]) if (x !== 0 || y !== 0) corners.push(turn(x, y))
  return rings.slice(1).flatMap((to, i) => {
    const from = rings[i]
    const turns = [...corners]
    for (const radius of [from, to]) {
      for (const x of [left, right]) {
        const y = Math.sqrt(radius * radius - x * x)
        for (const at of [y, -y]) if (at > low && at < high) turns.push(turn(x, at))
      }
      for (const y of [low, high]) {
        const x = Math.sqrt(radius * radius - y * y)
        for (const at of [x, -x]) if (at > left && at < right) turns.push(turn(at, y))
      }
    }
    turns.sort((a, b) => a - b)
    if (around) turns.push(turns[0] + 2 * Math.PI)
    const parts: Sector[] = []
    for (let k = 1; k < turns.length; k++) {
      const first = turns[k - 1] + middle
      const span = turns[k] - turns[k - 1]
      const count = Math.ceil(span / FAN)
      for (let j = 0; j < count; j++)
        parts.push({ from, to, start: first + (j * span) / count, end: first + ((j + 1) * span) / count })
    }
    return parts
  })
}
