import { mkdirSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { writeAtomic } from '../../output/atomic.js'
import { PartError, requireParts } from '../../run/run-part.js'
import { isPacked } from '../folder/is-packed.js'
import { type SweepFolder, sweepId } from '../folder/sweep-folder.js'
import { modelScene } from '../plan/model-scene.js'
import type { SlurmSettings } from '../plan/plan-schema.js'
import { jobsFor } from '../players/job.js'
import { takeBack } from './cancel.js'
import { isLive, queueOf } from './queue.js'
import type { TaskKind } from './run-task.js'
import { SlurmError, slurm } from './slurm-command.js'
import { readSubmissions, type Submission, submissionFile, writeSubmission } from './submission.js'
import { taskScript } from './task-script.js'

/** About so many tasks are made of a sweep when the plan does not say how many models one does. */
const USUAL_TASKS = 1000

type Kind = TaskKind | 'table'

/** What has to have ended, well or not, before a job of a kind begins. */
const earlier: Record<Kind, Kind[]> = {
  dust: [],
  models: ['dust'],
  heat: ['dust'],
  parts: ['heat'],
  join: ['parts'],
  table: ['dust', 'models', 'join']
}

/** A job to be submitted: its tasks are `first` to `first + count - 1` of the kind. */
interface Batch {
  name: string
  kind: Kind
  first: number
  count: number
}

/**
 * Submits models as job arrays, shared dust before them and the table after them. They are held until Slurm has taken all of them;
 * when it refuses one, the others are taken back. Throws SlurmError, or PartError.
 */
export async function submit(
  folder: SweepFolder,
  models: number[],
  settings: SlurmSettings,
  command: string[]
): Promise<Submission> {
  const before = readSubmissions(folder)
  if ((await queueOf(before)).some(isLive))
    throw new SlurmError('jobs of this sweep are in the queue already; --wait waits for them, --cancel takes them back')
  const most = await mostTasks()
  const parts = settings.parts ?? 0
  if (parts > 0) requireDivisible(folder, models, parts)
  const size = parts > 0 ? 1 : (settings['models-a-task'] ?? Math.ceil(models.length / USUAL_TASKS))
  const tasks = Array.from({ length: Math.ceil(models.length / size) }, (_, i) => models.slice(i * size, (i + 1) * size))
  const dust = jobsFor(folder, models).dust.map(({ lead }) => lead)
  const serial = 1 + Math.max(0, ...before.map((submission) => submission.serial))
  const prefix = `motelight-${sweepId(folder.sweep)}-${Date.now().toString(36)}`
  const batches: Batch[] = [
    ...arrays('dust', dust.length, most),
    ...(parts > 0
      ? [
          ...arrays('heat', tasks.length, most),
          ...arrays('parts', tasks.length * parts, most),
          ...arrays('join', tasks.length, most)
        ]
      : arrays('models', tasks.length, most)),
    { kind: 'table', first: 0, count: 1 } as const
  ].map((batch, i) => ({ ...batch, name: `${prefix}-${i}` }))
  const submission = { serial, jobs: batches.map(({ name }) => name), dust, models: tasks, parts }
  mkdirSync(join(folder.slurm, 'logs'), { recursive: true })
  await writeSubmission(folder, submission)
  const accepted: { batch: Batch; id: string }[] = []
  try {
    for (const batch of batches) {
      const kinds = earlier[batch.kind]
      const after = accepted.filter((other) => kinds.includes(other.batch.kind)).map(({ id }) => id)
      accepted.push({ batch, id: await submitBatch(folder, serial, batch, after, settings, command) })
    }
    await slurm('scontrol', ['release', ...accepted.map(({ id }) => id)])
  } catch (error) {
    if (!(error instanceof SlurmError)) throw error
    // By name: a job may have been taken although its number never came back.
    await takeBack([submission]).catch(() => {})
    await rm(submissionFile(folder, serial), { force: true })
    throw new SlurmError(`${error.message}; nothing was submitted`, error.present)
  }
  return submission
}

/** Throws PartError when models cannot be cut into so many parts. */
function requireDivisible({ sweep }: SweepFolder, models: number[], parts: number): void {
  if (isPacked(sweep)) throw new PartError('parts are for sweeps of few large models, not of many')
  for (const model of models) {
    const scene = modelScene(sweep, model)
    if (scene.effort.precision !== null) throw new PartError('parts need `precision: none` in the plan or its scene')
    requireParts(scene, parts)
  }
}

/** Most tasks of one array: ids go from 0 to MaxArraySize - 1. */
async function mostTasks(): Promise<number> {
  const config = await slurm('scontrol', ['show', 'config'])
  return Number(/^MaxArraySize\s*=\s*(\d+)/m.exec(config)?.[1] ?? 1001)
}

function arrays(kind: Kind, tasks: number, most: number) {
  return Array.from({ length: Math.ceil(tasks / most) }, (_, i) => ({
    kind,
    first: i * most,
    count: Math.min(most, tasks - i * most)
  }))
}

/** Submits a job, held. Its number. */
async function submitBatch(
  folder: SweepFolder,
  serial: number,
  { name, kind, first, count }: Batch,
  after: string[],
  settings: SlurmSettings,
  command: string[]
): Promise<string> {
  const { partition, account, time, memory, cores, lines } = settings
  const atOnce = settings['at-once'] === undefined ? '' : `%${settings['at-once']}`
  const script = join(folder.slurm, `${name}.sh`)
  await writeAtomic(script, taskScript([...command, '--task', `${serial}/${kind}/${first}`], lines))
  const logs = join(folder.slurm, 'logs').replaceAll('%', '%%')
  const words = [
    '--parsable',
    '--hold',
    '--requeue',
    `--job-name=${name}`,
    `--chdir=${folder.path}`,
    '--open-mode=append',
    `--output=${join(logs, kind === 'table' ? `${kind}-%j.log` : `${kind}-%A-%a.log`)}`,
    `--cpus-per-task=${kind === 'table' ? 1 : cores}`,
    ...(kind === 'table' ? [] : [`--array=0-${count - 1}${atOnce}`]),
    ...(after.length > 0 ? [`--dependency=afterany:${after.join(':')}`] : []),
    ...(partition ? [`--partition=${partition}`] : []),
    ...(account ? [`--account=${account}`] : []),
    ...(time ? [`--time=${time}`] : []),
    ...(memory ? [`--mem=${memory}`] : []),
    script
  ]
  return (await slurm('sbatch', words)).trim().split(';')[0]
}
