import type { Outcomes } from '../results/outcomes.js'
import { readFailures } from './failures.js'
import { openResults } from './open-results.js'
import type { SweepFolder } from './sweep-folder.js'

/** What the folder of a sweep tells of its models. */
export function outcomesOf(folder: SweepFolder): Outcomes {
  const numbers = folder.sweep.models.map((_, i) => i + 1)
  return { results: openResults(folder).finished(numbers), failures: readFailures(folder) }
}

/** Numbers of the models that are neither finished nor given up. */
export function openModels({ sweep }: SweepFolder, { results, failures }: Outcomes): number[] {
  return sweep.models.map((_, i) => i + 1).filter((model) => !results.has(model) && !failures.has(model))
}
