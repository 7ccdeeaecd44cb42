import type { Ledger, Piece } from './ledger.js'
import type { Task, WorkerPool } from './pool.js'

/** A list of tasks whose results are taken in, in their order, by something that can be kept. */
export interface KeptWork {
  tasks: Task[]
  /** Tasks that an earlier process has done. */
  done: number
  take: (output: unknown, index: number) => void
  /** Name and content of what has to be kept to go on after the first `done` tasks. */
  name: string
  piece: (done: number) => Piece
}

/**
 * Runs the tasks that are left, offers the state to the ledger after each, and keeps it when the tasks do not come to their
 * end, whether by `stop` or by a failure. Resolves to whether all are done; rejects as the pool does.
 */
export async function runKept(work: KeptWork, pool: WorkerPool, ledger: Ledger, stop?: AbortSignal): Promise<boolean> {
  const { tasks, take, name, piece } = work
  let done = work.done
  try {
    await pool.run(
      tasks.slice(done),
      (output) => {
        take(output, done)
        done++
        if (done < tasks.length) ledger.offer(name, () => piece(done))
      },
      stop
    )
  } finally {
    if (done < tasks.length) ledger.keep(name, piece(done))
  }
  return done === tasks.length
}
