import type { Ledger, Piece } from '../workers/ledger.js'
import type { Task, WorkerPool } from '../workers/pool.js'
import { runKept } from '../workers/run-kept.js'
import { type Batches, divide, groupOf } from './batches.js'
import { addTally, copySums, emptySums, type GroupSums } from './group-sums.js'

/** Packets of the first round, unless more or exactly so many are asked for. */
export const FIRST_ROUND = 2048
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

/** Packets at one wavelength, each batch of which gives one tally. */
export interface RoundsRequest {
  /** What the workers have to know, under the key `scattering`. */
  medium: unknown
  /** Handler that plays a batch, and what it gets beside `packets` and `seed`. */
  task: string
  input: object
  /** Cells or pixels that a tally tells of. */
  tallied: number
  /** Text that the random streams of all batches start from. */
  seed: string
  atMost: number
  /** Fewer packets tell nothing of the error. */
  atLeast?: number
  /** Relative error to reach; null: one round of `atMost` packets. */
  precision: number | null
  /** Relative error of all rounds so far. */
  errorOf: (sums: GroupSums) => Promise<number>
}

export interface RoundsOutcome {
  sums: GroupSums
  /** Packets spent. */
  packets: number
  /** Relative error after the last round; NaN when none was asked for. */
  error: number
}

/** The tasks of a round; `scope`: where the workers find the medium. */
export function batchTasks(
  { task, input, seed }: RoundsRequest,
  scope: string,
  round: number,
  { count, packets }: Batches
): Task[] {
  return Array.from({ length: count }, (_, batch) => ({
    name: task,
    scope,
    input: { ...input, packets, seed: `${seed}/${round}/${batch}` }
  }))
}

/** Where a wavelength's packets stand: `done` batches of the present round are in the sums. */
interface RoundsState extends RoundsOutcome {
  round: number
  /** Size of the present round. */
  size: number
  done: number
  finished: boolean
}

/**
 * Rounds of packets whose tallies all count, each at least as large as all before it, until the error is small enough or the most
 * packets are spent. Batches are added in their order. Goes on from what the ledger holds under `name`, and keeps it there.
 */
export async function playRounds(
  request: RoundsRequest,
  pool: WorkerPool,
  ledger: Ledger,
  name: string,
  onProgress: (progress: RoundsProgress) => void,
  stop?: AbortSignal
): Promise<RoundsOutcome | 'stopped'> {
  const { medium, tallied, atMost, atLeast = 0, precision, errorOf } = request
  const first = precision === null ? atMost : Math.min(Math.max(FIRST_ROUND, atLeast), atMost)
  const state =
    (ledger.take(name) as RoundsState | undefined) ??
    ({ sums: emptySums(), packets: 0, error: Number.NaN, round: 0, size: first, done: 0, finished: false } satisfies RoundsState)
  const piece = (): Piece => ({ ...state, sums: copySums(state.sums) })
  pool.share('scattering', medium, name)
  while (!state.finished) {
    // First rounds are small: what a batch costs beside its packets counts.
    const batches = divide(state.size, tallied, precision === null ? undefined : 1)
    const complete = await runKept(
      {
        tasks: batchTasks(request, name, state.round, batches),
        done: state.done,
        take: (tally, batch) => {
          addTally(state.sums, groupOf(batch, batches), tally as Float64Array, batches.packets)
          state.done = batch + 1
          const { round, done, error } = state
          onProgress({ round, done: done * batches.packets, packets: batches.count * batches.packets, error })
        },
        name,
        piece
      },
      pool,
      ledger,
      stop
    )
    if (!complete) return 'stopped'
    state.packets += batches.count * batches.packets
    state.done = 0
    state.round++
    if (precision === null) state.finished = true
    else {
      state.error = await errorOf(state.sums)
      state.finished = state.error <= precision || atMost - state.packets < batches.count
      // What is missing to reach the precision, when the error falls with the root of the packets.
      const missing = state.packets * Math.min(FASTEST, Math.max(1, MARGIN * (state.error / precision) ** 2 - 1))
      state.size = Math.min(missing, atMost - state.packets)
    }
    // A first round is sooner played again than written.
    ledger.offer(name, piece, state.packets > FIRST_ROUND)
  }
  pool.forget('scattering', name)
  return state
}
