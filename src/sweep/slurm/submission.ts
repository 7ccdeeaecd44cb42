import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { writeAtomic } from '../../output/atomic.js'
import type { SweepFolder } from '../folder/sweep-folder.js'

/** What one call has given to Slurm. It is written down before anything is submitted. */
export interface Submission {
  /** Counted from 1. */
  serial: number
  /** Names of jobs that no other submission has; jobs are asked for by them, for numbers may be given twice. */
  jobs: string[]
  /** Models that lead shared dust, one a task. */
  dust: number[]
  /** Models, several a task. */
  models: number[][]
  /** Parts that every model is cut into, one a task; 0: none is. */
  parts: number
}

/** Where a submission is written down. */
export function submissionFile(folder: SweepFolder, serial: number): string {
  return join(folder.slurm, `submission-${serial}.json`)
}

/** All submissions of a sweep, in their order. */
export function readSubmissions(folder: SweepFolder): Submission[] {
  if (!existsSync(folder.slurm)) return []
  return readdirSync(folder.slurm)
    .flatMap((name) => /^submission-(\d+)\.json$/.exec(name)?.[1] ?? [])
    .map(Number)
    .sort((a, b) => a - b)
    .map((serial) => readSubmission(folder, serial))
}

export function readSubmission(folder: SweepFolder, serial: number): Submission {
  return JSON.parse(readFileSync(submissionFile(folder, serial), 'utf8')) as Submission
}

export function writeSubmission(folder: SweepFolder, submission: Submission): Promise<void> {
  return writeAtomic(submissionFile(folder, submission.serial), `${JSON.stringify(submission)}\n`)
}
