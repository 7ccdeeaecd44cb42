import { setTimeout } from 'node:timers/promises'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { isLive, queueOf } from './queue.js'
import { SlurmError, slurm } from './slurm-command.js'
import { readSubmissions, type Submission } from './submission.js'

/** Tasks get a while to write their state before Slurm ends them (KillWait, 30 s unless set); then they must be gone. */
const PATIENCE = 120

/** Cancels what is left of some submissions: the jobs that Slurm has under their names now. Their number. Throws SlurmError. */
export async function takeBack(submissions: Submission[]): Promise<number> {
  const jobs = [...new Set((await queueOf(submissions)).filter(isLive).map(({ job }) => job))]
  if (jobs.length > 0) await slurm('scancel', jobs)
  return jobs.length
}

/** Takes all jobs of a sweep back, and waits until they are gone. Their number. Throws SlurmError. */
export async function cancelJobs(folder: SweepFolder): Promise<number> {
  const submissions = readSubmissions(folder)
  const count = await takeBack(submissions)
  for (let waited = 0; waited < PATIENCE; waited++) {
    if (!(await queueOf(submissions)).some(isLive)) return count
    await setTimeout(1000)
  }
  throw new SlurmError(`jobs of this sweep are still there ${PATIENCE} s after they were cancelled`)
}
