import type { SphericalWalk } from '../grid/walk.js'
import { AzimuthCurve } from './azimuth-curve.js'
import type { LightSum } from './light-sum.js'
import type { RayMedium } from './ray-medium.js'

/** Where the curve is farther from the straight line than this share of it, the law is too steep for it. */
const BEND = 0.5

/**
 * Scattered light along rays through cells symmetric about z, towards one observer far away or known in directions of several polar angles:
 * a ray between two of these follows the curve of third order through them and their neighbours. Beyond the axis that is the other
 * side of it, beyond the midplane the mirror image.
 */
export class AxialRay {
  /** Direction of the observer from the axis: his azimuth. */
  private ex = 1
  private ey = 0
  /** By direction: its first value, whether it is seen from the other side of the axis or in the mirror, and the sign of U and V there. */
  private readonly first = new Int32Array(4)
  private readonly turned = new Uint8Array(4)
  private readonly mirrored = new Uint8Array(4)
  private readonly sides = new Float64Array(4).fill(1)
  /** The shares of the directions by the curve, and by a straight line. */
  private readonly curved = Float64Array.of(1, 0, 0, 0)
  private readonly straight = new Float64Array(4)
  private readonly curves: AzimuthCurve[]

  constructor(
    private readonly medium: RayMedium,
    private readonly sum: LightSum
  ) {
    const { narrow, polarNodes } = medium
    this.curves = Array.from({ length: 4 }, () => new AzimuthCurve(narrow, !narrow && polarNodes === 1))
  }

  /** Begins a ray that runs away from its observer along the unit vector (ux, uy, uz). */
  begin(ux: number, uy: number, uz: number): void {
    const { polarNodes, cells, slots } = this.medium
    if (polarNodes === 1) return
    const across = Math.sqrt(ux * ux + uy * uy)
    this.ex = across > 0 ? -ux / across : 1
    this.ey = across > 0 ? -uy / across : 0
    const below = uz > 0
    const last = polarNodes - 1
    const position = (Math.atan2(across, Math.abs(uz)) / (Math.PI / 2)) * last
    const node = Math.min(last - 1, position | 0)
    const t = position - node
    this.straight[1] = 1 - t
    this.straight[2] = t
    // Lagrange's polynomials.
    this.curved[0] = (-t * (t - 1) * (t - 2)) / 6
    this.curved[1] = ((t + 1) * (t - 1) * (t - 2)) / 2
    this.curved[2] = (-(t + 1) * t * (t - 2)) / 2
    this.curved[3] = ((t + 1) * t * (t - 1)) / 6
    for (let k = 0; k < 4; k++) {
      const at = node - 1 + k
      const turned = at < 0
      const mirrored = at > last !== below
      this.turned[k] = turned ? 1 : 0
      this.mirrored[k] = mirrored ? 1 : 0
      this.sides[k] = turned !== mirrored ? -1 : 1
      this.first[k] = (turned ? -at : at > last ? 2 * last - at : at) * cells * slots
    }
  }

  /** Adds `weight` times the emission coefficient at path `s` of a walk in its present cell. */
  add(walk: SphericalWalk, s: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { medium, ex, ey, curves } = this
    const { scattered, slots, polarNodes } = medium
    const { cell } = walk
    const x = walk.x0 + s * walk.ux
    const y = walk.y0 + s * walk.uy
    const rho = Math.sqrt(x * x + y * y)
    // Of the azimuth from the observer's plane.
    const cosine = rho > 0 ? (x * ex + y * ey) / rho : 1
    const side = ex * y < ey * x ? -1 : 1
    if (polarNodes === 1) {
      const base = cell * slots
      if (medium.polarised) {
        curves[0].at(scattered, base, cosine)
        this.addCurve(curves[0], base, weight, side, out, withGroups)
      } else {
        const { intensity } = curves[0]
        curves[0].intensityAt(scattered, base, cosine)
        this.sum.addThree(
          base + curves[0].start,
          weight * intensity[0],
          weight * intensity[1],
          weight * intensity[2],
          out,
          withGroups
        )
      }
      return
    }
    const { first, turned, mirrored, sides, curved, straight } = this
    const mirror = cell > 0 ? cell + walk.nt - 1 - 2 * walk.it : cell
    let curve = 0
    let line = 0
    for (let k = 0; k < 4; k++) {
      const base = first[k] + (mirrored[k] === 1 ? mirror : cell) * slots
      const value = curves[k].at(scattered, base, turned[k] === 1 ? -cosine : cosine)
      curve += curved[k] * value
      line += straight[k] * value
    }
    const shares = Math.abs(curve - line) <= BEND * line ? curved : straight
    for (let k = 0; k < 4; k++) {
      const base = first[k] + (mirrored[k] === 1 ? mirror : cell) * slots
      if (shares[k] !== 0) this.addCurve(curves[k], base, weight * shares[k], side * sides[k], out, withGroups)
    }
  }

  private addCurve(
    { start, intensity, even, odd }: AzimuthCurve,
    base: number,
    weight: number,
    side: number,
    out: Float64Array,
    withGroups: boolean
  ): void {
    for (let i = 0; i < 3; i++)
      this.sum.add(base + start + i, weight * intensity[i], weight * even[i], side * weight * odd[i], out, withGroups)
  }
}
