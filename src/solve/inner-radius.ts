import { coolingOf, type EmissionTable } from '../dust/emission.js'
import { standardError } from '../math/stats.js'
import { rebuildModel } from '../model/build-model.js'
import { refusal, type SoughtRadius, soughtRadii, withInnerRadii } from '../model/inner-radii.js'
import type { Model } from '../model/model.js'
import { type Ledger, sectionOf } from '../workers/ledger.js'
import type { WorkerPool } from '../workers/pool.js'
import { type EdgeHeating, edgeHeating } from './edge-heating.js'
import { solveEquilibrium } from './equilibrium.js'
import { equilibriumSetup } from './equilibrium-medium.js'
import { type EquilibriumProgress, equilibriumPiece } from './equilibrium-round.js'

/** Packets of the first step; growth of steps once the radii nearly stand: at most, and beyond what the error asks for. */
const FIRST_STEP = 65_536
const MOST_GROWTH = 32
const MARGIN = 1.3
/** Relative change below which more packets are worth their time, the last change allowed (of which a tenth may be left), and 1 sigma. */
const NEAR = 0.02
const SETTLED = 5e-3
const SIGMA = 7e-4
/** 1 sigma that will do when no more packets may be spent: two of them are 0.2 %. */
const ENOUGH = 1e-3
const MOST_STEPS = 40
/** d ln(heating) / d ln(r) in the light of a star, and between which it is believed when two steps tell otherwise. */
const INVERSE_SQUARE = -2
const SLOPES = [-5, -1]

/** The inner radius of a component, where it was sought. */
export interface FoundRadius {
  component: number
  /** That it has there, K. */
  temperature: number
  /** cm */
  radius: number
  /** Relative 1 sigma of the radius. */
  sigma: number
}

export interface InnerRadii {
  found: FoundRadius[]
  /** False when packets or steps ran out before they were known well enough. */
  settled: boolean
  steps: number
  /** Packets spent. */
  packets: number
}

/** Name under which the ledger holds the radii as far as they are. */
export const radiiPiece = 'dust-radii'

interface State extends Record<string, unknown> {
  radii: number[]
  /** Packets of the present step, and of all before. */
  size: number
  spent: number
  step: number
  slopes: number[]
  /** ln of radius and of heating of the step before, by component sought. */
  before: { radius: number; heating: number }[]
  /** When they are found. */
  result?: InnerRadii
}

/**
 * Finds the radii at which components reach the temperatures asked for at their inner edges. Each step solves for the temperatures
 * of the whole model and moves every radius by the ratio of heating to the cooling at its temperature, which falls as r^-2 in the
 * light of a star, or as the last steps tell. Steps grow until the radii are known to 0.07 % (1 sigma). Throws SceneError.
 */
export async function solveInnerRadii(
  start: Model,
  pool: WorkerPool,
  ledger: Ledger,
  onProgress: (progress: EquilibriumProgress) => void,
  stop?: AbortSignal
): Promise<InnerRadii | 'stopped'> {
  const { scene } = start
  const first = soughtRadii(scene)
  const most = scene.effort.equilibrium
  const state = (ledger.take(radiiPiece) as State | undefined) ?? {
    radii: first.map(({ radius }) => radius),
    size: Math.min(FIRST_STEP, most),
    spent: 0,
    step: 0,
    slopes: first.map(() => INVERSE_SQUARE),
    before: []
  }
  const sweep = () => {
    if (state.step > 0) sectionOf(ledger, `${state.step - 1}`).forget(equilibriumPiece)
  }
  while (!state.result) {
    sweep()
    const sought = first.map((each, k) => ({ ...each, radius: state.radii[k] }))
    const moved = withInnerRadii(scene, sought)
    const effort = { ...scene.effort, precision: null, equilibrium: state.size }
    const model = rebuildModel(start, { ...moved, effort, seed: `${scene.seed}/radii/${state.step}` })
    const setup = equilibriumSetup(model)
    const solved = await solveEquilibrium(model, setup, pool, sectionOf(ledger, `${state.step}`), async () => 0, onProgress, stop)
    if (solved === 'stopped') return solved
    state.spent += solved.packets
    state.step++
    const changes = sought.map((each, k) => stepOf(model, setup.tables[each.component], each, k, solved.dust, state))
    const furthest = Math.max(...changes.map(({ change }) => Math.abs(change)))
    const sigma = Math.max(...changes.map((each) => each.sigma))
    const known = furthest <= SETTLED && sigma <= SIGMA
    const over = state.step === MOST_STEPS || (furthest <= NEAR && state.size >= most) || !Number.isFinite(furthest)
    changes.forEach(({ change }, k) => {
      if (Number.isFinite(change)) state.radii[k] *= Math.exp(change)
    })
    if (known || over) {
      const found = sought.flatMap(({ component, temperature, least }, k) => {
        const radius = state.radii[k]
        return radius > least ? [{ component, temperature, radius, sigma: changes[k].sigma }] : []
      })
      state.result = { found, settled: furthest <= SETTLED && sigma <= ENOUGH, steps: state.step, packets: state.spent }
    } else if (furthest <= NEAR && sigma > SIGMA) {
      const needed = MARGIN * (sigma / SIGMA) ** 2
      state.size = Math.min(most, Math.ceil(state.size * Math.min(MOST_GROWTH, needed)))
    }
    ledger.keep(radiiPiece, structuredClone(state))
  }
  sweep()
  return state.result
}

/** The change of ln(radius) that a component's heating asks for, and its 1 sigma; remembers the step in the state. */
function stepOf(
  model: Model,
  table: EmissionTable,
  { component, temperature, radius: inner, least }: SoughtRadius,
  k: number,
  dust: Parameters<typeof edgeHeating>[1],
  { slopes, before }: State
): { change: number; sigma: number } {
  const heating: EdgeHeating = edgeHeating(model, dust, table, component, inner)
  const here = { radius: Math.log(inner), heating: heating.value }
  const last = before[k]
  if (last && Math.abs(here.radius - last.radius) > NEAR) {
    const slope = (here.heating - last.heating) / (here.radius - last.radius)
    if (slope > SLOPES[0] && slope < SLOPES[1]) slopes[k] = slope
  }
  before[k] = here
  const target = Math.log(coolingOf(table, temperature))
  const change = (target - heating.value) / slopes[k]
  const sigma = standardError(heating.groups) / Math.abs(slopes[k])
  // Dust that is cool enough where its shape begins loses nothing.
  if (inner * Math.exp(change) <= least) return { change: Math.log(least / inner), sigma: inner === least ? 0 : sigma }
  if (Math.abs(change) > Math.log(1e3)) {
    throw refusal(model.scene, component, `the dust has ${temperature} K at no radius that the star alone decides; give a length`)
  }
  return { change, sigma }
}
