import { parabolicBlend } from '../../math/parabolic-blend.js'
import type { Sweep } from '../types.js'
import type { Fit } from './likelihood.js'
import { coordinate } from './marginal.js'

/** The least deviance that any model reaches with each value of a parameter. */
export interface Profile {
  points: { value: number | string; deviance: number; model: number }[]
  /**
   * Where the deviance stays within 1 of its least: 68 % for one parameter (Wilks 1938); absent off a grid, for text, and where the
   * grid is so coarse that the curve between its points means nothing.
   */
  low?: number
  high?: number
  /** The smooth curve through the points that the interval was read from. */
  curve?: { value: number; deviance: number }[]
}

/** With neighbours 4 sigma apart, the best of a grid may lie so far above the least of the curve. */
const DEEPEST = 4
/** Points at which an interpolated profile is looked at. */
const FINE = 2000
/** Of these, kept to be drawn. */
const DRAWN = 200

/** The likelihood profile of a parameter; `fits` come best first. */
export function profileOf({ design, parameters, models }: Sweep, fits: Fit[], parameter: number): Profile {
  const { kind, log } = parameters[parameter]
  const best = new Map<number | string, Profile['points'][number]>()
  for (const { model, deviance } of fits) {
    const value = models[model - 1][parameter]
    if (!best.has(value)) best.set(value, { value, deviance, model })
  }
  const points = [...best.values()]
  if (kind === 'text') return { points }
  points.sort((a, b) => Number(a.value) - Number(b.value))
  if (design !== 'grid' || points.length < 3) return { points }
  const places = points.map(({ value }) => coordinate(Number(value), log))
  const curve = parabolicBlend(
    places,
    points.map(({ deviance }) => deviance)
  )
  const [first, last] = [places[0], places[places.length - 1]]
  const fine = Array.from({ length: FINE + 1 }, (_, i) => first + ((last - first) * i) / FINE)
  const heights = fine.map(curve)
  const least = heights.reduce((a, b) => Math.min(a, b))
  if (least < -DEEPEST) return { points }
  const within = fine.filter((_, i) => heights[i] <= least + 1)
  const back = (place: number) => (log ? Math.exp(place) : place)
  return {
    points,
    low: back(within[0]),
    high: back(within[within.length - 1]),
    curve: fine.flatMap((place, i) => (i % (FINE / DRAWN) === 0 ? [{ value: back(place), deviance: heights[i] }] : []))
  }
}

/** For two parameters: the least deviance with each pair of their values. */
export function pairProfile({ models }: Sweep, fits: Fit[], one: number, other: number) {
  const best = new Map<string, { values: [number | string, number | string]; deviance: number }>()
  for (const { model, deviance } of fits) {
    const values: [number | string, number | string] = [models[model - 1][one], models[model - 1][other]]
    const key = values.join('|')
    if (!best.has(key)) best.set(key, { values, deviance })
  }
  return [...best.values()]
}
