import type { EquilibriumTally } from '../transport/equilibrium.js'
import type { Ledger, Piece } from '../workers/ledger.js'
import type { Task, WorkerPool } from '../workers/pool.js'
import { runKept } from '../workers/run-kept.js'
import { type Batches, groupOf } from './batches.js'

export interface EquilibriumRound {
  packets: number
  /** Median relative 1 sigma of the temperature over the cells that hold 95 % of the emission. */
  error: number
  /** Median relative change of those temperatures since the round before. */
  change: number
  /** The larger of `error` and, once that is small enough, the relative error that shows in what will be observed. */
  worst: number
  interactions: number
}

export interface EquilibriumProgress {
  round: number
  done: number
  packets: number
  error: number
}

/** Where the temperatures stand: `tally` holds the first `done` batches of the present round. */
export interface EquilibriumState {
  rounds: EquilibriumRound[]
  spent: number
  /** Packets asked of the present round, and the temperatures with which it emits. */
  size: number
  present: Float64Array
  done: number
  tally: RoundTally
}

/** Sums over the batches of a round. */
export interface RoundTally {
  /** Arrays of components x cells: of the groups that have had a batch, GROUPS at the end. */
  absorbed: Float64Array[]
  emitted: number
  escaped: number
  returned: number
  kept: number
  interactions: number
}

/** Under this name the ledger holds temperatures half done. */
export const equilibriumPiece = 'dust-rounds'

/** Plays what is left of a round; false when it was stopped before its end. */
export function playRound(
  state: EquilibriumState,
  batches: Batches,
  seed: string,
  pool: WorkerPool,
  ledger: Ledger,
  onProgress: (progress: EquilibriumProgress) => void,
  stop: AbortSignal | undefined
): Promise<boolean> {
  const { rounds, tally } = state
  const round = rounds.length
  const { count, packets } = batches
  const error = rounds.at(-1)?.worst ?? Number.NaN
  const tasks = Array.from(
    { length: count },
    (_, batch): Task => ({ name: 'equilibrium', input: { packets, seed: `${seed}/dust/${round}/${batch}` } })
  )
  const take = (output: unknown, batch: number) => {
    addTally(tally, groupOf(batch, batches), output as EquilibriumTally)
    state.done = batch + 1
    onProgress({ round, done: state.done * packets, packets: count * packets, error })
  }
  return runKept({ tasks, done: state.done, take, name: equilibriumPiece, piece: () => pieceOf(state) }, pool, ledger, stop)
}

export function emptyTally(): RoundTally {
  return { absorbed: [], emitted: 0, escaped: 0, returned: 0, kept: 0, interactions: 0 }
}

function addTally(sum: RoundTally, group: number, tally: EquilibriumTally): void {
  sum.absorbed[group] ??= new Float64Array(tally.absorbed.length)
  const absorbed = sum.absorbed[group]
  for (let i = 0; i < absorbed.length; i++) absorbed[i] += tally.absorbed[i]
  sum.emitted += tally.emitted
  sum.escaped += tally.escaped
  sum.returned += tally.returned
  sum.kept += tally.kept
  sum.interactions += tally.interactions
}

/** The state as it is now; later batches do not change it. */
export function pieceOf(state: EquilibriumState): Piece {
  const { rounds, tally } = state
  return { ...state, rounds: [...rounds], tally: { ...tally, absorbed: tally.absorbed.map((sum) => sum.slice()) } }
}
