import { pixelFrame, seenFrom } from '../camera/frame.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from '../camera/ray-values.js'
import { standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import type { WorkerPool } from '../workers/pool.js'
import { fieldOn, surveyApertureOn, surveyOn } from './look.js'
import { mediumFor } from './observers-of.js'
import { directFlux } from './stars-seen.js'
import type { Wanted } from './wanted.js'

/** Relative accuracy of the rays of a quick look in one dimension. */
const ACCURACY = 0.01

/** Relative error of each of the wanted, of scattered light alone or of all light, by a quick look. */
export async function quickErrors(
  model: Model,
  light: DustLight,
  scattered: ScatteredLight[],
  wanted: Wanted[],
  indices: number[],
  part: 'scattered' | 'all',
  pool: WorkerPool
): Promise<number[]> {
  const errors = wanted.map(async (want, i) => {
    const medium = mediumFor(model, light, scattered, indices[i])
    if (part === 'scattered') medium.emissionGroups = new Float32Array()
    const { distance } = model.scene
    if (want.kind === 'camera') {
      const field = await fieldOn(pool, medium, seenFrom(model, want.spec.view), ACCURACY)
      return (await surveyOn(pool, field, pixelFrame(want.spec, distance))).error
    }
    const view = seenFrom(model, want.spec.view)
    const radius = want.spec.aperture * distance
    const value = await surveyApertureOn(pool, await fieldOn(pool, medium, view, ACCURACY), radius)
    const total = value[EMITTED] + value[SCATTERED] + directFlux(model, light, view, radius)
    return total > 0 ? standardError(value.subarray(FIRST_GROUP, RAY_VALUES)) / total : 0
  })
  return Promise.all(errors)
}
