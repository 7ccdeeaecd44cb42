import { fileURLToPath } from 'node:url'
import { outcomesOf } from '../sweep/folder/outcomes-of.js'
import type { SweepFolder } from '../sweep/folder/sweep-folder.js'
import { readSlurmSettings } from '../sweep/plan/slurm-settings.js'
import { judged } from '../sweep/results/outcomes.js'
import { writeTables } from '../sweep/results/write-tables.js'
import { cancelJobs } from '../sweep/slurm/cancel.js'
import { isLive, type QueueEntry, queueOf } from '../sweep/slurm/queue.js'
import { runTask, type TaskKind } from '../sweep/slurm/run-task.js'
import { SlurmError } from '../sweep/slurm/slurm-command.js'
import { readSubmissions } from '../sweep/slurm/submission.js'
import { submit } from '../sweep/slurm/submit.js'
import { waitForJobs } from '../sweep/slurm/wait.js'
import { exitCode } from './exit-code.js'
import { UsageError } from './failure.js'
import { startLine } from './status-line.js'
import { stopSignal } from './stop-signal.js'
import { queueText } from './sweep-text.js'

/** Options of `sweep` that have to do with Slurm. */
export const slurmOptions = {
  on: { describe: 'Where the models are made, when not here', choices: ['slurm'], requiresArg: true },
  slurm: {
    describe: 'How to ask Slurm, instead of the plan, such as `partition=long time=2:00:00 cores=4`',
    type: 'string',
    array: true,
    requiresArg: true,
    default: [] as string[]
  },
  status: { describe: 'Only tell how the sweep and its jobs stand', type: 'boolean', default: false },
  wait: { describe: 'Wait until the jobs of the sweep have ended', type: 'boolean', default: false },
  cancel: { describe: 'Take back the jobs of the sweep; what they did is kept', type: 'boolean', default: false },
  // Jobs call the program with these two.
  task: { type: 'string', hidden: true, requiresArg: true },
  cores: { type: 'number', hidden: true, requiresArg: true, default: 1 }
} as const

/** What `sweep` does with Slurm. */
export const slurmActions = {
  queue: (folder: SweepFolder): Promise<QueueEntry[]> => queueOf(readSubmissions(folder)),

  cancel: async (folder: SweepFolder): Promise<QueueEntry[]> => {
    await cancelJobs(folder)
    return queueOf(readSubmissions(folder))
  },

  wait: async (folder: SweepFolder, quiet: boolean): Promise<QueueEntry[]> => {
    const signal = stopSignal()
    const line = startLine(process.stderr, quiet)
    signal.arm()
    try {
      return await waitForJobs(folder, (queue) => line.show(queueText(queue)), signal.stop)
    } finally {
      line.clear()
      signal.release()
    }
  },

  submit: async (folder: SweepFolder, models: number[], words: { slurm: string[]; plan: string }): Promise<QueueEntry[]> => {
    const settings = readSlurmSettings(folder.sweep.slurm, words.slurm)
    if ('problem' in settings) throw new UsageError(`--slurm: ${settings.problem}`)
    const program = fileURLToPath(new URL('./main.js', import.meta.url))
    const command = [
      process.execPath,
      program,
      'sweep',
      folder.sweep.plan,
      '--out',
      folder.path,
      '--cores',
      String(settings.cores)
    ]
    await submit(folder, models, settings, command)
    return queueOf(readSubmissions(folder))
  },

  /** Throws SlurmError while jobs may be at work on the models. */
  refuseWhileQueued: async (folder: SweepFolder): Promise<void> => {
    try {
      if (!(await queueOf(readSubmissions(folder))).some(isLive)) return
    } catch (error) {
      // A copy of the folder on a machine without Slurm: nobody can be at work on it.
      if (error instanceof SlurmError && !error.present) return
      throw error
    }
    throw new SlurmError('jobs of this sweep are in the queue of Slurm; --wait waits for them, --cancel takes them back')
  },

  /** What a task of a job does. */
  task: async (folder: SweepFolder, task: string, cores: number): Promise<void> => {
    const [serial, kind, first] = task.split('/')
    if (kind === 'table') return writeTables(folder, judged(folder.sweep, outcomesOf(folder)))
    const index = Number(first) + Number(process.env.SLURM_ARRAY_TASK_ID)
    const megabytes = Number(process.env.SLURM_MEM_PER_NODE)
    const signal = stopSignal()
    signal.arm()
    const outcome = await runTask(
      folder,
      { serial: Number(serial), kind: kind as TaskKind, index },
      { workers: cores, stop: signal.stop, onProgress: () => {}, ...(megabytes > 0 && { memory: megabytes * 1024 ** 2 }) }
    )
    signal.release()
    if (outcome === 'stopped') process.exitCode = exitCode.stopped
  }
}
