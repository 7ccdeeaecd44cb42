import { coolingOf, rowOf } from '../dust/emission.js'
import { medianOverBulk } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import type { Ledger } from '../workers/ledger.js'
import type { WorkerPool } from '../workers/pool.js'
import { divide } from './batches.js'
import type { DustTemperatures } from './dust-temperatures.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'
import {
  type EquilibriumProgress,
  type EquilibriumRound,
  type EquilibriumState,
  emptyTally,
  equilibriumPiece,
  pieceOf,
  playRound,
  type RoundTally
} from './equilibrium-round.js'
import { firstGuess, temperaturesFrom } from './temperatures.js'
import { ThickCells } from './thick-cells.js'
import { WalkWriter } from './walk-levels.js'

/** Packets of the first round, more where each stands for so many cells. */
const FIRST_ROUND = 16_384
const CELLS_A_PACKET = 64
/** Rounds of a run that spends exactly the packets given: each twice the one before, the last about half of all. */
const FIXED_ROUNDS = 6
/** Growth of rounds: at least, at most, and beyond what the error asks for. */
const SLOWEST = 2
const FASTEST = 16
const MARGIN = 1.15
/** Cells that together emit this share of all dust light count for precision and convergence. */
const BULK = 0.95

/** Where the energy of the last round went, erg/s; the sum of the three ends is `emitted`. */
export interface EnergyBudget {
  emitted: number
  /** What ambient fields send into the outer sphere, a part of `emitted` but for the noise of its packets. */
  ambient: number
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

/**
 * Radiative equilibrium of all dust with `temperature: solve`: rounds of packets, each at least twice the one before, each
 * emitting with the temperatures of the one before, until the median error and the change are below the precision, and so is
 * `seenError`, the relative error that the noise of these temperatures makes in what will be observed. Goes on from what the
 * ledger holds, and keeps it there. `setup`: the model laid out for this phase, which changes while it is used.
 */
export async function solveEquilibrium(
  model: Model,
  setup: EquilibriumSetup,
  pool: WorkerPool,
  ledger: Ledger,
  seenError: (dust: DustTemperatures) => Promise<number>,
  onProgress: (progress: EquilibriumProgress) => void,
  stop?: AbortSignal
): Promise<EquilibriumResult | 'stopped'> {
  const { precision, equilibrium: most } = model.scene.effort
  const thick = new ThickCells(model, setup)
  const walk = new WalkWriter(setup, thick)
  pool.share('equilibrium', setup.medium)
  const sizes = precision === null ? fixedSizes(most) : undefined
  const state = (ledger.take(equilibriumPiece) as EquilibriumState | undefined) ?? {
    rounds: [],
    spent: 0,
    size: sizes ? sizes[0] : Math.min(Math.max(FIRST_ROUND, model.cells / CELLS_A_PACKET), most),
    present: firstGuess(model, setup),
    done: 0,
    tally: emptyTally()
  }
  for (;;) {
    setRows(setup, state.present)
    walk.update(state.present)
    const batches = divide(state.size, model.cells * model.components.length)
    if (!(await playRound(state, batches, model.scene.seed, pool, ledger, onProgress, stop))) return 'stopped'
    const packets = batches.count * batches.packets
    state.spent += packets
    const dust = temperaturesFrom(model, setup, thick, state.tally.absorbed, packets)
    const { error, change } = judge(model, setup, dust, state.present)
    const steady = state.rounds.length > 0 && change <= Math.max(precision ?? 0, 2 * error)
    // The last round should hold about half of all packets: another one must fit twice over, or be the rest.
    const over = sizes ? state.rounds.length + 1 === sizes.length : most - state.spent < packets
    const look = precision !== null && (over || (steady && error <= precision))
    const worst = look ? Math.max(error, await seenError(dust)) : error
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
    state.tally = emptyTally()
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

function budgetOf(
  { emitted, escaped, returned, kept }: RoundTally,
  { luminosity, central, ambient }: EquilibriumSetup,
  packets: number
): EnergyBudget {
  const scale = luminosity / packets
  const past = central?.escaped ?? 0
  return {
    emitted: emitted * scale + past,
    ambient: ambient.reduce((sum, value) => sum + value, 0),
    escaped: escaped * scale + past,
    returned: returned * scale,
    kept: kept * scale
  }
}

/** Sizes of rounds, each twice the one before, that together spend `total`. */
function fixedSizes(total: number): number[] {
  return Array.from({ length: FIXED_ROUNDS }, (_, i) => (total * 2 ** i) / 2 ** FIXED_ROUNDS)
}

/** Writes the emission rows of the present temperatures where the workers see them. */
export function setRows({ medium, tables }: EquilibriumSetup, temperature: Float64Array): void {
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
