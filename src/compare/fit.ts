import { levenbergMarquardt } from 'ml-levenberg-marquardt'
import { inverse, Matrix } from 'ml-matrix'
import { residual, type Values } from './goodness.js'
import { type ComparedSet, inPlace, type Placement } from './sets/compared-set.js'

/** A number that is fitted, for one data set or for several together. */
export interface Parameter {
  key: 'flux' | keyof Placement
  sets: ComparedSet[]
  /** Own value of one set; otherwise of all that have none. */
  shared: boolean
}

export interface Fitted {
  /** One a parameter, with 1 sigma (infinite where the data do not tell). */
  values: number[]
  sigma: number[]
  /** The model of each set, with its factor. */
  models: Values[]
}

const ROUNDS = 24
const STEPS_IN_ROUND = 2
const SETTLED = 1e-3
const TURN_STEP = 0.005
const FLUX_STEP = 0.01

/**
 * Fits the parameters by least squares (Levenberg & Marquardt). The variance of each value is that of the data and of the model's Monte
 * Carlo noise; as the latter changes with the factor, it is held for some steps and then brought up to date, until chi-squared
 * moves by less than a thousandth.
 *
 * The variances of the parameters are the diagonal of the inverse of J^T J (common practice), which takes all noise as independent; as
 * Monte Carlo noise is not, the square of what each parameter does when the whole model of a set moves by its 1 sigma is added.
 */
export function fitScalings(sets: ComparedSet[], parameters: Parameter[]): Fitted {
  const caches = sets.map(lastModels)
  const scales = parameters.map(scaleOf)
  const modelsAt = (scaled: number[]) => sets.map((set, i) => modelOf(set, caches[i], parameters, scaled, scales))
  let best = parameters.map(({ key }) => (key === 'flux' ? 1 / FLUX_STEP : 0))
  let sigmas = errorsOf(sets, modelsAt(best))
  const residualsAt = (scaled: number[]) => residuals(sets, modelsAt(scaled), sigmas)
  if (parameters.length > 0) {
    let before = squares(residualsAt(best))
    const rows = sets.reduce((sum, { data }) => sum + data.values.length, 0)
    const data = { x: Array.from({ length: rows }, (_, i) => i), y: new Float64Array(rows) }
    for (let round = 0; round < ROUNDS; round++) {
      const found = levenbergMarquardt(
        data,
        (scaled) => {
          const all = residualsAt(scaled)
          return (i) => all[i]
        },
        {
          initialValues: best,
          gradientDifference: 1,
          centralDifference: true,
          maxIterations: STEPS_IN_ROUND,
          errorTolerance: 1e-9,
          minValues: parameters.map(({ key }) => (key === 'flux' ? 0 : Number.NEGATIVE_INFINITY)),
          maxValues: parameters.map(() => Number.POSITIVE_INFINITY)
        }
      )
      best = found.parameterValues
      sigmas = errorsOf(sets, modelsAt(best))
      const after = squares(residualsAt(best))
      if (Math.abs(after - before) < SETTLED) break
      before = after
    }
  }
  const models = modelsAt(best)
  const errors = parameters.length > 0 ? parameterErrors(best, residualsAt, noisePulls(sets, models, sigmas)) : []
  return {
    values: best.map((value, i) => value * scales[i]),
    sigma: errors.map((value, i) => value * scales[i]),
    models
  }
}

/** Size of a step of each parameter: so much changes the model visibly, but little. */
function scaleOf({ key, sets }: Parameter): number {
  if (key === 'flux') return FLUX_STEP
  return key === 'rotation' ? TURN_STEP : Math.min(...sets.map(({ step }) => step))
}

type ModelAt = (placement: Placement) => Values

/** Keeps the last models: most steps of a fit move other sets, or change a factor. */
function lastModels(set: ComparedSet): ModelAt {
  const kept = new Map<string, Values>()
  return (placement) => {
    const key = `${placement.east}/${placement.north}/${placement.rotation}`
    const made = kept.get(key) ?? set.model(placement)
    if (!kept.has(key) && kept.size >= 4) kept.delete(kept.keys().next().value!)
    kept.set(key, made)
    return made
  }
}

function modelOf(set: ComparedSet, at: ModelAt, parameters: Parameter[], scaled: number[], scales: number[]): Values {
  const found = scaled.map((value, i) => value * scales[i])
  const { values, sigma } = at(placementOf(set, parameters, found))
  const factor = factorOf(set, parameters, found)
  if (factor === 1) return { values, sigma }
  const times = (value: number) => factor * value
  return { values: Float64Array.from(values, times), sigma: Float64Array.from(sigma, times) }
}

/** The factor of a set. */
export function factorOf(set: ComparedSet, parameters: Parameter[], values: number[]): number {
  const i = parameters.findIndex(({ key, sets }) => key === 'flux' && sets.includes(set))
  return i < 0 ? 1 : values[i]
}

/** How a set is moved by the values of parameters. */
export function placementOf(set: ComparedSet, parameters: Parameter[], values: number[]): Placement {
  const placement = { ...inPlace }
  parameters.forEach(({ key, sets }, i) => {
    if (key !== 'flux' && sets.includes(set)) placement[key] = values[i]
  })
  return placement
}

/** 1 sigma of data and model together. */
function errorsOf(sets: ComparedSet[], models: Values[]): Float64Array[] {
  return sets.map(({ data }, i) => Float64Array.from(data.sigma, (value, k) => Math.hypot(value, models[i].sigma[k])))
}

/** Residuals of all sets; those with correlated errors count as the independent values that they are worth. */
function residuals(sets: ComparedSet[], models: Values[], sigmas: Float64Array[]): Float64Array {
  const all = new Float64Array(sets.reduce((sum, { data }) => sum + data.values.length, 0))
  let at = 0
  sets.forEach(({ data, independent }, i) => {
    const weight = Math.sqrt(independent)
    for (let k = 0; k < data.values.length; k++, at++)
      all[at] = weight * residual(data.values[k], models[i].values[k], sigmas[i][k], data.limit?.[k] === 1)
  })
  return all
}

const squares = (values: Float64Array) => values.reduce((sum, value) => sum + value * value, 0)

/** For each set, what its residuals do when its whole model moves by 1 sigma of its Monte Carlo noise; 0 for all others. */
function noisePulls(sets: ComparedSet[], models: Values[], sigmas: Float64Array[]): Float64Array[] {
  const count = sets.reduce((sum, { data }) => sum + data.values.length, 0)
  let at = 0
  return sets.map(({ independent }, i) => {
    const pulls = new Float64Array(count)
    for (let k = 0; k < sigmas[i].length; k++, at++) pulls[at] = Math.sqrt(independent) * (models[i].sigma[k] / sigmas[i][k])
    return pulls
  })
}

function parameterErrors(best: number[], residualsAt: (scaled: number[]) => Float64Array, pulls: Float64Array[]): number[] {
  const slopes = best.map((_, i) => {
    const beside = (step: number) => residualsAt(best.map((value, k) => (k === i ? value + step : value)))
    const [above, below] = [beside(1), beside(-1)]
    return above.map((value, k) => 0.5 * (value - below[k]))
  })
  const dot = (a: Float64Array, b: Float64Array) => a.reduce((sum, value, k) => sum + value * b[k], 0)
  try {
    const covariance = inverse(new Matrix(slopes.map((a) => slopes.map((b) => dot(a, b)))))
    const answers = pulls.map((pull) => covariance.mmul(Matrix.columnVector(slopes.map((slope) => dot(slope, pull)))))
    return covariance.diagonal().map((variance, i) => {
      const all = variance + answers.reduce((sum, answer) => sum + answer.get(i, 0) ** 2, 0)
      return variance > 0 ? Math.sqrt(all) : Number.POSITIVE_INFINITY
    })
  } catch {
    return best.map(() => Number.POSITIVE_INFINITY)
  }
}
