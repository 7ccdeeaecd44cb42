import { dimensionsOf, type Walk } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { GROUPS } from '../solve/groups.js'
import { ANGLE_NODES } from '../solve/scattered-light.js'
import { aboutDirection, NEAR_DIRECTIONS } from '../transport/observers.js'
import type { RayMedium } from './ray-medium.js'
import { FIRST_GROUP, SCATTERED } from './ray-values.js'
import { AZIMUTH_LOOKUP, type StokesRay } from './stokes-ray.js'

/** Light that packets scattered, summed cell by cell along a ray in the direction of its observer. */
export class ScatteredRay {
  private readonly dimensions: 1 | 2 | 3
  private readonly azimuthPosition: Float32Array
  /** Direction of the observer from the axis: his azimuth. */
  private ex = 1
  private ey = 0
  /** He is below the midplane: what he sees is the mirror image of what is known. */
  private below = false
  /** The polar angle of his direction: first value of its node, and the share of the next node. */
  private first = 0
  private share = 0
  /** The number of each cell near to the observer among them, and the directions about that of the ray with their shares. */
  private readonly near: Map<number, number> | undefined
  private readonly directions = new Int32Array(4)
  private readonly shares = new Float64Array(4)

  constructor(
    private readonly medium: RayMedium,
    private readonly stokes: StokesRay | undefined
  ) {
    this.dimensions = dimensionsOf(medium.walls)
    this.near = medium.near && new Map(Array.from(medium.near.cells, (cell, i) => [cell, i]))
    this.azimuthPosition = Float32Array.from({ length: AZIMUTH_LOOKUP + 1 }, (_, i) => {
      const angle = Math.acos(Math.min(1, -1 + (2 * (i + 0.5)) / AZIMUTH_LOOKUP))
      return Math.min(medium.slots - 1, Math.max(0, (angle / Math.PI) * medium.slots - 0.5))
    })
  }

  /** Begins a ray that runs away from its observer along the unit vector (ux, uy, uz). */
  begin(ux: number, uy: number, uz: number): void {
    const { polarNodes, cells, slots } = this.medium
    if (this.near) aboutDirection(-ux, -uy, -uz, this.directions, this.shares)
    if (polarNodes === 1) return
    const across = Math.sqrt(ux * ux + uy * uy)
    this.ex = across > 0 ? -ux / across : 1
    this.ey = across > 0 ? -uy / across : 0
    this.below = uz > 0
    const position = (Math.atan2(across, Math.abs(uz)) / (Math.PI / 2)) * (polarNodes - 1)
    const node = Math.min(polarNodes - 2, position | 0)
    this.first = node * cells * slots
    this.share = position - node
  }

  /** Adds `weight` times the emission coefficient at path `s` of a walk in its present cell. */
  add(walk: Walk, s: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { dimensions, stokes, share: tilt } = this
    const { slots, cells, polarNodes } = this.medium
    const nearby = this.near?.get(walk.cell)
    if (nearby !== undefined) {
      this.addNear(nearby, weight, out, withGroups)
      return
    }
    let index = walk.cell
    let share = 0
    let side = 1
    if (dimensions === 1) {
      // cos of the angle to the observer, who stands towards negative s.
      const cosine = -s / Math.sqrt(walk.b2 + s * s)
      const position = Math.sqrt(0.5 * (1 - cosine)) * (ANGLE_NODES - 1)
      const node = Math.min(ANGLE_NODES - 2, position | 0)
      index = walk.cell * ANGLE_NODES + node
      share = position - node
    } else if (dimensions === 2) {
      const px = walk.x0 + s * walk.ux
      const py = walk.y0 + s * walk.uy
      const rho = Math.sqrt(px * px + py * py)
      const entry = rho > 0 ? (((px * this.ex + py * this.ey) / rho + 1) * (AZIMUTH_LOOKUP / 2)) | 0 : 0
      const position = this.azimuthPosition[entry]
      if (stokes) side = py < 0 ? -stokes.oddness[entry] : stokes.oddness[entry]
      const bin = Math.min(slots - 2, position | 0)
      const { nt, it } = walk as SphericalWalk
      const cell = this.below && walk.cell > 0 ? walk.cell + nt - 1 - 2 * it : walk.cell
      index = this.first + cell * slots + bin
      share = position - bin
    }
    if (polarNodes === 1) this.sum(index, share, weight, out, withGroups)
    else {
      this.sum(index, share, weight * (1 - tilt), out, withGroups)
      this.sum(index + cells * slots, share, weight * tilt, out, withGroups)
    }
    if (stokes) stokes.add(index, share, side, weight, out, withGroups)
  }

  private addNear(index: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { value, groups } = this.medium.near!
    for (let k = 0; k < 4; k++) {
      const at = index * NEAR_DIRECTIONS + this.directions[k]
      const part = weight * this.shares[k]
      out[SCATTERED] += part * value[at]
      if (withGroups) for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += part * groups[at * GROUPS + g]
    }
  }

  private sum(index: number, share: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { scattered, scatteredGroups } = this.medium
    out[SCATTERED] +=
      weight * (share > 0 ? scattered[index] + share * (scattered[index + 1] - scattered[index]) : scattered[index])
    if (!withGroups) return
    const near = weight * (1 - share)
    const far = weight * share
    const at = index * GROUPS
    // Where the share is none there may be no next bin.
    if (far === 0) for (let g = 0; g < GROUPS; g++) out[FIRST_GROUP + g] += near * scatteredGroups[at + g]
    else
      for (let g = 0; g < GROUPS; g++)
        out[FIRST_GROUP + g] += near * scatteredGroups[at + g] + far * scatteredGroups[at + GROUPS + g]
  }
}
