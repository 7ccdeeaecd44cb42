import type { Model } from '../model/model.js'
import { type Ledger, sectionOf } from '../workers/ledger.js'
import type { WorkerPool } from '../workers/pool.js'
import { solveEquilibrium } from './equilibrium.js'
import { equilibriumSetup } from './equilibrium-medium.js'
import { type EquilibriumProgress, equilibriumPiece } from './equilibrium-round.js'

/** Packets of the first steps, and of those that decide. */
const FIRST_STEPS = 131_072
const LAST_STEPS = 1_048_576
const MOST_STEPS = 200
/** Dust goes when it is hotter than allowed by so many sigma: else noise would nibble at it step by step. */
const SURE = 2

/** What has sublimated beyond the hollow of each component. */
export interface Sublimation {
  /** components x cells: 1 where the dust is gone. */
  gone: Float64Array
  /** False when there was still something to remove when steps ran out. */
  settled: boolean
  steps: number
  /** Packets spent. */
  packets: number
}

/** Name under which the ledger holds what is gone so far. */
export const sublimationPiece = 'dust-gone'

interface State extends Sublimation, Record<string, unknown> {
  size: number
  finished: boolean
}

/** Removes dust hotter than its sublimation temperature from the cells, and solves again, until none is. */
export async function sublimate(
  model: Model,
  pool: WorkerPool,
  ledger: Ledger,
  onProgress: (progress: EquilibriumProgress) => void,
  stop?: AbortSignal
): Promise<Sublimation | 'stopped'> {
  const { scene, components, cells } = model
  const most = Math.min(LAST_STEPS, scene.effort.equilibrium)
  const state = (ledger.take(sublimationPiece) as State | undefined) ?? {
    gone: new Float64Array(components.length * cells),
    settled: false,
    steps: 0,
    packets: 0,
    size: Math.min(FIRST_STEPS, most),
    finished: false
  }
  const section = (step: number) => sectionOf(ledger, `gone-${step}`)
  const sweep = () => {
    if (state.steps > 0) section(state.steps - 1).forget(equilibriumPiece)
  }
  while (!state.finished) {
    sweep()
    const effort = { ...scene.effort, precision: null, equilibrium: state.size }
    const left = withoutDust({ ...model, scene: { ...scene, effort, seed: `${scene.seed}/gone/${state.steps}` } }, state.gone)
    const solved = await solveEquilibrium(
      left,
      equilibriumSetup(left),
      pool,
      section(state.steps),
      async () => 0,
      onProgress,
      stop
    )
    if (solved === 'stopped') return solved
    const { temperature, sigma } = solved.dust
    let hot = 0
    components.forEach(({ spec }, c) => {
      if (spec.sublimation === undefined) return
      for (let at = c * cells; at < (c + 1) * cells; at++) {
        if (!(temperature[at] - SURE * sigma[at] > spec.sublimation)) continue
        state.gone[at] = 1
        hot++
      }
    })
    state.packets += solved.packets
    state.steps++
    state.settled = hot === 0
    state.finished = (state.settled && state.size === most) || state.steps === MOST_STEPS
    if (state.settled) state.size = most
    ledger.keep(sublimationPiece, structuredClone(state))
  }
  sweep()
  const { gone, settled, steps, packets } = state
  return { gone, settled, steps, packets }
}

/** A model without the dust that is gone. */
export function withoutDust(model: Model, gone: Float64Array): Model {
  const { cells, volume } = model
  const components = model.components.map((component, c) => {
    if (!gone.subarray(c * cells, (c + 1) * cells).includes(1)) return component
    const density = component.density.map((value, cell) => (gone[c * cells + cell] > 0 ? 0 : value))
    return { ...component, density, mass: density.reduce((sum, value, cell) => sum + value * volume[cell], 0) }
  })
  return { ...model, components }
}
