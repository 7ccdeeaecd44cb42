import { OutputError } from '../../run/output-error.js'
import { Stopped } from '../../run/progress.js'
import { Interrupted } from '../../run/run-in-folder.js'
import { PartError } from '../../run/run-part.js'
import { SceneError } from '../../scene/error.js'
import { noteFailure } from '../folder/failures.js'
import { openResults } from '../folder/open-results.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import type { Job } from './job.js'
import { hasDust, makeDust } from './make-dust.js'
import { type ModelOptions, makeModel } from './make-model.js'
import { makeStep } from './make-step.js'

/** What became of a job; a failure is on disk, and holds up nothing else. */
export type Outcome = 'done' | 'failed' | 'stopped'

/**
 * Does a job. Throws OutputError when the folder cannot be written, for that is nothing that one model is to blame for, and PartError when
 * steps of a model are missing.
 */
export async function attempt(folder: SweepFolder, job: Job, options: ModelOptions): Promise<Outcome> {
  for (let again = false; ; again = true) {
    try {
      if (job.kind === 'dust') await makeDust(folder, job.lead, job.members, options)
      else if (job.kind === 'model') await makeModel(folder, job.model, job.group, options)
      else await makeStep(folder, job, options)
      return 'done'
    } catch (thrown) {
      const error = thrown instanceof Interrupted ? thrown.cause : thrown
      if (error instanceof Stopped || options.stop?.aborted) return 'stopped'
      // Another process may have done the same, such as one on a node that Slurm took for lost, and tidied up.
      if (isDone(folder, job)) return 'done'
      // A step before this one was not done: it can be made up for.
      if (error instanceof PartError) throw error
      if (error instanceof OutputError) {
        if (again || (error.cause as NodeJS.ErrnoException | undefined)?.code !== 'ENOENT') throw error
        continue
      }
      await noteFailures(folder, job, reasonOf(error as Error))
      return 'failed'
    }
  }
}

/** A scene of a model has no file, so places in it mean nothing. */
function reasonOf(error: Error): string {
  if (!(error instanceof SceneError)) return error.message
  return error.problems.map(({ key, message }) => `${key}: ${message}`).join('; ')
}

function isDone(folder: SweepFolder, job: Job): boolean {
  return job.kind === 'dust' ? hasDust(folder, job.lead) : openResults(folder).finished([job.model]).has(job.model)
}

/** A model is given up; without its dust, each of a group. */
export async function noteFailures(folder: SweepFolder, job: Job, message: string): Promise<void> {
  if (job.kind !== 'dust') return noteFailure(folder, { model: job.model, message })
  const open = openResults(folder).finished(job.members)
  for (const model of job.members)
    if (!open.has(model))
      await noteFailure(folder, { model, message: `dust temperatures, shared with model ${job.lead}: ${message}` })
}
