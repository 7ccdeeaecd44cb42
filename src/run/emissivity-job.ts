import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import { scattering } from '../solve/scattering.js'
import type { WorkerPool } from '../workers/pool.js'
import { HEAT_SHARE, shareLeft } from './error-shares.js'
import type { LightJob } from './light-job.js'
import { observeWavelength } from './observe-wavelength.js'
import { observersOf } from './observers-of.js'
import { quickErrors } from './quick-error.js'
import type { Wanted } from './wanted.js'

/** Images and fluxes by the formal solution through the emissivity that packets find. */
export function emissivityJob(model: Model, light: DustLight, wanted: Wanted[], pool: WorkerPool): LightJob {
  const { observers, seenBy, indices } = observersOf(model, wanted)
  const precision = model.scene.effort.precision ?? Number.POSITIVE_INFINITY
  const errorsOf = (found: ScatteredLight[], part: 'scattered' | 'all') =>
    quickErrors(model, light, found, wanted, indices, part, pool)
  let left: number[] | undefined
  const scattered = scattering(model, light, observers, seenBy, pool, async (found) => {
    const errors = await errorsOf(found, 'scattered')
    const least = shareLeft(HEAT_SHARE)
    if (Math.max(...errors) <= least * precision) return Math.max(...errors) / least
    left ??= (await errorsOf([], 'all')).map((heat) => shareLeft(heat / precision))
    return Math.max(...errors.map((error, i) => error / left![i]))
  })
  return {
    ...(scattered && { request: scattered.request }),
    develop: async (sums, studio) =>
      observeWavelength(model, light, scattered && sums ? await scattered.lightOf(sums) : [], wanted, indices, studio)
  }
}
