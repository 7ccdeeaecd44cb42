import { GOLDEN } from '../math/golden.js'
import { GROUPS } from '../solve/groups.js'
import type { IntensityField } from './field.js'
import { integratePatch, type PatchIntegral, type Sector } from './patch.js'
import { RadialProfile } from './profile.js'
import { FIRST_GROUP, Q, RAY_VALUES } from './ray-values.js'
import { cutInTwo, ringsBetween } from './rings.js'
import { unflattened } from './unflattened.js'

/** Parts of half a circle in which an aperture is first divided. */
const PARTS = 8
/** Rings beyond the outermost wall, where a flattened picture has none: as many for each doubling. */
const RINGS_A_DOUBLING = 4
/** Above this axis ratio a disk looks much alike in all directions. */
const ROUND = 0.7

/**
 * Integral of an intensity field over a disk of `radius` (cm, may be infinite). `mirrored`: the right half of the picture
 * equals the left one, and only one is traced. Of a profile it is exact.
 */
export function integrateAperture(field: IntensityField, radius: number, tolerance: number, mirrored: boolean): PatchIntegral {
  if (field instanceof RadialProfile) return { value: field.integrate(radius), error: 0 }
  const { flattening } = field
  const edge = Math.min(radius, field.outermost)
  const round = unflattened(field)
  const rings = ringsBetween(round, 0, edge)
  const beyond = Math.ceil(RINGS_A_DOUBLING * Math.log2(1 / flattening))
  for (let i = 1; i <= beyond; i++) rings.push(edge * flattening ** (-i / beyond))
  const patch = {
    parts: sectors(rings, mirrored, flattening > ROUND),
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
 * Rings cut into sectors, each ring turned by another angle, and `halved` each sector in two: a disk looks much alike in all its rings,
 * from the pole in all directions, and rays at the same places in each would all be wrong by the same amount.
 */
function sectors(rings: number[], mirrored: boolean, halved: boolean): Sector[] {
  const count = mirrored ? PARTS : 2 * PARTS
  const width = Math.PI / PARTS
  return rings.slice(1).flatMap((to, k) => {
    const from = rings[k]
    const turn = ((k * GOLDEN) % 1) - 0.5
    return Array.from({ length: count }, (_, i) => {
      // The ends of a half circle stay where they are.
      const first = mirrored && i === 0 ? 0 : i + turn
      const last = mirrored && i === count - 1 ? count : i + 1 + turn
      const [start, end] = [first, last].map((at) => at * width - Math.PI / 2)
      const sector = { from, to, start, end }
      return halved ? cutInTwo(sector, k * count + i) : [sector]
    }).flat()
  })
}
