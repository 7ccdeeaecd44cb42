import { type Quantile, quantileOf } from '../math/quantile.js'

/** Quantiles that are tabulated when they are first asked for. */
export function lazy(make: () => Quantile): Quantile {
  let quantile: Quantile | undefined
  return (u) => {
    quantile ??= make()
    return quantile(u)
  }
}

/** Of the normal distribution, cut at six sigma. */
export const normalQuantile = lazy(() => quantileOf((t) => Math.exp(-0.5 * t * t), [-6, 6]))
