import { dimensionsOf, isOctree, reachOf } from '../grid/cells.js'
import type { Octree } from '../grid/octree/octree.js'
import type { IntensityField } from './field.js'
import { fieldOfPlace, placeProfile } from './place-profile.js'
import type { PlaceView } from './place-view.js'
import { RadialProfile, traceProfile } from './profile.js'
import { RayIntegrator } from './ray.js'
import type { RayMedium } from './ray-medium.js'
import type { View } from './sight.js'

/** A field that can be sent to a worker: a profile, by the angle of an observer at a place if there is one, or what rays need. */
export type FieldData =
  | { kind: 'profile'; b: Float64Array; values: Float64Array; radii: Float64Array; size: number; view?: PlaceView }
  | { kind: 'rays'; medium: RayMedium; view: View }

/** The intensity towards an observer: in one dimension the rays are traced here, once for all pictures. */
export function fieldData(medium: RayMedium, view: View, accuracy: number): FieldData {
  if (isOctree(medium.walls) || dimensionsOf(medium.walls) > 1) return { kind: 'rays', medium, view }
  const { r } = medium.walls
  const surfaces = Array.from(medium.spheres)
    .filter((_, i) => i % 4 === 3)
    .map(Math.sqrt)
  if ('from' in view) {
    const { b, values, size } = placeProfile(medium, medium.walls, surfaces, view, accuracy)
    return { kind: 'profile', b, values, radii: r, size, view }
  }
  const integrator = new RayIntegrator(medium, view)
  const radii = Float64Array.from([...r, ...surfaces]).sort()
  const { b, values } = traceProfile((x, out) => integrator.trace(x, 0, out, true), radii, accuracy, integrator.size)
  return { kind: 'profile', b, values, radii: r.subarray(1), size: integrator.size }
}

/** Rings for each doubling of the radius by which pictures of cubes are first divided. */
const RINGS_A_DOUBLING = 12

/** Radii from the smallest cube to the corners of all, with 0, cm. */
function evenRings(octree: Octree): Float64Array {
  const { smallestSide: smallest } = octree
  const reach = reachOf(octree)
  const count = Math.ceil(RINGS_A_DOUBLING * Math.log2(reach / smallest))
  return Float64Array.from({ length: count + 2 }, (_, i) => (i === 0 ? 0 : smallest * (reach / smallest) ** ((i - 1) / count)))
}

/** The origin is in the middle of a perspective picture within so much. */
const CENTRED = 1e-6
/** Flattest ellipse that a picture is divided by: an edge-on disk has some thickness. */
const FLATTEST = 0.1

export function openField(data: FieldData): IntensityField {
  if (data.kind === 'profile') {
    const profile = new RadialProfile(data.b, data.values, data.radii, data.size)
    return data.view ? fieldOfPlace(profile, data.view, ringsFromPlace(data.radii, data.view, false)) : profile
  }
  const { view, medium } = data
  const integrator = new RayIntegrator(medium, view)
  const { walls } = medium
  const r = isOctree(walls) ? evenRings(walls) : walls.r
  const common = {
    size: integrator.size,
    sample: (x: number, y: number, out: Float64Array, withGroups: boolean) => integrator.trace(x, y, out, withGroups)
  }
  // Cubes know no axis; with a roll the ellipses lie across the picture's axes: circles then.
  const axial = !isOctree(walls) && Math.abs(view.right[2]) < 1e-12
  if ('from' in view) return { ...common, ...ringsFromPlace(r, view, axial), outermost: Number.POSITIVE_INFINITY }
  return {
    ...common,
    radii: r.subarray(1),
    innermost: r[1],
    outermost: r[r.length - 1],
    flattening: axial && Math.abs(view.up[2]) > 1e-12 ? Math.max(FLATTEST, Math.abs(view.observer[2])) : 1
  }
}

/**
 * Radii about the origin as an observer at a place sees them, about where he sees the origin: circles on the sky, which are near to
 * ellipses along the axes of the picture. Those that he stands within are none.
 */
function ringsFromPlace(r: Float64Array, { from, forward, origin, seesOrigin, allSky }: PlaceView, axial: boolean) {
  const distance = Math.hypot(...from)
  const [x, y] = origin
  // A small circle is 1 / cos and cos times its size wide and high in a map; in a perspective picture it grows outwards.
  const cos2 = Math.max(FLATTEST, 1 - y * y)
  const stretch = allSky ? 1 / Math.sqrt(cos2) : (1 + x * x + y * y) ** 0.75
  // A perspective picture shows circles about the axis much as parallel lines do.
  const flattening = allSky
    ? cos2
    : axial && seesOrigin && Math.hypot(x, y) < CENTRED
      ? Math.max(FLATTEST, Math.abs(forward[2]))
      : 1
  const radii = r
    .subarray(1)
    .filter((radius) => seesOrigin && radius < distance)
    .map(
      (radius) => stretch * (allSky ? Math.asin(radius / distance) : radius / Math.sqrt(distance * distance - radius * radius))
    )
  return { radii, innermost: radii.length > 0 ? radii[0] : Number.POSITIVE_INFINITY, flattening }
}
