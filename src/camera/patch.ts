import { standardError } from '../math/stats.js'
import { GROUPS } from '../solve/groups.js'
import type { IntensityField } from './field.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from './ray-values.js'

/** Regions of one patch at most. */
const MOST_REGIONS = 20_000
/** Share of the sum of all differences between four rays and the middle one that counts as error, beside their scatter. */
const DOUBT = 0.1
/** Four rays of a field with steps are wrong by 1 / sqrt(5) of what they differ from a fifth. */
const WRONG = 0.5
/** Share of the differences inside a region that is doubted even when its sum seems right. */
const DISTRUST = 0.02
/** The error need not be smaller than this share of the photon noise. */
const NOISE_SHARE = 0.1
/** Two-point Gauss nodes on [0, 1]. */
const LOW = 0.5 - 0.5 / Math.sqrt(3)
const HIGH = 0.5 + 0.5 / Math.sqrt(3)
/** Two-point Gauss-Jacobi nodes and weights on [0, 1] for the weight 2 t (the roots of t^2 - 6/5 t + 3/10): exact up to t^3. */
const OUTER = 0.6 - Math.sqrt(0.06)
const INNER = 0.6 + Math.sqrt(0.06)
const OUTER_WEIGHT = (INNER - 2 / 3) / (INNER - OUTER)

/** A part of the picture in polar coordinates about its centre. */
export interface Patch {
  /** Parts in which it is first divided. The outline is smooth within each of them, and crosses neither radius. */
  parts: Sector[]
  /** Radii where the patch begins and ends in a direction, into `out`. */
  outline: (cos: number, sin: number, out: Float64Array) => void
}

/** What lies between two radii, cm, and two angles, rad. Rays just inside a wall see the square root of the distance to it. */
export interface Sector {
  from: number
  to: number
  start: number
  end: number
}

interface Region extends Sector {
  value: Float64Array
  /** Its middle ray, with all of the area. */
  middle: number
  /** Its four rays less the middle one. */
  difference: number
  /** Shares of the size of that difference and of what the rays differ among themselves. */
  doubt: number
  /** It varies more inwards than round. */
  inwards: boolean
}

/** An integral over a part of the picture, and the estimated error of placing the rays. */
export interface PatchIntegral {
  /** The numbers of a ray, intensity x cm2. */
  value: Float64Array
  error: number
}

/**
 * Integral of an intensity field over a patch. Each region between two rings and two angles is summed at two by two Gauss
 * points, in the angle and in t with area ~ 1 - t^2 inwards from the outer ring, which is exact for the square roots of chords that
 * end there; the one whose sum differs most from the ray through its middle is halved in the direction in which it varies
 * more, until the error is below `tolerance` of the sum or of `floor` (intensity x cm2), or well below the photon noise. Where intensity has steps, as cells make
 * them, these differences are errors of either sign: they add up in squares. A share of their plain sum is for what is smooth.
 */
export function integratePatch(field: IntensityField, patch: Patch, tolerance: number, floor: number): PatchIntegral {
  const { parts, outline } = patch
  const heap: Region[] = []
  const { size } = field
  const ray = new Float64Array(size)
  const edges = new Float64Array(2)
  const lights = new Float64Array(4)

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
  const measure = ({ from, to, start, end }: Sector, whole?: Region): Region => {
    // The photon noise needs no such care as the value: the middle ray stands for the region, and in proportion to the light for its halves.
    const inherits = whole !== undefined && whole.middle > 0 && size === RAY_VALUES
    const middleArea = sample(from, to, start, end, Math.SQRT1_2, 0.5, !inherits)
    const middle = middleArea > 0 ? middleArea * (ray[EMITTED] + ray[SCATTERED]) : 0
    const value = new Float64Array(size)
    if (inherits) for (let k = FIRST_GROUP; k < size; k++) value[k] = (middle / whole.middle) * whole.value[k]
    else if (middleArea > 0) for (let k = FIRST_GROUP; k < size; k++) value[k] = middleArea * ray[k]
    for (let q = 0; q < 4; q++) {
      const area = sample(from, to, start, end, q % 2 === 0 ? OUTER : INNER, q < 2 ? LOW : HIGH, false)
      const weight = 0.5 * area * (q % 2 === 0 ? OUTER_WEIGHT : 1 - OUTER_WEIGHT)
      lights[q] = area * (ray[EMITTED] + ray[SCATTERED])
      for (let k = 0; k < FIRST_GROUP; k++) value[k] += weight * ray[k]
    }
    const [a, b, c, d] = lights
    const difference = value[EMITTED] + value[SCATTERED] - middle
    const doubt = WRONG * Math.abs(difference) + DISTRUST * (Math.max(a, b, c, d) - Math.min(a, b, c, d))
    const inwards = Math.abs(a - b) + Math.abs(c - d) >= Math.abs(a - c) + Math.abs(b - d)
    return { from, to, start, end, value, middle, difference, doubt, inwards }
  }

  let total = 0
  let differences = 0
  let squares = 0
  const groups = new Float64Array(GROUPS)
  const count = ({ value, difference, doubt }: Region, sign: number) => {
    total += sign * (value[EMITTED] + value[SCATTERED])
    differences += sign * difference
    squares += sign * doubt * doubt
    for (let g = 0; g < GROUPS; g++) groups[g] += sign * value[FIRST_GROUP + g]
  }
  const insert = (region: Region) => {
    count(region, 1)
    push(heap, region)
  }
  const error = () => Math.sqrt(Math.max(0, squares)) + DOUBT * Math.abs(differences)
  for (const part of parts) insert(measure(part))
  const allowed = () => Math.max(tolerance * Math.max(total, floor), NOISE_SHARE * standardError(groups))
  while (error() > allowed() && heap.length < MOST_REGIONS) {
    const region = pop(heap)
    const { from, to, start, end, inwards } = region
    count(region, -1)
    const half = inwards ? Math.sqrt(0.5 * (from * from + to * to)) : 0.5 * (start + end)
    insert(measure(inwards ? { from, to: half, start, end } : { from, to, start, end: half }, region))
    insert(measure(inwards ? { from: half, to, start, end } : { from, to, start: half, end }, region))
  }
  const integral = { value: new Float64Array(size), error: error() }
  for (const { value } of heap) for (let k = 0; k < size; k++) integral.value[k] += value[k]
  return integral
}

/** Binary heap with the largest doubt on top. */
function push(heap: Region[], region: Region): void {
  let i = heap.length
  heap.push(region)
  while (i > 0) {
    const parent = (i - 1) >> 1
    if (heap[parent].doubt >= region.doubt) break
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
    if (child + 1 < size && heap[child + 1].doubt > heap[child].doubt) child++
    if (heap[child].doubt <= last.doubt) break
    heap[i] = heap[child]
    i = child
  }
  heap[i] = last
  return top
}
