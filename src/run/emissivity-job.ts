import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { scattering } from '../solve/scattering.js'
import type { WorkerPool } from '../workers/pool.js'
import type { LightJob } from './light-job.js'
import { observeWavelength } from './observe-wavelength.js'
import { observersOf } from './observers-of.js'
import { quickError } from './quick-error.js'
import { SHARE } from './share.js'
import type { Wanted } from './wanted.js'

/** Images and fluxes by the formal solution through the emissivity that packets find. */
export function emissivityJob(model: Model, light: DustLight, wanted: Wanted[], pool: WorkerPool): LightJob {
  const { observers, indices } = observersOf(model, wanted)
  const scattered = scattering(
    model,
    light,
    observers,
    pool,
    async (found) => (await quickError(model, light, found, wanted, indices, 'scattered', pool)) / SHARE
  )
  return {
    ...(scattered && { request: scattered.request }),
    develop: async (sums, studio) =>
      observeWavelength(model, light, scattered && sums ? await scattered.lightOf(sums) : [], wanted, indices, studio)
  }
}
