import type { Judged } from '../results/outcomes.js'

/** How well a model agrees with all data. */
export interface Fit {
  model: number
  chiSquared: number
  degreesOfFreedom: number
  /** Measured values that it was compared with. */
  points: number
  /** -2 ln(L / L of the best model). */
  deviance: number
  /** Share of the Monte Carlo error in the variance, the largest of all data sets. */
  noiseShare: number
}

/** All models that were compared with all data, the best first. */
export function rankedFits({ verdicts }: Pick<Judged, 'verdicts'>): Fit[] {
  const fits = [...verdicts].map(
    ([model, { sets, all }]): Fit => ({
      model,
      chiSquared: all.chiSquared,
      degreesOfFreedom: all.degreesOfFreedom,
      points: sets.reduce((sum, set) => sum + set.values, 0),
      deviance: sets.reduce((sum, set) => sum + set.deviance, 0),
      noiseShare: sets.reduce((most, set) => Math.max(most, set.noiseShare), 0)
    })
  )
  const sound = fits.filter(({ deviance }) => Number.isFinite(deviance))
  const least = sound.reduce((a, { deviance }) => Math.min(a, deviance), Number.POSITIVE_INFINITY)
  return sound
    .map((fit) => ({ ...fit, deviance: fit.deviance - least }))
    .sort((a, b) => a.deviance - b.deviance || a.model - b.model)
}
