import { bracket } from './interp.js'
import { applyRule, gaussLegendre } from './quadrature.js'

const TWO = gaussLegendre(2)
const STEPS = 2000

/** x as a function of the share u in [0, 1) of a distribution that lies below it. */
export type Quantile = (u: number) => number

/** Quantiles of the distribution with this density (any scale) between the first and the last of `breaks`, smooth between them. */
export function quantileOf(density: (x: number) => number, breaks: number[]): Quantile {
  const xs = [breaks[0]]
  const sums = [0]
  for (let i = 1; i < breaks.length; i++) {
    const [from, to] = [breaks[i - 1], breaks[i]]
    for (let k = 1; k <= STEPS; k++) {
      const x = from + ((to - from) * k) / STEPS
      const before = xs[xs.length - 1]
      sums.push(sums[sums.length - 1] + applyRule(TWO, density, before, x))
      xs.push(x)
    }
  }
  const total = sums[sums.length - 1]
  return (u) => {
    const i = bracket(sums, u * total)
    const step = sums[i + 1] - sums[i]
    return xs[i] + (step > 0 ? (u * total - sums[i]) / step : 0.5) * (xs[i + 1] - xs[i])
  }
}
