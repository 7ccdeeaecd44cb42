import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { recordName } from '../../run/run-folder.js'
import type { RunRecord } from '../../run/run-record.js'
import { type Seen, seenAs } from '../data/see-model.js'
import { type ModelResult, modelResult } from './model-result.js'
import type { ResultStore } from './result-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** What is made of the images of a model, beside its `run.json`. */
export const seenName = 'seen.json'

/** Results in a run folder for each model: its `run.json`, which is written last, and then `seen.json` where that is asked for. */
export class FolderStore implements ResultStore {
  constructor(private readonly folder: SweepFolder) {}

  finished(models: Iterable<number>): Map<number, ModelResult> {
    const asked = seenAs(this.folder.sweep)
    const found = new Map<number, ModelResult>()
    for (const model of models) {
      const record = readJson<RunRecord>(join(this.folder.model(model), recordName))
      if (!record || record.state === 'writing') continue
      const seen = asked ? readJson<Seen>(join(this.folder.model(model), seenName)) : undefined
      if (seen?.fingerprint === asked) found.set(model, modelResult(model, record, seen))
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
