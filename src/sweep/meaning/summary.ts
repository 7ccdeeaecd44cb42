import type { Value } from '../plan/value.js'
import type { Judged } from '../results/outcomes.js'
import type { Sweep } from '../types.js'
import { type Fit, rankedFits } from './likelihood.js'
import { type Marginal, marginalOf } from './marginal.js'
import { type Profile, pairProfile, profileOf } from './profile.js'
import { summaryWarnings } from './summary-warnings.js'

/** What the data say about the parameters of a sweep. */
export interface Summary {
  title: string
  /** Models that could be compared with the data, and measured values. */
  compared: number
  points: number
  /** The best models, with their values in the order of `parameters`. */
  best: (Fit & { values: Value[] })[]
  /** Parameters that vary, neither those tied to them nor those of a single value. */
  parameters: { name: string; unit: string; profile: Profile; marginal?: Marginal }[]
  pairs: { names: [string, string]; points: ReturnType<typeof pairProfile> }[]
  warnings: string[]
}

/** Models told of in full. */
const BEST = 5

/** Sums up a sweep; undefined without data, or without a model that was compared with them. */
export function summarize(sweep: Sweep, judged: Judged): Summary | undefined {
  const fits = rankedFits(judged)
  if (fits.length === 0) return undefined
  const isVaried = (p: number) =>
    sweep.parameters[p].role === 'varied' && sweep.models.some((values) => values[p] !== sweep.models[0][p])
  const varied = [...sweep.parameters.keys()].filter(isVaried)
  const parameters = varied.map((p) => {
    const { name, unit } = sweep.parameters[p]
    const marginal = marginalOf(sweep, fits, p)
    return { name, unit, profile: profileOf(sweep, fits, p), ...(marginal && { marginal }) }
  })
  return {
    title: sweep.title,
    compared: fits.length,
    points: fits[0].points,
    best: fits.slice(0, BEST).map((fit) => ({ ...fit, values: sweep.models[fit.model - 1] })),
    parameters,
    pairs: varied.flatMap((one, i) =>
      varied.slice(i + 1).map((other) => ({
        names: [sweep.parameters[one].name, sweep.parameters[other].name] as [string, string],
        points: pairProfile(sweep, fits, one, other)
      }))
    ),
    warnings: summaryWarnings(sweep, fits, parameters)
  }
}
