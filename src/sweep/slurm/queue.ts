import { slurm } from './slurm-command.js'
import type { Submission } from './submission.js'

/** A task of a job array, or a job that is none, as Slurm knows it. */
export interface QueueEntry {
  job: string
  /** -1 for a job that is no array. */
  task: number
  name: string
  state: string
  reason: string
}

/** States from which nothing more comes; finished jobs are shown for a while (MinJobAge). */
const ended = [
  'COMPLETED',
  'CANCELLED',
  'FAILED',
  'TIMEOUT',
  'NODE_FAIL',
  'OUT_OF_MEMORY',
  'PREEMPTED',
  'BOOT_FAIL',
  'DEADLINE',
  'REVOKED'
]

/** Reasons for which a waiting job waits for ever unless somebody steps in (the manual page of squeue, "job reason codes"). */
const hopeless = [
  'DependencyNeverSatisfied',
  'PartitionConfig',
  'PartitionTimeLimit',
  'PartitionNodeLimit',
  'BadConstraints',
  'AccountNotAllowed',
  'InvalidAccount',
  'InvalidQOS',
  'QOSNotAllowed',
  'JobHeldUser',
  'JobHeldAdmin'
]

/** What Slurm says of the jobs of some submissions. Throws SlurmError. */
export async function queueOf(submissions: Submission[]): Promise<QueueEntry[]> {
  const names = submissions.flatMap(({ jobs }) => jobs)
  if (names.length === 0) return []
  const words = ['--noheader', '--array', '--states=all', '--format=%F|%K|%j|%T|%r', `--name=${names.join(',')}`]
  return (await slurm('squeue', words))
    .split('\n')
    .filter((line) => line.trim() !== '')
    .map((line) => {
      const [job, task, name, state, reason] = line.trim().split('|')
      return { job, task: /^\d+$/.test(task) ? Number(task) : -1, name, state, reason: reason.replace(/,.*/, '') }
    })
}

/** Waiting, running, or on its way out. */
export function isLive({ state }: QueueEntry): boolean {
  return !ended.includes(state)
}

/** Waiting for what can never come. */
export function isStuck({ state, reason }: QueueEntry): boolean {
  return state === 'PENDING' && hopeless.includes(reason)
}

/** True when nothing in a queue can go on: all that is left waits for what can never come, or for such a job. */
export function isHopeless(queue: QueueEntry[]): boolean {
  const live = queue.filter(isLive)
  const waits = (entry: QueueEntry) => isStuck(entry) || (entry.state === 'PENDING' && entry.reason === 'Dependency')
  return live.some(isStuck) && live.every(waits)
}

/** Ended otherwise than by doing its work. */
export function isLost(entry: QueueEntry): boolean {
  return !isLive(entry) && entry.state !== 'COMPLETED'
}
