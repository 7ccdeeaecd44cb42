import { addDirectLight, allDirectLight, directLight, starImage } from '../camera/direct.js'
import { pixelFrame } from '../camera/frame.js'
import { acrossTo, dot, type View } from '../camera/sight.js'
import { StarDepths } from '../camera/star-depth.js'
import { starPlace } from '../camera/star-place.js'
import type { ViewBasis } from '../camera/view.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import type { Wanted } from './wanted.js'

/** Direct light of all stars within a radius, luminosity per sr (erg/s/Hz/sr). */
export function directFlux(model: Model, light: DustLight, view: ViewBasis, radius: number): number {
  const depths = new StarDepths(model, light.wavelength, view)
  return model.stars.reduce(
    (sum, { spec, spectrum }) =>
      sum +
      directLight(
        starImage(spec, spectrum, light.nu),
        [dot(spec.at, view.right), dot(spec.at, view.up)],
        depths.to(spec),
        radius
      ),
    0
  )
}

/** Adds the direct light of the stars to a picture of the dust, and the sum of all light. */
export function addStars(
  model: Model,
  light: DustLight,
  view: View,
  want: Extract<Wanted, { kind: 'camera' }>,
  placing: number
): void {
  const { images, k } = want
  const direct = paintStars(model, light, view, want)
  const from = k * direct.length
  let sum = 0
  for (let i = 0; i < direct.length; i++) {
    const at = from + i
    images.total[at] = images.direct[at] + images.emitted[at] + images.scattered[at]
    sum += images.total[at]
  }
  images.samplingError[k] = sum > 0 ? placing / sum : 0
}

/** Adds the direct light of the stars to their pixels, and notes how bright each is; returns the plane of direct light. */
export function paintStars(
  model: Model,
  light: DustLight,
  view: View,
  { spec, images, k }: Extract<Wanted, { kind: 'camera' }>
): Float64Array {
  const { distance } = model.scene
  const frame = pixelFrame(spec, distance)
  const pixels = images.width * images.height
  const direct = images.direct.subarray(k * pixels, (k + 1) * pixels)
  const depths = new StarDepths(model, light.wavelength, view)
  for (const { spec: star, spectrum } of model.stars) {
    const image = starImage(star, spectrum, light.nu)
    const depthAt = depths.to(star)
    addDirectLight(image, starPlace(star.at, view), depthAt, frame, direct)
    const seen = images.stars.find(({ name }) => name === star.name)!
    const away = 'from' in view ? acrossTo(view, star.at).distance : distance
    seen.flux[k] = allDirectLight(image, depthAt) / (away * away)
  }
  return direct
}
