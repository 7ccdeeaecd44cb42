import type { ModelResult } from './model-result.js'

/** Where the results of finished models are. A result that is there is never made again. */
export interface ResultStore {
  /** Results of those of the models that are finished. */
  finished(models: Iterable<number>): Map<number, ModelResult>
}
