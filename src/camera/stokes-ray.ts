import { dimensionsOf } from '../grid/cells.js'
import type { Vector } from '../scene/types.js'
import { GROUPS } from '../solve/groups.js'
import { observerFrames } from '../transport/observer-frame.js'
import type { RayMedium } from './ray-medium.js'
import { Q, RAY_VALUES } from './ray-values.js'
import type { Sight, View } from './sight.js'
import type { ViewBasis } from './view.js'

/** The Stokes parameters Q, U and V of a ray, summed cell by cell beside its intensity. */
export class StokesRay {
  /** cos and sin of twice the position angle, in the picture of an observer far away, of the projected z axis that tallies refer to. */
  private readonly cos: number
  private readonly sin: number
  private readonly spherical: boolean
  private readonly towardsStar = new Float64Array(2)

  constructor(
    medium: RayMedium,
    view: View,
    private readonly sight: Sight
  ) {
    this.spherical = dimensionsOf(medium.walls) === 1
    const [cos, sin] = 'from' in view ? [1, 0] : zAxisIn(view)
    this.cos = cos
    this.sin = sin
  }

  /**
   * Refers what was added to north (see Sight.directionTo), and adds light of the star at the origin scattered once, polarised by `radial`
   * along the direction to it; in one dimension all stays referred to that.
   */
  finish(radial: number, out: Float64Array, withGroups: boolean): void {
    if (this.spherical) {
      out[Q] += radial
      return
    }
    turnStokes(out, this.cos, this.sin, withGroups)
    this.addRadial(ORIGIN, radial, out)
  }

  /** Adds light polarised along the direction to a star to what refers to north. */
  addRadial(star: Vector, radial: number, out: Float64Array): void {
    if (radial === 0) return
    const { sight, towardsStar } = this
    sight.directionTo(star, towardsStar)
    const [cos, sin] = doubled(towardsStar[0], towardsStar[1])
    out[Q] += radial * cos
    out[Q + 1] += radial * sin
  }
}

const ORIGIN: Vector = [0, 0, 0]

/** Cosine and sine of twice the position angle of the projected z axis in a picture along parallel lines. */
function zAxisIn({ observer, up, right }: ViewBasis): [number, number] {
  const [, , , x, y, z] = observerFrames(Float64Array.from(observer))
  return doubled(x * up[0] + y * up[1] + z * up[2], -(x * right[0] + y * right[1] + z * right[2]))
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
