import { type ChildProcess, fork } from 'node:child_process'
import { grainTables } from '../../run/grain-tables.js'
import { OutputError } from '../../run/output-error.js'
import { machineMemory } from '../../run/require-memory.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { modelScene } from '../plan/model-scene.js'
import { noteFailures, type Outcome } from './attempt.js'
import { type Job, jobsFor } from './job.js'
import type { FromPlayer, ToPlayer } from './player.js'
import { WorkLock } from './work-lock.js'

/** How far a sweep has come on this machine. */
export interface SweepProgress {
  /** Models of this call that are finished or given up, and all of them. */
  done: number
  of: number
  failed: number
  /** What is in work. */
  running: string[]
}

export interface HereOptions {
  /** Cores to use. */
  workers: number
  /** Bytes for all models together; default: what the machine has. */
  memory?: number
  onProgress: (progress: SweepProgress) => void
  stop?: AbortSignal
}

interface Player {
  child: ChildProcess
  job?: Job
  workers: number
  settle?: (message: FromPlayer | 'ended') => void
}

/**
 * Makes models on this machine: side by side on one core each while there are enough of them, and on several cores each at the
 * end. When `stop` is aborted, those in work keep their state. Throws OutputError when the folder cannot be written.
 */
export async function runHere(folder: SweepFolder, models: number[], options: HereOptions): Promise<void> {
  const { workers: cores, memory = machineMemory(), onProgress, stop } = options
  const lock = await WorkLock.take(folder.path)
  const { dust, models: work } = jobsFor(folder, models)
  const missing = new Set(dust.map(({ lead }) => lead))
  const waiting: Job[] = [...dust, ...work]
  const idle: Player[] = []
  const busy = new Set<Player>()
  const running = new Set<Promise<void>>()
  let [free, done, failed] = [cores, 0, 0]
  let broken: OutputError | undefined
  const isReady = (job: Job) => job.kind === 'dust' || !job.group || !missing.has(job.group.lead)
  const tell = () => onProgress({ done, of: work.length, failed, running: [...busy].map(({ job }) => nameOf(job!)) })

  const play = async (job: Job, workers: number) => {
    const player = idle.pop() ?? startPlayer(folder.path, lock)
    Object.assign(player, { job, workers })
    busy.add(player)
    tell()
    const outcome = await outcomeOf(player, { kind: 'job', job, workers, memory: Math.floor((memory * workers) / cores) }, folder)
    busy.delete(player)
    if (outcome instanceof OutputError) broken ??= outcome
    else if (job.kind === 'dust') {
      missing.delete(job.lead)
      if (outcome === 'failed') {
        const lost = waiting.filter((other) => other.kind === 'model' && other.group?.lead === job.lead)
        for (const other of lost) waiting.splice(waiting.indexOf(other), 1)
        done += lost.length
        failed += lost.length
      }
    } else if (outcome !== 'stopped') {
      done++
      if (outcome === 'failed') failed++
    }
    if (player.child.connected) idle.push(player)
    free += workers
    tell()
  }

  const end = () => {
    for (const { child } of busy) if (child.connected) child.send({ kind: 'stop' } satisfies ToPlayer)
  }
  stop?.addEventListener('abort', end)
  try {
    // Opacities that take long are found once, with all cores; players find them in the cache. What is wrong, the models will say.
    if (models.length > 1) await grainTables(modelScene(folder.sweep, models[0]), cores).catch(() => {})
    while (waiting.length + running.size > 0) {
      while (free > 0 && !stop?.aborted && !broken) {
        const index = waiting.findIndex(isReady)
        if (index < 0) break
        const [job] = waiting.splice(index, 1)
        const rivals = 1 + countUpTo(waiting, isReady, free)
        const workers = rivals >= free ? 1 : Math.ceil(free / rivals)
        free -= workers
        const promise: Promise<void> = play(job, workers).finally(() => running.delete(promise))
        running.add(promise)
      }
      if (running.size === 0) break
      await Promise.race(running)
    }
  } finally {
    stop?.removeEventListener('abort', end)
    end()
    for (const { child } of [...idle, ...busy]) child.disconnect()
    lock.release()
  }
  if (broken) throw broken
}

function startPlayer(path: string, lock: WorkLock): Player {
  const child = fork(new URL('./player.js', import.meta.url), [path], { stdio: ['ignore', 'ignore', 'inherit', 'ipc'] })
  lock.add(child.pid!)
  const player: Player = { child, workers: 0 }
  child.on('message', (message: FromPlayer) => player.settle?.(message))
  child.on('exit', () => player.settle?.('ended'))
  return player
}

/** Hands a job to a player. One that ends over it has the job given up; one that cannot write gives the reason. */
async function outcomeOf(
  player: Player,
  message: ToPlayer & { kind: 'job' },
  folder: SweepFolder
): Promise<Outcome | OutputError> {
  const { child } = player
  const answer = await new Promise<FromPlayer | 'ended'>((resolve) => {
    player.settle = resolve
    child.send(message)
  })
  if (answer !== 'ended') return 'broken' in answer ? new OutputError(answer.broken) : answer.outcome
  const how = child.signalCode ? `was ended by ${child.signalCode}` : `ended with code ${child.exitCode}`
  await noteFailures(folder, message.job, `its process ${how}; the memory may have run out`)
  return 'failed'
}

function nameOf(job: Job): string {
  return job.kind === 'dust' ? `dust of model ${job.lead}` : `model ${job.model}`
}

function countUpTo<Item>(items: Item[], fits: (item: Item) => boolean, most: number): number {
  let count = 0
  for (const item of items) if (fits(item) && ++count >= most) break
  return count
}
