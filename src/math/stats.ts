export function sumOf(values: ArrayLike<number>): number {
  let sum = 0
  for (let i = 0; i < values.length; i++) sum += values[i]
  return sum
}

export function mean(values: ArrayLike<number>): number {
  return sumOf(values) / values.length
}

/** The least and the greatest of values, however many: `Math.max(...values)` fails above about 1e5. */
export function extent(values: ArrayLike<number>): [least: number, greatest: number] {
  let [least, greatest] = [Number.POSITIVE_INFINITY, Number.NEGATIVE_INFINITY]
  for (let i = 0; i < values.length; i++) {
    if (values[i] < least) least = values[i]
    if (values[i] > greatest) greatest = values[i]
  }
  return [least, greatest]
}

/** 1 sigma of the mean of G independent equal groups, from their scatter: sqrt(sum (x - mean)^2 / (G (G - 1))). NaN for G < 2. */
export function standardError(groups: ArrayLike<number>): number {
  const count = groups.length
  const centre = mean(groups)
  let sum = 0
  for (let i = 0; i < count; i++) sum += (groups[i] - centre) ** 2
  return Math.sqrt(sum / (count * (count - 1)))
}

/** Middle value, the mean of the two middle ones for an even number; NaN for none. */
export function median(values: ArrayLike<number>): number {
  const sorted = Float64Array.from(values).sort()
  const half = sorted.length >> 1
  return sorted.length % 2 === 1 ? sorted[half] : 0.5 * (sorted[half - 1] + sorted[half])
}

/**
 * Median of `values` over the heaviest elements, as many as it takes for their `weights` (>= 0) to hold `fraction` of the total,
 * with all that weigh as much as the lightest of them. Each counts once. NaN when nothing has weight.
 */
export function medianOverBulk(values: ArrayLike<number>, weights: ArrayLike<number>, fraction: number): number {
  const sorted = Float64Array.from(weights).sort()
  const wanted = fraction * sorted.reduceRight((sum, weight) => sum + weight, 0)
  let held = 0
  let first = sorted.length
  while (held < wanted) held += sorted[--first]
  const lightest = sorted[first]
  return median(Array.from(values).filter((_, i) => weights[i] >= lightest))
}

/**
 * As `medianOverBulk`, where element i stands for `counts[i]` equal ones of weight `weights[i]` each: the value below which half
 * of those in the bulk lie.
 */
export function medianOverCountedBulk(values: number[], weights: number[], counts: number[], fraction: number): number {
  const order = weights.map((_, i) => i).sort((a, b) => weights[b] - weights[a])
  const wanted = fraction * order.reduce((sum, i) => sum + weights[i] * counts[i], 0)
  let held = 0
  let size = 0
  while (size < order.length && held < wanted) {
    const i = order[size++]
    held += weights[i] * counts[i]
  }
  const bulk = order.slice(0, size).sort((a, b) => values[a] - values[b])
  const half = 0.5 * bulk.reduce((sum, i) => sum + counts[i], 0)
  let below = 0
  for (const i of bulk) {
    below += counts[i]
    if (below >= half) return values[i]
  }
  return Number.NaN
}
