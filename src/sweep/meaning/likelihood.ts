import { compareWith } from '../results/chi-squared.js'
import type { Outcomes } from '../results/sweep-table.js'
import type { Sweep } from '../types.js'

/** How well a model agrees with all data. */
export interface Fit {
  model: number
  chiSquared: number
  /** -2 ln(L / L of the best model). */
  deviance: number
  /** Share of the Monte Carlo error in the variance, the largest of all data sets. */
  noiseShare: number
}

/** All finished models that can be compared with all data, the best first. */
export function rankedFits({ data }: Sweep, { results }: Outcomes): Fit[] {
  const fits = [...results].map(([model, result]): Fit => {
    const all = data.map((set) => compareWith(set, result))
    const sum = (of: (one: (typeof all)[number]) => number) => all.reduce((total, one) => total + of(one), 0)
    return {
      model,
      chiSquared: sum(({ chiSquared }) => chiSquared),
      deviance: sum(({ deviance }) => deviance),
      noiseShare: all.reduce((most, { noiseShare }) => Math.max(most, noiseShare), 0)
    }
  })
  const sound = fits.filter(({ deviance }) => Number.isFinite(deviance))
  const least = sound.reduce((a, { deviance }) => Math.min(a, deviance), Number.POSITIVE_INFINITY)
  return sound
    .map((fit) => ({ ...fit, deviance: fit.deviance - least }))
    .sort((a, b) => a.deviance - b.deviance || a.model - b.model)
}
