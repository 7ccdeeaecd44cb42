import type { Walk } from '../grid/cells.js'
import { type ScatterMedium, scatteringOf } from './scatter-medium.js'
import { pathToStar } from './star-spheres.js'

/** The cells on the way of starlight through all dust, kept while it is decided where it is scattered. */
export class WayFromStar {
  private cells = new Int32Array(256)
  /** Where each cell begins along the walk, cm, and the optical depth before it. */
  private from = new Float64Array(256)
  private before = new Float64Array(256)

  /** Takes the walk to the first scattering on its way; returns the chance of one, with the albedo: 0 where nothing is on the way. */
  scatter(walk: Walk, medium: ScatterMedium, uniform: () => number): number {
    const { extinction, spheres } = medium
    const { x, y, z, ux, uy, uz } = walk
    let count = 0
    let total = 0
    let ends = false
    do {
      const toStar = spheres.length > 0 ? pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
      const toWall = walk.toWall()
      ends = toStar < toWall
      const depth = walk.weighed(Math.min(toStar, toWall)) * extinction[walk.cell]
      if (!(depth > 0)) continue
      if (count === this.cells.length) this.grow()
      this.cells[count] = walk.cell
      this.from[count] = walk.s
      this.before[count++] = total
      total += depth
    } while (!ends && walk.cross() >= 0)
    if (count === 0) return 0
    const reached = -Math.log1p(uniform() * Math.expm1(-total))
    let low = 0
    let high = count
    while (high - low > 1) {
      const middle = (low + high) >> 1
      if (this.before[middle] <= reached) low = middle
      else high = middle
    }
    const cell = this.cells[low]
    walk.startIn(x, y, z, ux, uy, uz, cell)
    walk.s = this.from[low]
    walk.toWall()
    walk.s += walk.stepOf((reached - this.before[low]) / extinction[cell])
    return (-Math.expm1(-total) * scatteringOf(medium, cell)) / extinction[cell]
  }

  private grow(): void {
    const { cells, from, before } = this
    this.cells = new Int32Array(2 * cells.length)
    this.from = new Float64Array(2 * cells.length)
    this.before = new Float64Array(2 * cells.length)
    this.cells.set(cells)
    this.from.set(from)
    this.before.set(before)
  }
}
