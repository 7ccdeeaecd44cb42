import { buildModel, planCells } from '../model/build-model.js'
import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import { type Ledger, noLedger } from '../workers/ledger.js'
import { WorkerPool } from '../workers/pool.js'
import { type ColumnsToStars, columnsToStars } from './columns-to-stars.js'
import { type Estimator, requireEstimator } from './estimator.js'
import { type GrainTables, grainTables } from './grain-tables.js'
import type { RunProgress } from './progress.js'
import { requireMemory } from './require-memory.js'
import { type PhaseTime, stopwatch } from './stopwatch.js'

export interface RunOptions {
  /** Worker threads. */
  workers: number
  estimator: Estimator
  onProgress: (progress: RunProgress) => void
  stop?: AbortSignal
  /** Called when the model is built, and `stop` is heeded from now on. */
  onBegin?: () => void
  /** Where the run keeps its state; default: nowhere. */
  ledger?: Ledger
  /** Tables of the optics of grains, by a caller who has them. */
  tables?: GrainTables
  /** Most memory it may take, bytes; default: what the machine has. */
  memory?: number
  /** Leave out pictures and plots. */
  dataOnly?: boolean
  /** Show the edges of the cells in pictures of the dust. */
  cellEdges?: boolean
}

/** A model and the workers that are to run it. */
export interface Crew {
  model: Model
  pool: WorkerPool
  ledger: Ledger
  columnsToStars: ColumnsToStars
  /** What building the model took. */
  time: PhaseTime
}

/** Builds the model, starts workers, and lets `work` use them; the ledger is settled and the workers ended whatever comes. */
export async function withCrew<Result>(
  scene: Scene,
  { workers, estimator, ledger = noLedger, memory, tables, onBegin, onProgress, stop }: RunOptions,
  work: (crew: Crew) => Promise<Result>
): Promise<Result> {
  requireEstimator(scene, estimator)
  const clock = stopwatch()
  const plan = planCells(scene, tables ?? (await grainTables(scene, workers, onProgress, stop)))
  requireMemory(plan, workers, memory)
  // The threads start up while the model is built.
  const pool = new WorkerPool(workers, new URL('./thread.js', import.meta.url))
  try {
    const model = buildModel(scene, plan)
    onBegin?.()
    return await work({ model, pool, ledger, columnsToStars: columnsToStars(pool, onProgress, stop), time: clock() })
  } finally {
    await pool.close()
    await ledger.settle()
  }
}
