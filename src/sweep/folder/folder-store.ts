import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { recordName } from '../../run/run-folder.js'
import type { RunRecord } from '../../run/run-record.js'
import { type ModelResult, modelResult } from './model-result.js'
import type { ResultStore } from './result-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** Results in a run folder for each model: its `run.json`, which is written last. */
export class FolderStore implements ResultStore {
  constructor(private readonly folder: SweepFolder) {}

  finished(models: Iterable<number>): Map<number, ModelResult> {
    const found = new Map<number, ModelResult>()
    for (const model of models) {
      const record = readRecord(join(this.folder.model(model), recordName))
      if (record && record.state !== 'writing') found.set(model, modelResult(model, record))
    }
    return found
  }
}

function readRecord(path: string): RunRecord | undefined {
  try {
    return JSON.parse(readFileSync(path, 'utf8')) as RunRecord
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined
    throw error
  }
}
