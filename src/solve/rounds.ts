import type { WorkerPool } from '../workers/pool.js'
import { GROUPS } from './groups.js'

/** Batches of every round; the groups take them in turn. */
const BATCHES = 2 * GROUPS
const FIRST_ROUND = 16_384
/** A round is at most so many times larger than all before it, and that much larger than the error asks for. */
const FASTEST = 16
const MARGIN = 1.15

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
 * Rounds of packets whose tallies all count, each at least as large as all before it, until the error is small enough or the most
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
  let next = FIRST_ROUND
  for (let round = 0; ; round++) {
    const packets = precision === null ? atMost : Math.min(next, atMost - spent)
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
    // What is missing to reach the precision, when the error falls with the root of the packets.
    next = spent * Math.min(FASTEST, Math.max(1, MARGIN * (error / precision) ** 2 - 1))
  }
}
