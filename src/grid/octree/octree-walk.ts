import { CHILD, CORNER, LEVELS, NEIGHBOUR, type Octree, RECORD, SIZE } from './octree.js'

/**
 * A straight walk through the cells of an octree, kept as `SphericalWalk` keeps it: the closest approach to the origin of
 * coordinates (x0, y0, z0) and the path `s` from there along the unit vector (ux, uy, uz).
 *
 * Of each pair of walls only the one ahead is ever looked at, and a wall is known by the path at which the ray meets its plane.
 * On the other side the cell is found from the neighbour downwards, by comparing the path with those of the planes that divide
 * it; a point is never located anew. So no step is negative, and rounding can neither lose a ray nor trap it.
 */
export class OctreeWalk {
  x0 = 0
  y0 = 0
  z0 = 0
  ux = 0
  uy = 0
  uz = 1
  /** Path from the closest approach, cm. */
  s = 0
  /** Square of the impact parameter about the origin of coordinates. */
  b2 = 0
  /** Index of the cell the ray is in; -1 when it has left the cube. */
  cell = 0
  /** Where the next wall stands on the path, set by `toWall`. */
  sWall = 0
  /** Where the record of the node begins. */
  private record = 0
  private face = 0
  /** 1 / ux and so on; infinite along a wall. */
  private wx = 0
  private wy = 0
  private wz = 0
  private readonly records: Int32Array
  private readonly nodeOf: Int32Array
  /** Least coordinates of the whole cube. */
  private readonly ox: number
  private readonly oy: number
  private readonly oz: number
  private readonly unit: number

  constructor({ origin, side, records, nodeOf }: Octree) {
    this.records = records
    this.nodeOf = nodeOf
    this.ox = origin[0]
    this.oy = origin[1]
    this.oz = origin[2]
    this.unit = side / 2 ** LEVELS
  }

  get x(): number {
    return this.x0 + this.s * this.ux
  }

  get y(): number {
    return this.y0 + this.s * this.uy
  }

  get z(): number {
    return this.z0 + this.s * this.uz
  }

  /** Starts a ray at a point of a cell. */
  startIn(x: number, y: number, z: number, ux: number, uy: number, uz: number, cell: number): void {
    this.turn(x, y, z, ux, uy, uz)
    this.record = RECORD * this.nodeOf[cell]
    this.cell = cell
  }

  /** Starts a ray at a point inside the cube whose cell is not known. */
  startAt(x: number, y: number, z: number, ux: number, uy: number, uz: number): void {
    const { records, unit } = this
    this.turn(x, y, z, ux, uy, uz)
    let at = 0
    while (records[at + CHILD] >= 0) {
      const half = 0.5 * records[at + SIZE]
      let k = x >= this.ox + (records[at + CORNER] + half) * unit ? 1 : 0
      if (y >= this.oy + (records[at + CORNER + 1] + half) * unit) k |= 2
      if (z >= this.oz + (records[at + CORNER + 2] + half) * unit) k |= 4
      at = RECORD * (records[at + CHILD] + k)
    }
    this.record = at
    this.cell = -1 - records[at + CHILD]
  }

  /** Gives the ray a new direction at a point of the cell it is in. */
  turn(x: number, y: number, z: number, ux: number, uy: number, uz: number): void {
    const s = x * ux + y * uy + z * uz
    this.aim(x - s * ux, y - s * uy, z - s * uz, ux, uy, uz)
    this.s = s
  }

  /** Starts a ray that comes from far away with closest approach (x0, y0, z0), where it meets the cube; false when it misses. */
  enter(x0: number, y0: number, z0: number, ux: number, uy: number, uz: number): boolean {
    this.aim(x0, y0, z0, ux, uy, uz)
    const length = this.records[SIZE] * this.unit
    let [first, last] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]
    for (let a = 0; a < 3; a++) {
      const low = a === 0 ? this.ox : a === 1 ? this.oy : this.oz
      const p = a === 0 ? x0 : a === 1 ? y0 : z0
      const u = a === 0 ? ux : a === 1 ? uy : uz
      const w = a === 0 ? this.wx : a === 1 ? this.wy : this.wz
      if (u === 0) {
        if (p < low || p >= low + length) return false
        continue
      }
      first = Math.max(first, ((u > 0 ? low : low + length) - p) * w)
      last = Math.min(last, ((u > 0 ? low + length : low) - p) * w)
    }
    if (!(first < last)) return false
    this.s = first
    this.descend(0)
    return true
  }

  /** Path to the next wall of the cell, cm, never negative; remembers the wall for `cross`. */
  toWall(): number {
    const { records, record, unit, ux, uy, uz } = this
    const size = records[record + SIZE]
    let next = Number.POSITIVE_INFINITY
    let face = 0
    if (ux !== 0) {
      const corner = records[record + CORNER]
      next = (this.ox + (ux > 0 ? corner + size : corner) * unit - this.x0) * this.wx
      face = ux > 0 ? 1 : 0
    }
    if (uy !== 0) {
      const corner = records[record + CORNER + 1]
      const y = (this.oy + (uy > 0 ? corner + size : corner) * unit - this.y0) * this.wy
      if (y < next) {
        next = y
        face = uy > 0 ? 3 : 2
      }
    }
    if (uz !== 0) {
      const corner = records[record + CORNER + 2]
      const z = (this.oz + (uz > 0 ? corner + size : corner) * unit - this.z0) * this.wz
      if (z < next) {
        next = z
        face = uz > 0 ? 5 : 4
      }
    }
    if (next < this.s) next = this.s
    this.sWall = next
    this.face = face
    return next - this.s
  }

  /** Steps over the wall found by `toWall`; returns the new cell, or -1 outside. */
  cross(): number {
    this.s = this.sWall
    const beyond = this.records[this.record + NEIGHBOUR + this.face]
    if (beyond < 0) {
      this.cell = -1
      return -1
    }
    this.descend(RECORD * beyond)
    return this.cell
  }

  /** Distance from a point of the present cell to its nearest wall, cm. */
  clearance(x: number, y: number, z: number): number {
    const { records, record, unit } = this
    const length = records[record + SIZE] * unit
    const dx = x - this.ox - records[record + CORNER] * unit
    const dy = y - this.oy - records[record + CORNER + 1] * unit
    const dz = z - this.oz - records[record + CORNER + 2] * unit
    return Math.min(dx, length - dx, dy, length - dy, dz, length - dz)
  }

  /** Where a point lies in the present cell, in half sides from its middle, three numbers into `out`; returns the side, cm. */
  within(x: number, y: number, z: number, out: Float64Array): number {
    const { records, record, unit } = this
    const half = 0.5 * records[record + SIZE] * unit
    out[0] = (x - this.ox - records[record + CORNER] * unit) / half - 1
    out[1] = (y - this.oy - records[record + CORNER + 1] * unit) / half - 1
    out[2] = (z - this.oz - records[record + CORNER + 2] * unit) / half - 1
    return 2 * half
  }

  private aim(x0: number, y0: number, z0: number, ux: number, uy: number, uz: number): void {
    this.x0 = x0
    this.y0 = y0
    this.z0 = z0
    this.ux = ux
    this.uy = uy
    this.uz = uz
    this.wx = 1 / ux
    this.wy = 1 / uy
    this.wz = 1 / uz
    this.b2 = x0 * x0 + y0 * y0 + z0 * z0
  }

  /** Down to the cell, below the node whose record is given, that the ray is in at `s`. */
  private descend(from: number): void {
    const { records, unit, s, ux, uy, uz } = this
    let at = from
    let first = records[at + CHILD]
    while (first >= 0) {
      const half = 0.5 * records[at + SIZE]
      const x = this.ox + (records[at + CORNER] + half) * unit - this.x0
      const y = this.oy + (records[at + CORNER + 1] + half) * unit - this.y0
      const z = this.oz + (records[at + CORNER + 2] + half) * unit - this.z0
      let k = 0
      if (ux > 0 ? s >= x * this.wx : ux < 0 ? s < x * this.wx : x <= 0) k = 1
      if (uy > 0 ? s >= y * this.wy : uy < 0 ? s < y * this.wy : y <= 0) k |= 2
      if (uz > 0 ? s >= z * this.wz : uz < 0 ? s < z * this.wz : z <= 0) k |= 4
      at = RECORD * (first + k)
      first = records[at + CHILD]
    }
    this.record = at
    this.cell = -1 - first
  }
}
