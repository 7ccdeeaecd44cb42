import type { SphericalWalls } from '../grid/geometry.js'
import { FRAME, frameTowards } from '../transport/observer-frame.js'
import type { IntensityField } from './field.js'
import { directionAt, type PlaceView, placeView } from './place-view.js'
import { type RadialProfile, traceProfile } from './profile.js'
import { RayIntegrator } from './ray.js'
import type { RayMedium } from './ray-medium.js'
import { RAY_VALUES } from './ray-values.js'
import { doubled, turnStokes } from './stokes-ray.js'

/** The profile goes so far beyond what is straight behind, rad. */
const MARGIN = 1e-9

/**
 * Intensity of a spherical source for an observer at a place, by the angle (rad) between the line of sight and the direction of the
 * centre, on which alone it depends. `surfaces`: radii of stars, cm.
 */
export function placeProfile(
  medium: RayMedium,
  { r }: SphericalWalls,
  surfaces: number[],
  { from }: PlaceView,
  accuracy: number
) {
  const distance = Math.hypot(...from)
  // Along the equator of this map, x is the angle.
  const level = placeView({ from: [distance, 0, 0], toward: [0, 0, 0], roll: 0, allSky: true })
  const integrator = new RayIntegrator(medium, level)
  const angles = [...r.subarray(1), ...surfaces]
    .filter((radius) => radius < distance)
    .map((radius) => Math.asin(radius / distance))
  const beyond = distance < r[r.length - 1] ? [Math.PI / 2, Math.PI + MARGIN] : []
  const nodes = [0, ...angles.sort((a, b) => a - b), ...beyond]
  return traceProfile((angle, out) => integrator.trace(angle, 0, out, true), nodes, accuracy, integrator.size)
}

/** A profile by the angle from the centre, with the rings of a picture. */
export function fieldOfPlace(
  profile: RadialProfile,
  view: PlaceView,
  rings: Pick<IntensityField, 'radii' | 'innermost' | 'flattening'>
): IntensityField {
  const direction = new Float64Array(3)
  const frame = new Float64Array(FRAME)
  const [a, b, c] = view.from
  return {
    size: profile.size,
    sample: (x, y, out) => {
      directionAt(view, x, y, direction)
      const [u, v, w] = direction
      profile.sample(0, Math.atan2(Math.hypot(b * w - c * v, c * u - a * w, a * v - b * u), -(a * u + b * v + c * w)), out)
      if (profile.size === RAY_VALUES) return
      // From the direction to the centre to the meridian.
      frameTowards(-u, -v, -w, frame, 0)
      const [cos, sin] = doubled(a * frame[3] + b * frame[4] + c * frame[5], a * frame[6] + b * frame[7] + c * frame[8])
      turnStokes(out, cos, sin, true)
    },
    ...rings,
    outermost: Number.POSITIVE_INFINITY
  }
}
