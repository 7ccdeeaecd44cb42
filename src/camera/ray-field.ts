import { dimensionsOf, isOctree, reachOf } from '../grid/cells.js'
import { type Octree, smallestSide } from '../grid/octree/octree.js'
import type { IntensityField } from './field.js'
import { RadialProfile, traceProfile } from './profile.js'
import { RayIntegrator } from './ray.js'
import type { RayMedium } from './ray-medium.js'
import type { ViewBasis } from './view.js'

/** A field that can be sent to a worker: a profile, or what rays need. */
export type FieldData =
  | { kind: 'profile'; b: Float64Array; values: Float64Array; radii: Float64Array; size: number }
  | { kind: 'rays'; medium: RayMedium; view: ViewBasis }

/** The intensity towards an observer: in one dimension the rays are traced here, once for all pictures. */
export function fieldData(medium: RayMedium, view: ViewBasis, accuracy: number): FieldData {
  if (isOctree(medium.walls) || dimensionsOf(medium.walls) > 1) return { kind: 'rays', medium, view }
  const { r } = medium.walls
  const integrator = new RayIntegrator(medium, view)
  const surfaces = Array.from(medium.spheres)
    .filter((_, i) => i % 4 === 3)
    .map(Math.sqrt)
  const radii = Float64Array.from([...r, ...surfaces]).sort()
  const { b, values } = traceProfile((x, out) => integrator.trace(x, 0, out, true), radii, accuracy, integrator.size)
  return { kind: 'profile', b, values, radii: r.subarray(1), size: integrator.size }
}

/** Rings for each doubling of the radius by which pictures of cubes are first divided. */
const RINGS_A_DOUBLING = 12

/** Radii from the smallest cube to the corners of all, with 0, cm. */
function evenRings(octree: Octree): Float64Array {
  const smallest = smallestSide(octree)
  const reach = reachOf(octree)
  const count = Math.ceil(RINGS_A_DOUBLING * Math.log2(reach / smallest))
  return Float64Array.from({ length: count + 2 }, (_, i) => (i === 0 ? 0 : smallest * (reach / smallest) ** ((i - 1) / count)))
}

/** Flattest ellipse that a picture is divided by: an edge-on disk has some thickness. */
const FLATTEST = 0.1

export function openField(data: FieldData): IntensityField {
  if (data.kind === 'profile') return new RadialProfile(data.b, data.values, data.radii, data.size)
  const integrator = new RayIntegrator(data.medium, data.view)
  const { walls } = data.medium
  const r = isOctree(walls) ? evenRings(walls) : walls.r
  return {
    size: integrator.size,
    sample: (x, y, out, withGroups) => integrator.trace(x, y, out, withGroups),
    radii: r.subarray(1),
    innermost: r[1],
    outermost: r[r.length - 1],
    // Cubes know no axis; with a roll the ellipses lie across the picture's axes: circles then.
    flattening:
      isOctree(walls) || Math.abs(data.view.up[2]) < 1e-12 || Math.abs(data.view.right[2]) > 1e-12
        ? 1
        : Math.max(FLATTEST, Math.abs(data.view.observer[2]))
  }
}
