import { dimensionsOf, type Walk } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { ANGLE_NODES } from '../solve/scattered-light.js'
import { aboutDirection, NEAR_DIRECTIONS } from '../transport/observers.js'
import { AxialRay } from './axial-ray.js'
import { LightSum } from './light-sum.js'
import type { RayMedium } from './ray-medium.js'

/** Light that packets scattered, summed cell by cell along a ray in the direction of its observer. */
export class ScatteredRay {
  private readonly dimensions: 1 | 2 | 3
  private readonly sum: LightSum
  private readonly axial: AxialRay
  /** The number of each cell near to the observer among them, their light, and the directions about that of the ray with their shares. */
  private readonly near: Map<number, number>
  private readonly nearSum: LightSum | undefined
  private readonly directions = new Int32Array(4)
  private readonly shares = new Float64Array(4)

  constructor(medium: RayMedium) {
    const { walls, scattered, scatteredGroups, polarised, near } = medium
    this.dimensions = dimensionsOf(walls)
    this.sum = new LightSum(scattered, scatteredGroups, polarised)
    this.axial = new AxialRay(medium, this.sum)
    this.near = new Map(near && Array.from(near.cells, (cell, i) => [cell, i]))
    this.nearSum = near && new LightSum(near.value, near.groups, near.polarised)
  }

  /** Begins a ray that runs away from its observer along the unit vector (ux, uy, uz). */
  begin(ux: number, uy: number, uz: number): void {
    if (this.nearSum) aboutDirection(-ux, -uy, -uz, this.directions, this.shares)
    if (this.dimensions === 2) this.axial.begin(ux, uy, uz)
  }

  /** Adds `weight` times the emission coefficient at path `s` of a walk in its present cell. */
  add(walk: Walk, s: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { dimensions, sum, nearSum } = this
    const { cell } = walk
    if (dimensions === 2) this.axial.add(walk as SphericalWalk, s, weight, out, withGroups)
    else if (dimensions === 1) {
      // cos of the angle to the observer, who stands towards negative s.
      const cosine = -s / Math.sqrt(walk.b2 + s * s)
      const position = Math.sqrt(0.5 * (1 - cosine)) * (ANGLE_NODES - 1)
      const node = Math.min(ANGLE_NODES - 2, position | 0)
      const next = weight * (position - node)
      const index = cell * ANGLE_NODES + node
      sum.add(index, weight - next, weight - next, weight - next, out, withGroups)
      sum.add(index + 1, next, next, next, out, withGroups)
    } else {
      const nearby = nearSum && this.near.get(cell)
      if (nearby === undefined) sum.add(cell, weight, weight, weight, out, withGroups)
      else this.addNear(nearby, weight, out, withGroups)
    }
  }

  private addNear(cell: number, weight: number, out: Float64Array, withGroups: boolean): void {
    const { directions, shares, nearSum } = this
    for (let k = 0; k < 4; k++) {
      const part = weight * shares[k]
      nearSum!.add(cell * NEAR_DIRECTIONS + directions[k], part, part, part, out, withGroups)
    }
  }
}
