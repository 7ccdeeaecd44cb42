import type { Model } from '../model/model.js'
import type { Task } from '../workers/pool.js'
import type { DustLight } from './dust-light.js'
import type { GroupSums } from './group-sums.js'
import { type CellVolumes, fromFlights, type ScatteredLight, type ScatteringLaws } from './scattered-light.js'
import { fromStokesFlights, type TurningMatrices } from './scattered-stokes.js'
import { fromTallies, type SeenBy } from './tallied-light.js'

/** What the sums of packets become scattered light with. */
export interface LightRequest {
  cells: CellVolumes
  laws: ScatteringLaws
  sums: GroupSums
  /** The observers, and how many there are in all; of no meaning in one dimension. */
  seenBy: SeenBy
  observers: number
  /** In one dimension, where the laws are tables. */
  turning?: TurningMatrices
}

/** The task whose result is `lightTowards` an observer. */
export function lightTask(
  { cells, volume, dimensions }: Model,
  { asymmetry, scattering, tables }: DustLight,
  sums: GroupSums,
  seenBy: SeenBy,
  observers: number,
  turning: TurningMatrices | undefined
): Task {
  const input: LightRequest = {
    cells: { cells, volume, dimensions },
    laws: { asymmetry, scattering, ...(tables && { tables }) },
    sums,
    seenBy,
    observers,
    ...(turning && { turning })
  }
  return { name: 'scattered', input }
}

/** Scattered light towards an observer; runs on the threads. */
export function lightTowards({ cells, laws, sums, seenBy, observers, turning }: LightRequest): ScatteredLight {
  if (turning) return fromStokesFlights(cells, laws, turning, sums)
  if (cells.dimensions === 1) return fromFlights(cells, laws, sums)
  return fromTallies(cells, laws, sums, seenBy, observers)
}
