import { dimensionsOf } from '../grid/cells.js'
import { GROUPS } from '../solve/groups.js'
import { observerFrames } from '../transport/scatter-towards.js'
import type { RayMedium } from './ray-medium.js'
import { Q, RAY_VALUES } from './ray-values.js'
import type { ViewBasis } from './view.js'

/** Steps of the lookup by the cosine of azimuth. */
export const AZIMUTH_LOOKUP = 2048

/** The Stokes parameters Q, U and V of a ray, summed cell by cell beside its intensity. */
export class StokesRay {
  /**
   * By the cosine of azimuth: U and V, odd about the observer's plane, over their value at the nearest place that the tally knows: they
   * go to nothing from the middles of the outer bins to that plane.
   */
  readonly oddness: Float32Array
  /** cos and sin of twice the position angle, in the picture, of the projected z axis that tallies refer to. */
  private readonly cos: number
  private readonly sin: number
  private readonly spherical: boolean

  constructor(
    private readonly medium: RayMedium,
    { observer, up, right }: ViewBasis
  ) {
    const { slots, walls } = medium
    this.spherical = dimensionsOf(walls) === 1
    const [, , , x, y, z] = observerFrames(Float64Array.from(observer))
    const [cos, sin] = doubled(x * up[0] + y * up[1] + z * up[2], -(x * right[0] + y * right[1] + z * right[2]))
    this.cos = cos
    this.sin = sin
    this.oddness = Float32Array.from({ length: AZIMUTH_LOOKUP + 1 }, (_, i) => {
      const position = (Math.acos(Math.min(1, -1 + (2 * (i + 0.5)) / AZIMUTH_LOOKUP)) / Math.PI) * slots
      return slots > 1 ? Math.min(1, 2 * position, 2 * (slots - position)) : 1
    })
  }

  /**
   * Adds `weight` times the light at `index` and, with `share`, the next slot. `side` multiplies U and V.
   */
  add(index: number, share: number, side: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { polarised } = this.medium
    if (!polarised) return
    const { parts, value, groups } = polarised
    for (let part = 0; part < parts; part++) {
      const at = index * parts + part
      const here = value[at]
      const amount = part === 0 ? weight : weight * side
      out[Q + part] += amount * (share > 0 ? here + share * (value[at + parts] - here) : here)
      if (!withGroups) continue
      const to = RAY_VALUES + part * GROUPS
      const near = amount * (1 - share)
      for (let g = 0; g < GROUPS; g++) out[to + g] += near * groups[at * GROUPS + g]
      // Where the share is none there may be no next slot.
      if (share === 0) continue
      const far = amount * share
      for (let g = 0; g < GROUPS; g++) out[to + g] += far * groups[(at + parts) * GROUPS + g]
    }
  }

  /** Refers what was added to the picture's north, and adds starlight scattered once, polarised by `radial` along the radius. */
  finish(x: number, y: number, radial: number, out: Float64Array, withGroups: boolean): void {
    if (this.spherical) {
      out[Q] += radial
      return
    }
    turnStokes(out, this.cos, this.sin, withGroups)
    this.addRadial(x, y, radial, out)
  }

  /** Adds light polarised along the direction from a star, which is seen (x, y) away, to one that refers to the picture's north. */
  addRadial(x: number, y: number, radial: number, out: Float64Array): void {
    const [cos, sin] = doubled(y, -x)
    out[Q] += radial * cos
    out[Q + 1] += radial * sin
  }
}

/** Cosine and sine of twice the position angle of a direction, of any length, given by its north and east. */
export function doubled(north: number, east: number): [number, number] {
  const length2 = north * north + east * east
  return length2 > 0 ? [(north * north - east * east) / length2, (2 * north * east) / length2] : [1, 0]
}

/** Turns Q and U of a ray, referred to a direction, to the north from which that is turned by half the angle of `cos` and `sin`. */
export function turnStokes(out: Float64Array, cos: number, sin: number, withGroups: boolean): void {
  const q = out[Q]
  const u = out[Q + 1]
  out[Q] = q * cos - u * sin
  out[Q + 1] = q * sin + u * cos
  if (!withGroups) return
  for (let i = RAY_VALUES; i < RAY_VALUES + GROUPS; i++) {
    const dq = out[i]
    const du = out[i + GROUPS]
    out[i] = dq * cos - du * sin
    out[i + GROUPS] = dq * sin + du * cos
  }
}
