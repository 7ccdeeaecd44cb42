import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { scattering } from '../solve/scattering.js'
import type { LightJob } from './light-job.js'
import { observeWavelength } from './observe-wavelength.js'
import { observersOf } from './observers-of.js'
import { quickError } from './quick-error.js'
import { SHARE } from './share.js'
import type { Wanted } from './wanted.js'

/** Images and fluxes by the formal solution through the emissivity that packets find. */
export function emissivityJob(model: Model, light: DustLight, wanted: Wanted[]): LightJob {
  const { observers, indices } = observersOf(model, wanted)
  const scattered = scattering(
    model,
    light,
    observers,
    (found) => quickError(model, light, found, wanted, indices, 'scattered') / SHARE
  )
  return {
    ...(scattered && { request: scattered.request }),
    develop: (sums, studio) =>
      observeWavelength(model, light, scattered && sums ? scattered.lightOf(sums) : [], wanted, indices, studio)
  }
}
