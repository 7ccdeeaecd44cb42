import { FolderStore } from './folder-store.js'
import { isPacked } from './is-packed.js'
import type { ModelResult } from './model-result.js'
import { PackStore } from './pack-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** Where the results of finished models are. A result that is there is never made again. */
export interface ResultStore {
  /** Results of those of the models that are finished. */
  finished(models: Iterable<number>): Map<number, ModelResult>
}

export function resultStore(folder: SweepFolder): ResultStore {
  return isPacked(folder.sweep) ? new PackStore(folder) : new FolderStore(folder)
}
