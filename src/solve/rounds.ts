import type { WorkerPool } from '../workers/pool.js'
import { GROUPS } from './groups.js'

/** Batches of every round; the groups take them in turn. */
const BATCHES = 2 * GROUPS
const FIRST_ROUND = 16_384

export interface RoundsProgress {
  round: number
  /** Packets done and asked for in this round. */
  done: number
  packets: number
  /** Error after the round before; NaN before the first. */
  error: number
}

export interface RoundsRequest {
  /** Handler that plays a batch, and what it gets beside `packets` and `seed`. */
  task: string
  input: object
  /** Text that the random streams of all batches start from. */
  seed: string
  atMost: number
  /** Relative error to reach; null: one round of `atMost` packets. */
  precision: number | null
  /** Takes the tally of a batch of `share` packets into its group. */
  add: (tally: unknown, group: number, share: number) => void
  /** Relative error of all rounds so far. */
  errorOf: () => number
}

/**
 * Rounds of packets whose tallies all count, each twice as large as the one before, until the error is small enough or the most
 * packets are spent. Batches are added in their order. Resolves to the packets spent.
 */
export async function playRounds(
  request: RoundsRequest,
  pool: WorkerPool,
  onProgress: (progress: RoundsProgress) => void,
  stop?: AbortSignal
): Promise<number | 'stopped'> {
  const { task, input, seed, atMost, precision, add, errorOf } = request
  let spent = 0
  let error = Number.NaN
  for (let round = 0; ; round++) {
    const packets = precision === null ? atMost : Math.min(FIRST_ROUND * 2 ** round, atMost - spent)
    const share = Math.max(1, Math.round(packets / BATCHES))
    const tasks = Array.from({ length: BATCHES }, (_, batch) => ({
      name: task,
      input: { ...input, packets: share, seed: `${seed}/${round}/${batch}` }
    }))
    const done = await pool.run(
      tasks,
      (output, batch) => {
        add(output, batch % GROUPS, share)
        onProgress({ round, done: (batch + 1) * share, packets: BATCHES * share, error })
      },
      stop
    )
    if (done < BATCHES) return 'stopped'
    spent += share * BATCHES
    if (precision === null) return spent
    error = errorOf()
    if (error <= precision || atMost - spent < BATCHES) return spent
  }
}
