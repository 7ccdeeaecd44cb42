import type { Model } from '../model/model.js'
import type { DustLight } from './dust-light.js'
import type { GroupSums } from './group-sums.js'
import type { RoundsRequest } from './rounds.js'
import { scatterMedium } from './scatter-medium.js'
import { fromFlights, fromTallies, type ScatteredLight } from './scattered-light.js'
import { fromStokesFlights, fromStokesTallies, turningMatrices } from './scattered-stokes.js'

/** Packets that find the scattered light at one wavelength, and what their sums mean. */
export interface Scattering {
  request: RoundsRequest
  /** One for each observer, one for all in one dimension. */
  lightOf: (sums: GroupSums) => ScatteredLight[]
}

/**
 * Scattered light at one wavelength, to be found by rounds of packets until `errorOf` it is below the precision; undefined
 * where nothing scatters. `observers`: unit vectors, three numbers each, in the half-plane of azimuth 0 in two dimensions;
 * not used in one.
 */
export function scattering(
  model: Model,
  light: DustLight,
  observers: Float64Array,
  errorOf: (light: ScatteredLight[]) => number
): Scattering | undefined {
  const medium = scatterMedium(model, light)
  if (medium.launch.length === 0 || light.scattering.every((value) => value === 0)) return undefined
  const { effort, seed } = model.scene
  const spherical = model.dimensions === 1
  const count = spherical ? 1 : observers.length / 3
  const turning = spherical && light.tables ? turningMatrices(light.tables) : undefined
  const towards = (sums: GroupSums, index: number) => {
    if (turning) return fromStokesFlights(model, light, turning, sums)
    if (spherical) return fromFlights(model, light, sums)
    return light.tables ? fromStokesTallies(model, light, sums, index, count) : fromTallies(model, sums, index, count)
  }
  // What the last look at the error was made from is what pictures are made from.
  let known: { packets: number; light: ScatteredLight[] } | undefined
  const lightOf = (sums: GroupSums) => {
    const packets = sums.packets.reduce((sum, value) => sum + value, 0)
    if (known?.packets !== packets) known = { packets, light: Array.from({ length: count }, (_, index) => towards(sums, index)) }
    return known.light
  }
  return {
    request: {
      medium,
      task: `${light.tables ? 'stokes-' : ''}${spherical ? 'flights' : 'towards'}`,
      input: { observers },
      seed: `${seed}/light/${light.wavelength}`,
      atMost: effort.cameras,
      precision: effort.precision,
      errorOf: (sums) => errorOf(lightOf(sums))
    },
    lightOf
  }
}
