import { coolingOf, rowOf } from '../dust/emission.js'
import { medianOverBulk } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import type { EquilibriumTally } from '../transport/equilibrium.js'
import type { Ledger, Piece } from '../workers/ledger.js'
import type { Task, WorkerPool } from '../workers/pool.js'
import { runKept } from '../workers/run-kept.js'
import { type Batches, divide, groupOf } from './batches.js'
import { type EquilibriumSetup, equilibriumSetup } from './equilibrium-medium.js'
import { GROUPS } from './groups.js'
import { type DustTemperatures, firstGuess, temperaturesFrom } from './temperatures.js'
import { ThickCells } from './thick-cells.js'

const FIRST_ROUND = 16_384
/** Rounds of a run that spends exactly the packets given: each twice the one before, the last about half of all. */
const FIXED_ROUNDS = 6
/** Growth of rounds: at least, at most, and beyond what the error asks for. */
const SLOWEST = 2
const FASTEST = 16
const MARGIN = 1.15
/** Cells that together emit this share of all dust light count for precision and convergence. */
const BULK = 0.95

/** Where the energy of the last round went, erg/s; the sum of the four ends is `emitted`. */
export interface EnergyBudget {
  emitted: number
  escaped: number
  returned: number
  /** Absorbed by dust that does not take part in the equilibrium. */
  kept: number
}

export interface EquilibriumResult {
  dust: DustTemperatures
  rounds: EquilibriumRound[]
  budget: EnergyBudget
  packets: number
  /** False when the most packets were spent before the temperatures reached the precision. */
  reached: boolean
}

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
interface EquilibriumState {
  rounds: EquilibriumRound[]
  spent: number
  /** Packets asked of the present round, and the temperatures with which it emits. */
  size: number
  present: Float64Array
  done: number
  tally: RoundTally
}

/** Sums over the batches of a round. */
interface RoundTally {
  /** GROUPS arrays of components x cells. */
  absorbed: Float64Array[]
  escaped: number
  returned: number
  kept: number
  interactions: number
}

/** Under this name the ledger holds temperatures half done. */
export const equilibriumPiece = 'dust-rounds'

/**
 * Radiative equilibrium of all dust with `temperature: solve`: rounds of packets, each at least twice the one before, each
 * emitting with the temperatures of the one before, until the median error and the change are below the precision, and so is
 * `seenError`, the relative error that the noise of these temperatures makes in what will be observed. Goes on from what the
 * ledger holds, and keeps it there.
 */
export async function solveEquilibrium(
  model: Model,
  pool: WorkerPool,
  ledger: Ledger,
  seenError: (dust: DustTemperatures) => number,
  onProgress: (progress: EquilibriumProgress) => void,
  stop?: AbortSignal
): Promise<EquilibriumResult | 'stopped'> {
  const { precision, equilibrium: most } = model.scene.effort
  const setup = equilibriumSetup(model)
  const thick = new ThickCells(model, setup)
  pool.share('equilibrium', setup.medium)
  const sizes = precision === null ? fixedSizes(most) : undefined
  const state = (ledger.take(equilibriumPiece) as EquilibriumState | undefined) ?? {
    rounds: [],
    spent: 0,
    size: sizes ? sizes[0] : Math.min(FIRST_ROUND, most),
    present: firstGuess(model, setup),
    done: 0,
    tally: emptyTally(setup)
  }
  for (;;) {
    setRows(setup, state.present)
    thick.update(state.present)
    const batches = divide(state.size)
    if (!(await playRound(state, batches, model.scene.seed, pool, ledger, onProgress, stop))) return 'stopped'
    const packets = batches.count * batches.packets
    state.spent += packets
    const dust = temperaturesFrom(model, setup, state.tally.absorbed, packets)
    const { error, change } = judge(model, setup, dust, state.present)
    const steady = state.rounds.length > 0 && change <= Math.max(precision ?? 0, 2 * error)
    // The last round should hold about half of all packets: another one must fit twice over, or be the rest.
    const over = sizes ? state.rounds.length + 1 === sizes.length : most - state.spent < packets
    const look = precision !== null && (over || (steady && error <= precision))
    const worst = look ? Math.max(error, seenError(dust)) : error
    const good = steady && precision !== null && worst <= precision
    state.rounds.push({ packets, error, change, worst, interactions: state.tally.interactions })
    if (good || over) {
      pool.forget('equilibrium')
      const { rounds, spent, tally } = state
      return { dust, rounds, budget: budgetOf(tally, setup, packets), packets: spent, reached: good || precision === null }
    }
    const wanted = packets * (steady && precision !== null ? growth(worst / precision) : SLOWEST)
    state.size = sizes ? sizes[state.rounds.length] : Math.min(wanted, most - state.spent)
    state.present = dust.temperature
    state.done = 0
    state.tally = emptyTally(setup)
    ledger.offer(equilibriumPiece, () => pieceOf(state), true)
  }
}

/** How many times larger the next round has to be for the error to fall to the precision, `excess` times smaller. */
function growth(excess: number): number {
  return Math.min(FASTEST, Math.max(SLOWEST, MARGIN * excess * excess))
}

/** Whether any dust has to find its temperature, and anything heats it. */
export function needsEquilibrium({ dust, effort }: Scene): boolean {
  return dust.some(({ temperature }) => temperature === 'solve') && effort.equilibrium > 0
}

/** Plays what is left of a round; false when it was stopped before its end. */
function playRound(
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

function emptyTally({ medium }: EquilibriumSetup): RoundTally {
  const absorbed = Array.from({ length: GROUPS }, () => new Float64Array(medium.components * medium.cells))
  return { absorbed, escaped: 0, returned: 0, kept: 0, interactions: 0 }
}

function addTally(sum: RoundTally, group: number, tally: EquilibriumTally): void {
  const absorbed = sum.absorbed[group]
  for (let i = 0; i < absorbed.length; i++) absorbed[i] += tally.absorbed[i]
  sum.escaped += tally.escaped
  sum.returned += tally.returned
  sum.kept += tally.kept
  sum.interactions += tally.interactions
}

/** The state as it is now; later batches do not change it. */
function pieceOf(state: EquilibriumState): Piece {
  const { rounds, tally } = state
  return { ...state, rounds: [...rounds], tally: { ...tally, absorbed: tally.absorbed.map((sum) => sum.slice()) } }
}

function budgetOf({ escaped, returned, kept }: RoundTally, { luminosity }: EquilibriumSetup, packets: number): EnergyBudget {
  const scale = luminosity / packets
  return { emitted: luminosity, escaped: escaped * scale, returned: returned * scale, kept: kept * scale }
}

/** Sizes of rounds, each twice the one before, that together spend `total`. */
function fixedSizes(total: number): number[] {
  return Array.from({ length: FIXED_ROUNDS }, (_, i) => (total * 2 ** i) / 2 ** FIXED_ROUNDS)
}

/** Writes the emission rows of the present temperatures where the workers see them. */
function setRows({ medium, tables }: EquilibriumSetup, temperature: Float64Array): void {
  const { cells, emissionRow } = medium
  for (let c = 0; c < tables.length; c++) {
    for (let at = c * cells; at < (c + 1) * cells; at++) {
      if (emissionRow[at] < 0) continue
      emissionRow[at] = temperature[at] > 0 ? Math.min(rowOf(tables[c], temperature[at]), tables[c].rows - 1.001) : 0
    }
  }
}

function judge(model: Model, setup: EquilibriumSetup, dust: DustTemperatures, before: Float64Array) {
  const { components, cells, volume } = model
  const { temperature, sigma } = dust
  const weights = new Float64Array(temperature.length)
  components.forEach(({ spec, density }, c) => {
    if (spec.temperature !== 'solve') return
    for (let i = 0; i < cells; i++) {
      const at = c * cells + i
      if (temperature[at] > 0 && sigma[at] >= 0)
        weights[at] = density[i] * volume[i] * coolingOf(setup.tables[c], temperature[at])
    }
  })
  const relative = sigma.map((value, at) => (temperature[at] > 0 ? value / temperature[at] : 0))
  const moved = temperature.map((value, at) => (value > 0 ? Math.abs(value / before[at] - 1) : 0))
  return { error: medianOverBulk(relative, weights, BULK), change: medianOverBulk(moved, weights, BULK) }
}
