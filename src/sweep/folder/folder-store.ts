import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { recordName } from '../../run/run-folder.js'
import type { RunRecord } from '../../run/run-record.js'
import { type DataVerdict, type ModelResult, modelResult } from './model-result.js'
import type { ResultStore } from './result-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** How a model agrees with data that need its images, beside its `run.json`. */
export const verdictName = 'verdict.json'

/** Results in a run folder for each model: its `run.json`, which is written last, and its verdict where the data need images. */
export class FolderStore implements ResultStore {
  constructor(private readonly folder: SweepFolder) {}

  finished(models: Iterable<number>): Map<number, ModelResult> {
    const { data } = this.folder.sweep
    const found = new Map<number, ModelResult>()
    for (const model of models) {
      const record = readJson<RunRecord>(join(this.folder.model(model), recordName))
      if (!record || record.state === 'writing') continue
      if (!data?.needsImages) {
        found.set(model, modelResult(model, record))
        continue
      }
      const verdict = readJson<DataVerdict>(join(this.folder.model(model), verdictName))
      if (verdict?.fingerprint === data.fingerprint) found.set(model, modelResult(model, record, verdict))
    }
    return found
  }
}

function readJson<Content>(path: string): Content | undefined {
  try {
    return JSON.parse(readFileSync(path, 'utf8')) as Content
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return undefined
    throw error
  }
}
