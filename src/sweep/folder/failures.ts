import { readdirSync, readFileSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { writeOutput } from '../../run/output-error.js'
import type { SweepFolder } from './sweep-folder.js'

/** Why a model was given up. */
export interface ModelFailure {
  model: number
  message: string
}

/** All models given up, by number. */
export function readFailures({ path }: SweepFolder): Map<number, ModelFailure> {
  const folder = join(path, 'failures')
  const found = new Map<number, ModelFailure>()
  for (const name of filesOf(folder)) {
    if (!/^\d+\.json$/.test(name)) continue
    const failure = JSON.parse(readFileSync(join(folder, name), 'utf8')) as ModelFailure
    found.set(failure.model, failure)
  }
  return found
}

/** Throws OutputError. */
export function noteFailure(folder: SweepFolder, failure: ModelFailure): Promise<void> {
  return writeOutput(folder.failure(failure.model), `${JSON.stringify(failure)}\n`)
}

/** Forgets that models were given up, so that they are made again. */
export function forgetFailures({ path }: SweepFolder): Promise<void> {
  return rm(join(path, 'failures'), { recursive: true, force: true })
}

function filesOf(folder: string): string[] {
  try {
    return readdirSync(folder).sort()
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') return []
    throw error
  }
}
