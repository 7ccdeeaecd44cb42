import type { Model } from '../model/model.js'
import type { WorkerPool } from '../workers/pool.js'
import type { DustLight } from './dust-light.js'
import { GROUPS } from './groups.js'
import { playRounds, type RoundsProgress } from './rounds.js'
import { scatterMedium } from './scatter-medium.js'
import { fromFlights, fromTallies, type GroupSums, type ScatteredLight } from './scattered-light.js'

export interface ScatteringResult {
  /** One for each observer, one for all in one dimension; empty where nothing scatters. */
  light: ScatteredLight[]
  packets: number
}

/**
 * Scattered light at one wavelength, by rounds of packets until `errorOf` the result is below the precision.
 * `observers`: unit vectors, three numbers each, in the half-plane of azimuth 0 in two dimensions; not used in one.
 */
export async function solveScattering(
  model: Model,
  light: DustLight,
  observers: Float64Array,
  pool: WorkerPool,
  errorOf: (light: ScatteredLight[]) => number,
  onProgress: (progress: RoundsProgress) => void,
  stop?: AbortSignal
): Promise<ScatteringResult | 'stopped'> {
  const medium = scatterMedium(model, light)
  if (medium.launch.length === 0 || light.scattering.every((value) => value === 0)) return { light: [], packets: 0 }
  const { effort, seed } = model.scene
  const spherical = model.dimensions === 1
  const count = spherical ? 1 : observers.length / 3
  const groups: GroupSums = { sums: [], packets: new Array(GROUPS).fill(0) }
  const result = () =>
    Array.from({ length: count }, (_, index) =>
      spherical ? fromFlights(model, light, groups) : fromTallies(model, groups, index, count)
    )
  pool.share('scattering', medium)
  const packets = await playRounds(
    {
      task: spherical ? 'flights' : 'towards',
      input: { observers },
      seed: `${seed}/light/${light.wavelength}`,
      atMost: effort.cameras,
      precision: effort.precision,
      add: (tally, group, share) => addTo(groups, group, tally as Float64Array, share),
      errorOf: () => errorOf(result())
    },
    pool,
    onProgress,
    stop
  )
  pool.forget('scattering')
  return packets === 'stopped' ? packets : { light: result(), packets }
}

function addTo({ sums, packets }: GroupSums, group: number, tally: Float64Array, share: number): void {
  sums[group] ??= new Float64Array(tally.length)
  const sum = sums[group]
  for (let i = 0; i < sum.length; i++) sum[i] += share * tally[i]
  packets[group] += share
}
