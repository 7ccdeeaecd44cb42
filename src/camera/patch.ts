import type { IntensityField } from './field.js'
import { EMITTED, FIRST_GROUP, SCATTERED } from './ray-values.js'

/** Regions of one patch at most. */
const MOST_REGIONS = 20_000
/** Share of the difference between four rays and the middle one that counts as the error of the four. */
const DOUBT = 0.1
/** Share of the differences inside a region that counts as its error even when its sum seems right. */
const DISTRUST = 0.002
/** Two-point Gauss nodes on [0, 1]. */
const LOW = 0.5 - 0.5 / Math.sqrt(3)
const HIGH = 0.5 + 0.5 / Math.sqrt(3)

/** A part of the picture in polar coordinates about its centre. */
export interface Patch {
  /**
   * Angles between which the part between two radii is first divided, rad, increasing. The outline is smooth between them, and
   * does not cross either radius.
   */
  angles: (from: number, to: number) => number[]
  /** Radii between which it is first divided, cm, increasing: rays just inside a wall see the square root of the distance. */
  rings: number[]
  /** Radii where the patch begins and ends in a direction, into `out`. */
  outline: (cos: number, sin: number, out: Float64Array) => void
}

interface Region {
  from: number
  to: number
  start: number
  end: number
  value: Float64Array
  error: number
}

/** An integral over a part of the picture, and the estimated error of placing the rays. */
export interface PatchIntegral {
  /** The numbers of a ray, intensity x cm2. */
  value: Float64Array
  error: number
}

/**
 * Integral of an intensity field over a patch. Each region between two rings and two angles is summed at two by two Gauss
 * points, in the angle and in t with area ~ 1 - t^2 inwards from the outer ring, which is exact for the square roots of chords
 * that end there; the one whose sum differs most from the ray through its middle is divided in both directions, until all
 * errors together are below `tolerance` of the sum or of `floor` (intensity x cm2).
 */
export function integratePatch(field: IntensityField, patch: Patch, tolerance: number, floor: number): PatchIntegral {
  const { angles, rings, outline } = patch
  const heap: Region[] = []
  const { size } = field
  const ray = new Float64Array(size)
  const edges = new Float64Array(2)

  /** One ray of a region, t inwards and v of the way round; returns the area it stands for when it has all the weight. */
  const sample = (from: number, to: number, start: number, end: number, t: number, v: number, withGroups: boolean): number => {
    const angle = start + v * (end - start)
    const cos = Math.cos(angle)
    const sin = Math.sin(angle)
    outline(cos, sin, edges)
    const low = Math.max(from, edges[0])
    const high = Math.min(to, edges[1])
    if (!(high > low)) return 0
    const span = high * high - low * low
    const b = Math.sqrt(high * high - t * t * span)
    field.sample(b * cos, b * sin, ray, withGroups)
    return 0.5 * span * (end - start)
  }
  const measure = (from: number, to: number, start: number, end: number): Region => {
    const middleArea = sample(from, to, start, end, Math.SQRT1_2, 0.5, true)
    const middle = middleArea > 0 ? middleArea * (ray[EMITTED] + ray[SCATTERED]) : 0
    const value = new Float64Array(size)
    // The photon noise needs no such care as the value: the middle ray stands for the region.
    if (middleArea > 0) for (let k = FIRST_GROUP; k < size; k++) value[k] = middleArea * ray[k]
    let low = Number.POSITIVE_INFINITY
    let high = 0
    for (let q = 0; q < 4; q++) {
      const t = q % 2 === 0 ? LOW : HIGH
      const area = sample(from, to, start, end, t, q < 2 ? LOW : HIGH, false)
      let total = 0
      if (area > 0) {
        total = area * (ray[EMITTED] + ray[SCATTERED])
        for (let k = 0; k < FIRST_GROUP; k++) value[k] += 0.5 * t * area * ray[k]
      }
      low = Math.min(low, total)
      high = Math.max(high, total)
    }
    const error = DOUBT * Math.abs(value[EMITTED] + value[SCATTERED] - middle) + DISTRUST * (high - low)
    return { from, to, start, end, value, error }
  }

  let total = 0
  let error = 0
  const insert = (region: Region) => {
    total += region.value[EMITTED] + region.value[SCATTERED]
    error += region.error
    push(heap, region)
  }
  for (let i = 0; i + 1 < rings.length; i++) {
    const divisions = angles(rings[i], rings[i + 1])
    for (let j = 0; j + 1 < divisions.length; j++) insert(measure(rings[i], rings[i + 1], divisions[j], divisions[j + 1]))
  }
  while (error > tolerance * Math.max(total, floor) && heap.length < MOST_REGIONS) {
    const { from, to, start, end, value, error: gone } = pop(heap)
    total -= value[EMITTED] + value[SCATTERED]
    error -= gone
    const half = Math.sqrt(0.5 * (from * from + to * to))
    const angle = 0.5 * (start + end)
    insert(measure(from, half, start, angle))
    insert(measure(from, half, angle, end))
    insert(measure(half, to, start, angle))
    insert(measure(half, to, angle, end))
  }
  const integral = { value: new Float64Array(size), error: 0 }
  for (const region of heap) {
    for (let k = 0; k < size; k++) integral.value[k] += region.value[k]
    integral.error += region.error
  }
  return integral
}

/** Binary heap with the largest error on top. */
function push(heap: Region[], region: Region): void {
  let i = heap.length
  heap.push(region)
  while (i > 0) {
    const parent = (i - 1) >> 1
    if (heap[parent].error >= region.error) break
    heap[i] = heap[parent]
    i = parent
  }
  heap[i] = region
}

function pop(heap: Region[]): Region {
  const top = heap[0]
  const last = heap.pop() as Region
  const size = heap.length
  if (size === 0) return top
  let i = 0
  for (;;) {
    let child = 2 * i + 1
    if (child >= size) break
    if (child + 1 < size && heap[child + 1].error > heap[child].error) child++
    if (heap[child].error <= last.error) break
    heap[i] = heap[child]
    i = child
  }
  heap[i] = last
  return top
}
