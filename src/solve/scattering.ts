import type { Model } from '../model/model.js'
import { type Observers, observerCount } from '../transport/observers.js'
import type { WorkerPool } from '../workers/pool.js'
import type { DustLight } from './dust-light.js'
import type { GroupSums } from './group-sums.js'
import { lightTask } from './light-towards.js'
import type { RoundsRequest } from './rounds.js'
import { scatterMedium } from './scatter-medium.js'
import type { ScatteredLight } from './scattered-light.js'
import type { TurningMatrices } from './scattered-stokes.js'
import type { SeenBy } from './tallied-light.js'

/** Packets for each cell of three dimensions by which most of them are met: those that are not would seem to have no noise. */
export const MET = 0.25

/** Packets that find the scattered light at one wavelength, and what their sums mean. */
export interface Scattering {
  request: RoundsRequest
  /** One for each of `seenBy`, one for all in one dimension. */
  lightOf: (sums: GroupSums) => Promise<ScatteredLight[]>
}

/**
 * Scattered light at one wavelength, to be found by rounds of packets until `errorOf` it is below the precision; undefined
 * where nothing scatters. `observers` stand in the half-plane of azimuth 0 in two dimensions,
 * and are not asked for in one; `seenBy`: what is wanted of them.
 */
export function scattering(
  model: Model,
  light: DustLight,
  observers: Observers,
  seenBy: SeenBy[],
  pool: WorkerPool,
  errorOf: (light: ScatteredLight[]) => Promise<number>
): Scattering | undefined {
  const medium = scatterMedium(model, light)
  if (medium.launch.length === 0 || light.scattering.every((value) => value === 0)) return undefined
  const { effort, seed } = model.scene
  const spherical = model.dimensions === 1
  const count = observerCount(observers)
  let turning: Promise<unknown> | undefined
  const lightFrom = async (sums: GroupSums): Promise<ScatteredLight[]> => {
    if (spherical && light.tables) turning ??= pool.ask({ name: 'turning', input: light.tables })
    const matrices = (await turning) as TurningMatrices | undefined
    const all = spherical ? seenBy.slice(0, 1) : seenBy
    const towards = all.map((seen) => pool.ask(lightTask(model, light, sums, seen, count, matrices)))
    return (await Promise.all(towards)) as ScatteredLight[]
  }
  // What the last look at the error was made from is what pictures are made from.
  let known: { packets: number; light: Promise<ScatteredLight[]> } | undefined
  const lightOf = (sums: GroupSums) => {
    const packets = sums.packets.reduce((sum, value) => sum + value, 0)
    if (known?.packets !== packets) known = { packets, light: lightFrom(sums) }
    return known.light
  }
  return {
    request: {
      medium,
      task: `${light.tables ? 'stokes-' : ''}${spherical ? 'flights' : 'towards'}`,
      input: { observers },
      tallied: model.cells,
      seed: `${seed}/light/${light.wavelength}`,
      atMost: effort.cameras,
      ...(model.dimensions === 3 && { atLeast: MET * model.cells }),
      precision: effort.precision,
      errorOf: async (sums) => errorOf(await lightOf(sums))
    },
    lightOf
  }
}
