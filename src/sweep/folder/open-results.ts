import { FolderStore } from './folder-store.js'
import { isPacked } from './is-packed.js'
import { PackStore } from './pack-store.js'
import type { ResultStore } from './result-store.js'
import type { SweepFolder } from './sweep-folder.js'

export function openResults(folder: SweepFolder): ResultStore {
  return isPacked(folder.sweep) ? new PackStore(folder) : new FolderStore(folder)
}
