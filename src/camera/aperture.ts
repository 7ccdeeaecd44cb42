import { GOLDEN } from '../math/golden.js'
import { GROUPS } from '../solve/groups.js'
import type { IntensityField } from './field.js'
import { integratePatch, type PatchIntegral, type Sector } from './patch.js'
import { FIRST_GROUP, Q, RAY_VALUES } from './ray-values.js'
import { ringsBetween } from './rings.js'
import { unflattened } from './unflattened.js'

/** Parts of half a circle in which an aperture is first divided. */
const PARTS = 8
/** Rings are of like width within this factor. */
const ALIKE = 3
/** Rings beyond the outermost wall, where a flattened picture has none: as many for each doubling. */
const RINGS_A_DOUBLING = 2

/**
 * Integral of an intensity field over a disk of `radius` (cm, may be infinite). `mirrored`: the right half of the picture
 * equals the left one, and only one is traced.
 */
export function integrateAperture(field: IntensityField, radius: number, tolerance: number, mirrored: boolean): PatchIntegral {
  const { flattening } = field
  const edge = Math.min(radius, field.outermost)
  const round = unflattened(field)
  const rings = ringsBetween(round, 0, edge)
  const beyond = Math.ceil(RINGS_A_DOUBLING * Math.log2(1 / flattening))
  for (let i = 1; i <= beyond; i++) rings.push(edge * flattening ** (-i / beyond))
  const patch = {
    parts: Array.from({ length: mirrored ? PARTS : 2 * PARTS }, (_, i) => slice(rings, i, field.size > RAY_VALUES)).flat(),
    outline: (cos: number, sin: number, out: Float64Array) => {
      out[0] = 0
      out[1] = edge / Math.hypot(cos, flattening * sin)
    }
  }
  const integral = integratePatch(round, patch, tolerance, 0)
  const scale = (mirrored ? 2 : 1) * flattening
  integral.error *= scale
  for (let k = 0; k < integral.value.length; k++) integral.value[k] *= scale
  if (mirrored) {
    // U and V are odd.
    integral.value.fill(0, Q + 1, FIRST_GROUP)
    integral.value.fill(0, RAY_VALUES + GROUPS)
  }
  return integral
}

/**
 * The sectors of a slice. What the rings do wrong would be much the same all the way round: those between rings of like width are
 * shifted a little, differently in each slice, so that errors average out; where light is polarised alike in slices a quarter of a circle
 * apart, so that their errors of Q and U cancel.
 */
function slice(rings: number[], index: number, polarised: boolean): Sector[] {
  const shift = (((polarised ? index % (PARTS / 2) : index) * GOLDEN) % 1) - 0.5
  const shifted = rings.map((ring, i) => {
    if (i === 0 || i + 1 === rings.length) return ring
    const below = ring - rings[i - 1]
    const above = rings[i + 1] - ring
    return Math.max(below, above) < ALIKE * Math.min(below, above) ? ring + shift * Math.min(below, above) : ring
  })
  const start = -Math.PI / 2 + (index * Math.PI) / PARTS
  return shifted.slice(1).map((to, i) => ({ from: shifted[i], to, start, end: start + Math.PI / PARTS }))
}
