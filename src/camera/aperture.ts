import { GROUPS } from '../solve/groups.js'
import type { IntensityField } from './field.js'
import { integratePatch, type PatchIntegral } from './patch.js'
import { FIRST_GROUP, Q, RAY_VALUES } from './ray-values.js'
import { ringsBetween } from './rings.js'

/** Parts of half a circle in which an aperture is first divided. */
const PARTS = 12

/**
 * Integral of an intensity field over a disk of `radius` (cm, may be infinite). `mirrored`: the right half of the picture
 * equals the left one, and only one is traced.
 */
export function integrateAperture(field: IntensityField, radius: number, tolerance: number, mirrored: boolean): PatchIntegral {
  const edge = Math.min(radius, field.outermost)
  const parts = mirrored ? PARTS : 2 * PARTS
  const angles = Array.from({ length: parts + 1 }, (_, i) => flattened(-Math.PI / 2 + (i * Math.PI) / PARTS, field.flattening))
  const patch = {
    angles: () => angles,
    rings: ringsBetween(field, 0, edge),
    outline: (_cos: number, _sin: number, out: Float64Array) => {
      out[0] = 0
      out[1] = edge
    }
  }
  const integral = integratePatch(field, patch, tolerance, 0)
  if (mirrored) {
    integral.error *= 2
    for (let k = 0; k < integral.value.length; k++) integral.value[k] *= 2
    // U and V are odd.
    integral.value.fill(0, Q + 1, FIRST_GROUP)
    integral.value.fill(0, RAY_VALUES + GROUPS)
  }
  return integral
}

/** An angle drawn towards the x axis, as on a circle seen at a slant: the major axis of a tilted disk. */
function flattened(angle: number, flattening: number): number {
  const turns = Math.round(angle / Math.PI)
  return turns * Math.PI + Math.atan(flattening * Math.tan(angle - turns * Math.PI))
}
