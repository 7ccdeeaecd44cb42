import type { IntensityField } from './field.js'
import { EMITTED, Q, RAY_VALUES, SCATTERED } from './ray-values.js'
import { doubled, turnStokes } from './stokes-ray.js'

/** Halvings allowed between two cell walls. */
const DEEPEST = 12
/** Smallest impact parameter, as a share of the innermost dust. */
const CLOSEST = 1e-4

/** Intensity of a spherical source: a function of the impact parameter alone, straight between rays. */
export class RadialProfile implements IntensityField {
  readonly innermost: number
  readonly outermost: number
  readonly flattening = 1

  /**
   * `b`: impact parameters, cm, increasing; `values`: `size` numbers a ray, with Q referred to the radius; `radii`: of the walls, from
   * the innermost dust.
   */
  constructor(
    readonly b: Float64Array,
    readonly values: Float64Array,
    readonly radii: Float64Array,
    readonly size: number
  ) {
    this.innermost = radii[0]
    this.outermost = b[b.length - 1]
  }

  sample(x: number, y: number, out: Float64Array): void {
    const { b, values, size } = this
    const radius = Math.sqrt(x * x + y * y)
    const last = b.length - 1
    if (radius >= b[last]) {
      out.fill(0, 0, size)
      return
    }
    let low = 0
    let high = last
    while (high - low > 1) {
      const middle = (low + high) >> 1
      if (b[middle] <= radius) low = middle
      else high = middle
    }
    const share = (radius - b[low]) / (b[low + 1] - b[low])
    const i = low * size
    for (let k = 0; k < size; k++) out[k] = values[i + k] + share * (values[i + size + k] - values[i + k])
    if (size > RAY_VALUES) {
      const [cos, sin] = doubled(y, -x)
      turnStokes(out, cos, sin, true)
    }
  }

  /** Integral of the intensity over the disk within a radius (cm): the numbers of a ray x cm2, exact for straight lines between rays; no polarisation is left. */
  integrate(radius: number): Float64Array {
    const { b, values, size } = this
    const sum = new Float64Array(size)
    for (let i = 0; i + 1 < b.length && b[i] < radius; i++) {
      const from = b[i]
      const end = b[i + 1]
      const to = Math.min(end, radius)
      // 2 pi int (u + v b) b db
      const ring = Math.PI * (to * to - from * from)
      const moment = (2 / 3) * Math.PI * (to ** 3 - from ** 3)
      for (let k = 0; k < RAY_VALUES; k++) {
        const low = values[i * size + k]
        const slope = (values[(i + 1) * size + k] - low) / (end - from)
        sum[k] += (low - slope * from) * ring + slope * moment
      }
    }
    sum[Q] = 0
    return sum
  }
}

/** Rays at the projected cell walls, halved between them until a straight line gives the ray between to `accuracy`. */
export function traceProfile(
  trace: (b: number, out: Float64Array) => void,
  radii: ArrayLike<number>,
  accuracy: number,
  size: number
): RadialProfile {
  const rows: [number, Float64Array][] = []
  const ray = (b: number): Float64Array => {
    const out = new Float64Array(size)
    trace(b, out)
    return out
  }
  const starts = [CLOSEST * radii[1]]
  while (2 * starts[starts.length - 1] < radii[1]) starts.push(2 * starts[starts.length - 1])
  for (let i = 1; i < radii.length; i++) starts.push(radii[i] * (i === radii.length - 1 ? 1 - 1e-12 : 1))
  let peak = 0
  const refine = (a: number, va: Float64Array, c: number, vc: Float64Array, depth: number): void => {
    const middle = 0.5 * (a + c)
    const vm = ray(middle)
    const exact = vm[EMITTED] + vm[SCATTERED]
    peak = Math.max(peak, exact)
    const line = 0.5 * (va[EMITTED] + va[SCATTERED] + vc[EMITTED] + vc[SCATTERED])
    const good = Math.abs(exact - line) <= accuracy * Math.abs(exact) + 1e-12 * peak
    if (depth < DEEPEST && (!good || depth === 0)) {
      refine(a, va, middle, vm, depth + 1)
      refine(middle, vm, c, vc, depth + 1)
    } else rows.push([middle, vm], [c, vc])
  }
  let previous = ray(starts[0])
  rows.push([0, previous], [starts[0], previous])
  for (let i = 1; i < starts.length; i++) {
    const next = ray(starts[i])
    refine(starts[i - 1], previous, starts[i], next, 0)
    previous = next
  }
  const values = new Float64Array(rows.length * size)
  rows.forEach(([, value], i) => {
    values.set(value, i * size)
  })
  return new RadialProfile(
    Float64Array.from(rows, ([b]) => b),
    values,
    Float64Array.from(radii).subarray(1),
    size
  )
}
