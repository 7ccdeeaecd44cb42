import { parabolicBlend } from '../../math/parabolic-blend.js'
import type { Sweep } from '../types.js'
import type { Fit } from './likelihood.js'

/** What the data say about one parameter when nothing is known of the others: quantiles of its probability. */
export interface Marginal {
  /** 16 %, 50 % and 84 %: the middle of the 68 % credible interval, and its ends. */
  low: number
  middle: number
  high: number
  /** Models that carry the probability: 1 / sum of the squares of their shares. */
  effectiveModels: number
  /** The probability against the parameter, per unit of it, or of its natural logarithm. */
  curve: { value: number; density: number }[]
}

const QUANTILES = [0.1587, 0.5, 0.8413]
/** Points of a curve. */
const FINE = 400
/** Bars of the histogram of a design without a grid. */
const BARS = 24

/**
 * The marginal probability of a parameter for flat priors, in its logarithm where it is spaced so: on a grid by the trapezium rule
 * over the other axes, with the logarithm of the probability smooth between the values; otherwise the models are the sample.
 * Undefined for designs that do not cover the space, and for text.
 */
export function marginalOf(sweep: Sweep, fits: Fit[], parameter: number): Marginal | undefined {
  const { design, parameters, models } = sweep
  if (design === 'table' || parameters[parameter].kind === 'text' || fits.length === 0) return undefined
  const shares = design === 'grid' ? gridShares(sweep, fits) : fits.map(({ deviance }) => Math.exp(-deviance / 2))
  const total = shares.reduce((sum, share) => sum + share, 0)
  const effectiveModels = total ** 2 / shares.reduce((sum, share) => sum + share ** 2, 0)
  const { log } = parameters[parameter]
  const places = fits.map(({ model }) => coordinate(Number(models[model - 1][parameter]), log))
  const distinct = [...new Set(places)].sort((a, b) => a - b)
  if (distinct.length < 2) return undefined
  const back = (place: number) => (log ? Math.exp(place) : place)
  const quantilesAndCurve = design === 'grid' ? ofGrid() : ofSample()
  const [low, middle, high] = quantilesAndCurve.quantiles.map(back)
  return {
    low,
    middle,
    high,
    effectiveModels,
    curve: quantilesAndCurve.curve.map(([place, density]) => ({ value: back(place), density }))
  }

  function ofGrid() {
    const widths = trapezium(distinct)
    const logs = distinct.map((place, i) => {
      const sum = shares.reduce((all, share, f) => (places[f] === place ? all + share : all), 0)
      return Math.log(Math.max(sum / widths[i] / total, Number.MIN_VALUE))
    })
    const curve = parabolicBlend(distinct, logs)
    const [first, last] = [distinct[0], distinct[distinct.length - 1]]
    const fine = Array.from({ length: FINE + 1 }, (_, i) => first + ((last - first) * i) / FINE)
    // A parabola between steep neighbours must not rise above both by more than it would for a normal law.
    const density = fine.map((place) => Math.exp(curve(place)))
    const cumulative = [0]
    for (let i = 1; i < fine.length; i++) cumulative.push(cumulative[i - 1] + 0.5 * (density[i] + density[i - 1]))
    const whole = cumulative[FINE]
    const step = (last - first) / FINE
    return {
      quantiles: QUANTILES.map((share) => interpolate(cumulative, fine, share * whole)),
      curve: fine.map((place, i): [number, number] => [place, density[i] / (whole * step)])
    }
  }

  function ofSample() {
    const order = places.map((_, i) => i).sort((a, b) => places[a] - places[b])
    let sum = 0
    const cumulative = order.map((i) => {
      sum += shares[i]
      return (sum - 0.5 * shares[i]) / total
    })
    const sorted = order.map((i) => places[i])
    const [first, last] = [distinct[0], distinct[distinct.length - 1]]
    const bars = new Float64Array(BARS)
    places.forEach((place, i) => {
      bars[Math.min(BARS - 1, Math.floor((BARS * (place - first)) / (last - first)))] += shares[i] / total
    })
    return {
      quantiles: QUANTILES.map((share) => interpolate(cumulative, sorted, share)),
      curve: Array.from(bars, (share, i): [number, number] => [
        first + ((i + 0.5) * (last - first)) / BARS,
        (share * BARS) / (last - first)
      ])
    }
  }
}

/** Where a value stands on its axis. */
export function coordinate(value: number, log: boolean): number {
  return log ? Math.log(value) : value
}

/** Likelihood of each model times the volume that it stands for on the grid. */
function gridShares({ parameters, models }: Sweep, fits: Fit[]): number[] {
  const widths = parameters.map(({ kind, role, log }, p) => {
    if (kind === 'text' || role === 'tied') return new Map<number, number>()
    const places = [...new Set(models.map((values) => coordinate(Number(values[p]), log)))].sort((a, b) => a - b)
    const own = places.length > 1 ? trapezium(places) : [1]
    return new Map(places.map((place, i) => [place, own[i]]))
  })
  return fits.map(({ model, deviance }) =>
    parameters.reduce(
      (share, { log }, p) => share * (widths[p].get(coordinate(Number(models[model - 1][p]), log)) ?? 1),
      Math.exp(-deviance / 2)
    )
  )
}

/** Weights of the trapezium rule. */
function trapezium(places: number[]): number[] {
  const last = places.length - 1
  return places.map((place, i) => 0.5 * ((places[Math.min(i + 1, last)] ?? place) - (places[Math.max(i - 1, 0)] ?? place)))
}

/** y at a value of increasing x, linear between. */
function interpolate(x: number[], y: number[], at: number): number {
  if (at <= x[0]) return y[0]
  const i = x.findIndex((value) => value >= at)
  if (i < 0) return y[y.length - 1]
  return y[i - 1] + ((y[i] - y[i - 1]) * (at - x[i - 1])) / (x[i] - x[i - 1])
}
