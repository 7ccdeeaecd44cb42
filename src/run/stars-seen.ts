import { addDirectLight, allDirectLight, type DepthAt, directLight, starImage } from '../camera/direct.js'
import { pixelFrame } from '../camera/frame.js'
import { RayIntegrator } from '../camera/ray.js'
import type { RayMedium } from '../camera/ray-medium.js'
import { acrossTo, dot, type View } from '../camera/sight.js'
import { starPlace } from '../camera/star-place.js'
import type { ViewBasis } from '../camera/view.js'
import type { Model } from '../model/model.js'
import type { StarSpec } from '../scene/types.js'
import type { DustLight } from '../solve/dust-light.js'
import type { Wanted } from './wanted.js'

/** Direct light of all stars within a radius, luminosity per sr (erg/s/Hz/sr). */
export function directFlux(model: Model, light: DustLight, medium: RayMedium, view: ViewBasis, radius: number): number {
  const depthTo = depthsTo(medium, view)
  return model.stars.reduce(
    (sum, { spec, spectrum }) =>
      sum +
      directLight(starImage(spec, spectrum, light.nu), [dot(spec.at, view.right), dot(spec.at, view.up)], depthTo(spec), radius),
    0
  )
}

/** Optical depths from the observer to stars. */
export function depthsTo(medium: RayMedium, view: View): (star: Pick<StarSpec, 'at' | 'extent' | 'radius'>) => DepthAt {
  const integrator = new RayIntegrator({ ...medium, slots: 0, starlight: undefined }, view)
  return ({ at, extent, radius }) =>
    (u, v) =>
      integrator.depthTo(u, v, at, extent === 'sphere' ? radius! : 0)
}

/** Adds the direct light of the stars to a picture of the dust, and the sum of all light. */
export function addStars(
  model: Model,
  light: DustLight,
  medium: RayMedium,
  view: View,
  want: Extract<Wanted, { kind: 'camera' }>,
  placing: number
): void {
  const { images, k } = want
  const direct = paintStars(model, light, medium, view, want)
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
  medium: RayMedium,
  view: View,
  { spec, images, k }: Extract<Wanted, { kind: 'camera' }>
): Float64Array {
  const { distance } = model.scene
  const frame = pixelFrame(spec, distance)
  const pixels = images.width * images.height
  const direct = images.direct.subarray(k * pixels, (k + 1) * pixels)
  const depthTo = depthsTo(medium, view)
  for (const { spec: star, spectrum } of model.stars) {
    const image = starImage(star, spectrum, light.nu)
    const depthAt = depthTo(star)
    addDirectLight(image, starPlace(star.at, view), depthAt, frame, direct)
    const seen = images.stars.find(({ name }) => name === star.name)!
    const away = 'from' in view ? acrossTo(view, star.at).distance : distance
    seen.flux[k] = allDirectLight(image, depthAt) / (away * away)
  }
  return direct
}
