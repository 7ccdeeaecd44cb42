import { coolingOf, rowOf } from '../dust/emission.js'
import { medianOverBulk } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { EquilibriumTally } from '../transport/equilibrium.js'
import type { Task, WorkerPool } from '../workers/pool.js'
import { type EquilibriumSetup, equilibriumSetup } from './equilibrium-medium.js'
import { GROUPS } from './groups.js'
import { type DustTemperatures, firstGuess, temperaturesFrom } from './temperatures.js'

/** Batches of every round; the groups take them in turn. */
const BATCHES = 4 * GROUPS
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
  interactions: number
}

export interface EquilibriumProgress {
  round: number
  done: number
  packets: number
  error: number
}

/**
 * Radiative equilibrium of all dust with `temperature: solve`: rounds of packets, each at least twice the one before, each
 * emitting with the temperatures of the one before, until the median error and the change are below the precision, and so is
 * `seenError`, the relative error that the noise of these temperatures makes in what will be observed.
 */
export async function solveEquilibrium(
  model: Model,
  pool: WorkerPool,
  seenError: (dust: DustTemperatures) => number,
  onProgress: (progress: EquilibriumProgress) => void,
  stop?: AbortSignal
): Promise<EquilibriumResult | 'stopped'> {
  const { effort, seed } = model.scene
  const setup = equilibriumSetup(model)
  pool.share('equilibrium', setup.medium)
  let present = firstGuess(model, setup)
  let spent = 0
  const rounds: EquilibriumRound[] = []
  const sizes = effort.precision === null ? fixedSizes(effort.equilibrium) : undefined
  let next = FIRST_ROUND
  for (let round = 0; ; round++) {
    setRows(setup, present)
    const packets = sizes ? sizes[round] : wholeBatches(Math.min(next, effort.equilibrium - spent))
    const outcome = await playRound(
      setup,
      pool,
      packets,
      `${seed}/dust/${round}`,
      (done) => {
        onProgress({ round, done, packets, error: rounds.at(-1)?.error ?? Number.NaN })
      },
      stop
    )
    if (outcome === 'stopped') return 'stopped'
    spent += packets
    const dust = temperaturesFrom(model, setup, outcome.absorbed, packets)
    const { error, change } = judge(model, setup, dust, present)
    rounds.push({ packets, error, change, interactions: outcome.interactions })
    present = dust.temperature
    const precision = effort.precision
    const steady = round > 0 && change <= Math.max(precision ?? 0, 2 * error)
    const worst = steady && precision !== null && error <= precision ? Math.max(error, seenError(dust)) : error
    const good = steady && precision !== null && worst <= precision
    // The last round should hold about half of all packets: another one must fit twice over, or be the rest.
    const over = sizes ? round === sizes.length - 1 : effort.equilibrium - spent < packets
    next = packets * (steady && precision !== null ? growth(worst / precision) : SLOWEST)
    if (good || over) {
      pool.forget('equilibrium')
      const scale = setup.luminosity / packets
      const budget = {
        emitted: setup.luminosity,
        escaped: outcome.escaped * scale,
        returned: outcome.returned * scale,
        kept: outcome.kept * scale
      }
      return { dust, rounds, budget, packets: spent, reached: good || precision === null }
    }
  }
}

/** How many times larger the next round has to be for the error to fall to the precision, `excess` times smaller. */
function growth(excess: number): number {
  return Math.min(FASTEST, Math.max(SLOWEST, MARGIN * excess * excess))
}

/** Whether any dust has to find its temperature, and anything heats it. */
export function needsEquilibrium(model: Model): boolean {
  return model.components.some(({ spec }) => spec.temperature === 'solve') && model.scene.effort.equilibrium > 0
}

interface RoundOutcome {
  absorbed: Float64Array[]
  escaped: number
  returned: number
  kept: number
  interactions: number
}

async function playRound(
  setup: EquilibriumSetup,
  pool: WorkerPool,
  packets: number,
  seed: string,
  onDone: (packets: number) => void,
  stop: AbortSignal | undefined
): Promise<RoundOutcome | 'stopped'> {
  const { components, cells } = setup.medium
  const absorbed = Array.from({ length: GROUPS }, () => new Float64Array(components * cells))
  const outcome: RoundOutcome = { absorbed, escaped: 0, returned: 0, kept: 0, interactions: 0 }
  // Every batch has the same number of packets, so that the groups weigh the same.
  const share = packets / BATCHES
  const tasks: Task[] = Array.from({ length: BATCHES }, (_, batch) => ({
    name: 'equilibrium',
    input: { packets: share, seed: `${seed}/${batch}` }
  }))
  let done = 0
  const finished = await pool.run(
    tasks,
    (output, batch) => {
      const tally = output as EquilibriumTally
      const sum = absorbed[batch % GROUPS]
      for (let i = 0; i < sum.length; i++) sum[i] += tally.absorbed[i]
      outcome.escaped += tally.escaped
      outcome.returned += tally.returned
      outcome.kept += tally.kept
      outcome.interactions += tally.interactions
      done += tally.emitted
      onDone(done)
    },
    stop
  )
  return finished === BATCHES ? outcome : 'stopped'
}

function fixedSizes(total: number): number[] {
  const unit = total / 2 ** FIXED_ROUNDS
  return Array.from({ length: FIXED_ROUNDS }, (_, i) => wholeBatches(unit * 2 ** i))
}

/** The nearest number of packets, at least one a batch, that fills every batch evenly. */
function wholeBatches(packets: number): number {
  return BATCHES * Math.max(1, Math.round(packets / BATCHES))
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
