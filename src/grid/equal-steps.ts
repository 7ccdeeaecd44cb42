import { bracket } from '../math/interp.js'

/**
 * Cuts the interval xs[0]..xs[last] into `count` parts that hold equal shares of a quantity whose running sum is `ys`
 * (not decreasing, linear between points); the count + 1 cuts. Equal lengths where the quantity is zero.
 */
export function equalSteps(xs: ArrayLike<number>, ys: ArrayLike<number>, count: number): Float64Array {
  const last = xs.length - 1
  const total = ys[last] - ys[0]
  const cuts = new Float64Array(count + 1)
  cuts[0] = xs[0]
  cuts[count] = xs[last]
  for (let k = 1; k < count; k++) {
    if (total > 0) {
      const target = ys[0] + (total * k) / count
      const i = bracket(ys, target)
      cuts[k] = xs[i] + ((target - ys[i]) / (ys[i + 1] - ys[i])) * (xs[i + 1] - xs[i])
    } else cuts[k] = xs[0] + ((xs[last] - xs[0]) * k) / count
  }
  return cuts
}

/** Shares `count` whole things in proportion to `weights`, at least one each (largest remainders); the sum is at least their number. */
export function shareOut(weights: number[], count: number): number[] {
  const shares = weights.map(() => 1)
  const spare = count - weights.length
  const total = weights.reduce((sum, weight) => sum + weight, 0)
  if (spare <= 0) return shares
  const ideal = weights.map((weight) => (total > 0 ? weight / total : 1 / weights.length) * spare)
  ideal.forEach((value, i) => {
    shares[i] += Math.floor(value)
  })
  const left = count - shares.reduce((sum, share) => sum + share, 0)
  const byRemainder = ideal
    .map((value, i) => ({ i, remainder: value - Math.floor(value) }))
    .sort((a, b) => b.remainder - a.remainder || a.i - b.i)
  for (let k = 0; k < left; k++) shares[byRemainder[k % byRemainder.length].i]++
  return shares
}
