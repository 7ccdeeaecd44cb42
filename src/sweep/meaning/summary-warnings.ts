import { extent } from '../../math/stats.js'
import type { Sweep } from '../types.js'
import type { Fit } from './likelihood.js'
import type { Marginal } from './marginal.js'
import type { Profile } from './profile.js'

/** A neighbour of the best model this much worse is 2 sigma away: between the two, the likelihood is guessed. */
const COARSE = 4
/** Fewer models than this say too little of a probability. */
const FEW_MODELS = 20
/** Share of the Monte Carlo error in the variance from which on it matters. */
const NOISY = 0.1
/** So many of its own 1 sigma (square root of twice the points) above its mean, chi squared says that no model fits. */
const UNFIT = 4

interface Told {
  name: string
  profile: Profile
  marginal?: Marginal
}

/** Why not to trust what a sweep says of its parameters; `fits` come best first. */
export function summaryWarnings(sweep: Sweep, fits: Fit[], parameters: Told[]): string[] {
  const [best] = fits
  const { chiSquared, degreesOfFreedom } = best
  const unfinished = sweep.models.length - fits.length
  const [fewest, most] = extent(fits.map((fit) => fit.points))
  return [
    ...(unfinished > 0 ? [`${unfinished} of ${sweep.models.length} models are missing from the comparison`] : []),
    ...(fewest < most
      ? [
          `models are compared with ${fewest} to ${most} values, for not all of them cover the same data; those with fewer seem better than they are`
        ]
      : []),
    ...(chiSquared > degreesOfFreedom + UNFIT * Math.sqrt(2 * degreesOfFreedom)
      ? [
          `no model fits: chi-squared is ${chiSquared.toPrecision(3)} for ${Number(degreesOfFreedom.toPrecision(4))} degrees of freedom`
        ]
      : []),
    ...(best.noiseShare > NOISY
      ? [
          `the Monte Carlo error of the best model makes ${(100 * best.noiseShare).toFixed(0)} % of the variance; ask for more precision`
        ]
      : []),
    ...parameters.flatMap((parameter) => ofParameter(sweep, best, parameter))
  ]
}

function ofParameter({ design }: Sweep, best: Fit, { name, profile, marginal }: Told): string[] {
  const { points } = profile
  const numeric = points.length > 1 && points.every(({ value }) => typeof value === 'number')
  if (!numeric) return []
  const at = points.findIndex(({ model }) => model === best.model)
  const end = at === 0 ? 'least' : at === points.length - 1 ? 'greatest' : undefined
  const neighbours = [points[at - 1], points[at + 1]].filter((point) => point !== undefined)
  const coarse = design === 'grid' && neighbours.some(({ deviance }) => deviance > COARSE)
  const few = design !== 'grid' && marginal !== undefined && marginal.effectiveModels < FEW_MODELS
  return [
    ...(end && design === 'grid' ? [`${name}: the best model has the ${end} value; the truth may lie beyond`] : []),
    ...(design !== 'grid' && marginal && isAtEdge(points, marginal)
      ? [`${name}: the probability reaches an end of its range; the truth may lie beyond`]
      : []),
    ...(coarse
      ? [
          `${name}: the grid is too coarse for these data (next to the best, -2 ln L rises by ${neighbours.map(({ deviance }) => deviance.toPrecision(2)).join(' and ')}); intervals are guesses`
        ]
      : []),
    ...(few
      ? [
          `${name}: only about ${marginal!.effectiveModels.toFixed(0)} models carry the probability; more models, or a narrower range, are needed`
        ]
      : [])
  ]
}

function isAtEdge(points: Profile['points'], { low, high }: Marginal): boolean {
  const values = points.map(({ value }) => Number(value))
  const [first, last] = [values[0], values[values.length - 1]]
  const room = 0.05 * (last - first)
  return low - first < room || last - high < room
}
