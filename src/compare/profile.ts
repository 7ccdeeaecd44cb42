/** Means over rings or sectors, in the unit of the values; NaN where no value lies. */
export interface Profile {
  /** Middle of each ring (rad) or sector (rad, from north towards east). */
  at: Float64Array
  mean: Float64Array
  sigma: Float64Array
  count: Float64Array
}

/** Which bin an offset belongs to; other than a whole number from 0 for none. */
export type BinOf = (east: number, north: number) => number

/** Bins by radius, between neighbours of `edges` (rad, increasing). */
export function rings(edges: number[]): BinOf {
  return (east, north) => {
    const radius = Math.hypot(east, north)
    let bin = -1
    while (bin + 1 < edges.length && edges[bin + 1] <= radius) bin++
    return bin < edges.length - 1 ? bin : -1
  }
}

/** Bins by position angle, as many as `angles` (rad, increasing): each reaches half-way to its neighbours, within a ring. */
export function sectors(angles: ArrayLike<number>, [inner, outer]: [number, number]): BinOf {
  const turn = 2 * Math.PI
  return (east, north) => {
    const radius = Math.hypot(east, north)
    if (radius < inner || radius > outer) return -1
    const angle = Math.atan2(east, north)
    let best = -1
    let least = Number.POSITIVE_INFINITY
    for (let i = 0; i < angles.length; i++) {
      const off = Math.abs(angle - angles[i]) % turn
      const distance = Math.min(off, turn - off)
      if (distance < least) [least, best] = [distance, i]
    }
    return best
  }
}

/** Means of values in bins; `sigma` of the means as if that part of the values were `independent`: 0 for noise alike in a bin. */
export function profileOf(
  at: Float64Array,
  binOf: BinOf,
  { east, north, values, sigma }: Record<'east' | 'north' | 'values' | 'sigma', ArrayLike<number>>,
  independent: number
): Profile {
  const [sum, variance, count] = [0, 0, 0].map(() => new Float64Array(at.length))
  for (let i = 0; i < values.length; i++) {
    const bin = binOf(east[i], north[i])
    if (bin < 0) continue
    sum[bin] += values[i]
    variance[bin] += sigma[i] ** 2
    count[bin]++
  }
  return {
    at,
    mean: sum.map((value, bin) => value / count[bin]),
    sigma: variance.map((value, bin) => Math.sqrt(value / Math.min(1, Math.max(independent, 1 / count[bin]))) / count[bin]),
    count
  }
}
