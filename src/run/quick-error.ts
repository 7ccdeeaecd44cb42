import { pixelFrame, seenFrom } from '../camera/frame.js'
import { fieldData, openField } from '../camera/ray-field.js'
import { EMITTED, FIRST_GROUP, RAY_VALUES, SCATTERED } from '../camera/ray-values.js'
import { survey, surveyAperture } from '../camera/survey.js'
import { standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { ScatteredLight } from '../solve/scattered-light.js'
import { mediumFor } from './observers-of.js'
import { directFlux } from './stars-seen.js'
import type { Wanted } from './wanted.js'

/** Largest relative error among the wanted, of scattered light alone or of all light, by a quick look. */
export function quickError(
  model: Model,
  light: DustLight,
  scattered: ScatteredLight[],
  wanted: Wanted[],
  indices: number[],
  part: 'scattered' | 'all'
): number {
  let worst = 0
  wanted.forEach((want, i) => {
    const medium = mediumFor(model, light, scattered, indices[i])
    if (part === 'scattered') medium.emissionGroups = new Float32Array()
    const view = seenFrom(model, want.spec.view)
    const field = openField(fieldData(medium, view, 0.01))
    const { distance } = model.scene
    if (want.kind === 'camera') worst = Math.max(worst, survey(field, pixelFrame(want.spec, distance)).error)
    else {
      const value = surveyAperture(field, want.spec.aperture * distance)
      const direct = directFlux(model, light, medium, view, want.spec.aperture * distance)
      const total = value[EMITTED] + value[SCATTERED] + direct
      if (total > 0) worst = Math.max(worst, standardError(value.subarray(FIRST_GROUP, RAY_VALUES)) / total)
    }
  })
  return worst
}
