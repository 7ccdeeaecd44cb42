import type { Sweep } from '../types.js'
import { FolderStore } from './folder-store.js'
import type { ModelResult } from './model-result.js'
import { PackStore } from './pack-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** Where the results of finished models are. A result that is there is never made again. */
export interface ResultStore {
  /** Results of those of the models that are finished. */
  finished(models: Iterable<number>): Map<number, ModelResult>
}

/** A sweep of more models than this packs its results, and keeps no folder for each model. */
export const mostModelFolders = 5000

export function isPacked({ models }: Pick<Sweep, 'models'>): boolean {
  return models.length > mostModelFolders
}

export function resultStore(folder: SweepFolder): ResultStore {
  return isPacked(folder.sweep) ? new PackStore(folder) : new FolderStore(folder)
}
