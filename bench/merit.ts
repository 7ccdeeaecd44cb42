import { medianOverBulk } from '../src/math/stats.js'
import { readDoubles } from './doubles.js'
import { fitsPlanes } from './fits-planes.js'

/** Pixels that together hold this share of the flux count. */
const BULK = 0.95
/** Images of the yardstick, of equally many packets each: GROUPS in native/peel.c. */
const GROUPS = 16

/** A picture of scattered and emitted light without direct starlight, and the squares of its errors. */
export interface Picture {
  light: Float64Array
  variance: Float64Array
}

/** A picture of the program's own. */
export function ourPicture(path: string): Picture {
  const planes = fitsPlanes(path)
  const scattered = planes.get('SCATTERED') as Float64Array
  const emitted = planes.get('EMITTED') as Float64Array
  const sigma = planes.get('SIGMA') as Float64Array
  return { light: scattered.map((value, i) => value + emitted[i]), variance: sigma.map((value) => value * value) }
}

/** The yardstick's images. */
export function peeledGroups(path: string): Float64Array[] {
  const images = readDoubles(path)
  const pixels = images.length / GROUPS
  return Array.from({ length: GROUPS }, (_, g) => images.subarray(g * pixels, (g + 1) * pixels))
}

/** The mean of the yardstick's images; the scatter between them gives the variance. */
export function peeledPicture(path: string): Picture {
  const images = peeledGroups(path)
  const pixels = images[0].length
  const light = new Float64Array(pixels)
  const variance = new Float64Array(pixels)
  for (let i = 0; i < pixels; i++) {
    for (let g = 0; g < GROUPS; g++) light[i] += images[g][i] / GROUPS
    for (let g = 0; g < GROUPS; g++) variance[i] += (images[g][i] - light[i]) ** 2 / (GROUPS * (GROUPS - 1))
  }
  return { light, variance }
}

/**
 * Median relative variance over the pixels that hold 95 % of the flux of `bright`, a better picture of the same field. Relative to
 * its light, scaled to the same flux: a noisy picture's own light would say too little where it caught nothing.
 */
export function relativeVariance({ light, variance }: Picture, bright: Picture): number {
  const scale = sum(light) / sum(bright.light)
  const relative = variance.map((value, i) => value / (scale * bright.light[i]) ** 2)
  return medianOverBulk(relative, bright.light, BULK)
}

/** Indices of the brightest pixels that together hold BULK of the flux. */
export function brightPixels(light: Float64Array): number[] {
  const order = Array.from(light.keys()).sort((a, b) => light[b] - light[a])
  const all = BULK * sum(light)
  let held = 0
  const count = order.findIndex((pixel) => {
    held += light[pixel]
    return held >= all
  })
  return order.slice(0, count + 1)
}

const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0)
