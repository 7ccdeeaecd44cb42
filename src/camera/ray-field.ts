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
  const { r, cosTheta, phi } = medium.walls
  if (cosTheta.length > 2 || phi.length > 2) return { kind: 'rays', medium, view }
  const integrator = new RayIntegrator(medium, view)
  const radii = medium.starRadius > 0 ? Float64Array.from([...r, medium.starRadius]).sort() : r
  const { b, values } = traceProfile((x, out) => integrator.trace(x, 0, out, true), radii, accuracy, integrator.size)
  return { kind: 'profile', b, values, radii: r.subarray(1), size: integrator.size }
}

/** Flattest ellipse that a picture is divided by: an edge-on disk has some thickness. */
const FLATTEST = 0.1

export function openField(data: FieldData): IntensityField {
  if (data.kind === 'profile') return new RadialProfile(data.b, data.values, data.radii, data.size)
  const integrator = new RayIntegrator(data.medium, data.view)
  const { r } = data.medium.walls
  return {
    size: integrator.size,
    sample: (x, y, out, withGroups) => integrator.trace(x, y, out, withGroups),
    radii: r.subarray(1),
    innermost: r[1],
    outermost: r[r.length - 1],
    // With a roll the ellipses lie across the picture's axes: circles then.
    flattening:
      Math.abs(data.view.up[2]) < 1e-12 || Math.abs(data.view.right[2]) > 1e-12
        ? 1
        : Math.max(FLATTEST, Math.abs(data.view.observer[2]))
  }
}
