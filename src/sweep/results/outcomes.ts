import { compareModel } from '../../compare/compare-run.js'
import type { DataList } from '../../compare/types.js'
import { type Verdict, verdictOf } from '../../compare/verdict.js'
import { lightOfResult } from '../data/model-lights.js'
import { dataOf } from '../data/sources.js'
import type { ModelFailure } from '../folder/failures.js'
import type { ModelResult } from '../folder/model-result.js'
import type { Sweep } from '../types.js'

/** Everything that is known of the models of a sweep. */
export interface Outcomes {
  results: Map<number, ModelResult>
  failures: Map<number, ModelFailure>
}

/** The same with how each finished model agrees with the data, if there are any. */
export interface Judged extends Outcomes {
  verdicts: Map<number, Verdict>
}

/** Tells how many of the models were compared. */
type OnCompared = (done: number, of: number) => void

/** How each finished model agrees with the data; those that need images were compared when they were made. */
export function judged({ data }: Sweep, outcomes: Outcomes, onProgress?: OnCompared): Judged {
  const { results } = outcomes
  if (data && !data.needsImages) return { ...outcomes, verdicts: compareFluxes(results, dataOf(data), onProgress) }
  const made = [...results].flatMap(([model, { seen }]): [number, Verdict][] => (seen?.verdict ? [[model, seen.verdict]] : []))
  return { ...outcomes, verdicts: new Map(made) }
}

/** Compares models with measured fluxes. */
export function compareFluxes(
  results: Map<number, ModelResult>,
  list: DataList,
  onProgress: OnCompared = () => {}
): Map<number, Verdict> {
  const verdicts = new Map<number, Verdict>()
  for (const [model, result] of results) {
    verdicts.set(model, verdictOf(compareModel(lightOfResult(result), list)))
    onProgress(verdicts.size, results.size)
  }
  return verdicts
}
