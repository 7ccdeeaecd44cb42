import type { Model } from '../model/model.js'
import { type StarColumns, starColumns } from '../solve/star-columns.js'
import type { WorkerPool } from '../workers/pool.js'
import { type RunProgress, Stopped } from './progress.js'

/** What lies between the point stars of a model and its cubes; rejects with WorkerFailure or Stopped. */
export type ColumnsToStars = (model: Model) => Promise<StarColumns[]>

/** Finds the columns of a model when they are first asked for, and keeps them until another model comes. */
export function columnsToStars(
  pool: WorkerPool,
  onProgress: (progress: RunProgress) => void,
  stop?: AbortSignal
): ColumnsToStars {
  const find = async (model: Model) => {
    const show = (done: number, of: number) => onProgress({ stage: 'starlight', done, of, round: 0, error: Number.NaN })
    const found = await starColumns(model, pool, show, stop)
    if (!found) throw new Stopped()
    return found
  }
  let known: { model: Model; columns: Promise<StarColumns[]> } | undefined
  return (model) => {
    if (known?.model !== model) known = { model, columns: find(model) }
    return known.columns
  }
}
