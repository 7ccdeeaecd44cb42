import { StraightWalk } from '../straight-walk.js'
import { CHILD, LEVELS, NEIGHBOUR, type Octree, OUTSIDE, RECORD, SIZE } from './octree.js'
import { CUT, SLOPE } from './profile.js'

/**
 * A straight walk through the cells of an octree.
 *
 * Coordinates of walls are whole numbers of the smallest unit; a plane is known by the path at which the ray meets it, which
 * depends on that number alone. Of each pair of walls only the one ahead is ever looked at. On the other side the cell is found from the
 * neighbour downwards, by comparing the path with those of the planes that divide it; a point is never located anew. So no step is
 * negative, and rounding can neither lose a ray nor trap it.
 *
 * A step reads one record, that of the family of the cell, and another where it leaves it: side and corner of a cell are kept in
 * the walk and follow from the crossing.
 */
export class OctreeWalk extends StraightWalk {
  /** Where the record of the family begins, and which of its children the cell is. */
  private record = 0
  private child = 0
  /** Side and least coordinates of the cell in units. */
  private size = 0
  private cx = 0
  private cy = 0
  private cz = 0
  /** A plane across x is met at the path (x - fromX) perX: x0 and 1 / ux, or -Infinity and Infinity where it is never met. */
  private fromX = 0
  private fromY = 0
  private fromZ = 0
  private perX = 0
  private perY = 0
  private perZ = 0
  /** -1 where the ray climbs in x, so that `size & upX` is what the wall ahead is beyond the corner; 0 where it falls. */
  private upX = 0
  private upY = 0
  private upZ = 0
  /** Axis of the next wall, set by `toWall`. */
  private axis = 0
  private readonly records: Int32Array
  private readonly corners: Int32Array
  private readonly places: Int32Array
  private readonly profiles: Int32Array
  private readonly cuts: Float32Array
  /** Least coordinates of the whole cube. */
  private readonly ox: number
  private readonly oy: number
  private readonly oz: number
  private readonly unit: number
  private readonly perUnit: number

  constructor({ origin, side, records, corners, places, profiles, cuts }: Octree) {
    super()
    this.records = records
    this.corners = corners
    this.places = places
    this.profiles = profiles
    this.cuts = cuts
    this.ox = origin[0]
    this.oy = origin[1]
    this.oz = origin[2]
    this.unit = side / 2 ** LEVELS
    this.perUnit = 1 / this.unit
  }

  /** Starts a ray at a point of a cell. */
  startIn(x: number, y: number, z: number, ux: number, uy: number, uz: number, cell: number): void {
    const { records, corners } = this
    const place = this.places[cell]
    const family = place >> 3
    const size = records[RECORD * family + SIZE]
    this.turn(x, y, z, ux, uy, uz)
    this.cell = cell
    this.record = RECORD * family
    this.child = place & 7
    this.size = size
    this.cx = corners[3 * family] + (place & 1 ? size : 0)
    this.cy = corners[3 * family + 1] + (place & 2 ? size : 0)
    this.cz = corners[3 * family + 2] + (place & 4 ? size : 0)
  }

  /** Starts a ray at a point inside the cube whose cell is not known. */
  startAt(x: number, y: number, z: number, ux: number, uy: number, uz: number): void {
    const { records, unit } = this
    this.turn(x, y, z, ux, uy, uz)
    let [cx, cy, cz] = [0, 0, 0]
    let family = 0
    do {
      const record = RECORD * family
      const size = records[record + SIZE]
      let child = 0
      if (x >= this.ox + (cx + size) * unit) {
        child = 1
        cx += size
      }
      if (y >= this.oy + (cy + size) * unit) {
        child |= 2
        cy += size
      }
      if (z >= this.oz + (cz + size) * unit) {
        child |= 4
        cz += size
      }
      this.record = record
      this.child = child
      this.size = size
      family = records[record + CHILD + child]
    } while (family >= 0)
    this.cx = cx
    this.cy = cy
    this.cz = cz
    this.cell = -1 - family
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
    const length = this.unit * 2 ** LEVELS
    let [first, last] = [Number.NEGATIVE_INFINITY, Number.POSITIVE_INFINITY]
    for (let a = 0; a < 3; a++) {
      const low = a === 0 ? this.ox : a === 1 ? this.oy : this.oz
      const p = a === 0 ? x0 : a === 1 ? y0 : z0
      const u = a === 0 ? ux : a === 1 ? uy : uz
      if (u === 0) {
        if (p < low || p >= low + length) return false
        continue
      }
      const per = a === 0 ? this.perX : a === 1 ? this.perY : this.perZ
      first = Math.max(first, ((u > 0 ? low : low + length) - p) * per)
      last = Math.min(last, ((u > 0 ? low + length : low) - p) * per)
    }
    if (!(first < last)) return false
    this.s = first
    this.cx = 0
    this.cy = 0
    this.cz = 0
    this.descend(0)
    return true
  }

  /** Path to the next wall of the cell, cm, never negative; remembers the wall for `cross`. */
  toWall(): number {
    const { size, unit, s } = this
    let next = (this.ox + (this.cx + (size & this.upX)) * unit - this.fromX) * this.perX
    let axis = 0
    const y = (this.oy + (this.cy + (size & this.upY)) * unit - this.fromY) * this.perY
    if (y < next) {
      next = y
      axis = 1
    }
    const z = (this.oz + (this.cz + (size & this.upZ)) * unit - this.fromZ) * this.perZ
    if (z < next) {
      next = z
      axis = 2
    }
    if (next < s) next = s
    this.sWall = next
    this.axis = axis
    return next - s
  }

  /** Steps over the wall found by `toWall`; returns the new cell, or -1 outside. */
  cross(): number {
    const { records, axis } = this
    const bit = 1 << axis
    const up = axis === 0 ? this.upX : axis === 1 ? this.upY : this.upZ
    let record = this.record
    let child = this.child ^ bit
    this.s = this.sWall
    if ((child ^ up) & bit) {
      const beyond = records[record + NEIGHBOUR + 2 * axis - up]
      if (beyond >= 0) record = RECORD * beyond
      else if (beyond === OUTSIDE) {
        this.cell = -1
        return -1
      } else {
        record = RECORD * ((-2 - beyond) >> 3)
        child = (-2 - beyond) & 7
      }
    }
    // The corner of the cube of this size that holds what is just beyond the wall.
    const size = records[record + SIZE]
    const step = up < 0 ? this.size : -1
    this.cx = (axis === 0 ? this.cx + step : this.cx) & -size
    this.cy = (axis === 1 ? this.cy + step : this.cy) & -size
    this.cz = (axis === 2 ? this.cz + step : this.cz) & -size
    this.record = record
    this.child = child
    this.size = size
    const within = records[record + CHILD + child]
    if (within >= 0) this.descend(within)
    else this.cell = -1 - within
    return this.cell
  }

  density(s: number): number {
    const { perUnit, size } = this
    const profile = this.profiles[this.cell]
    if (profile === 0) return 1
    const half = 0.5 * size
    const x = (this.x0 + s * this.ux - this.ox) * perUnit - this.cx - half
    const y = (this.y0 + s * this.uy - this.oy) * perUnit - this.cy - half
    const z = (this.z0 + s * this.uz - this.oz) * perUnit - this.cz - half
    if ((profile & 1) === 0)
      return 1 + ((profile >> 24) * x + ((profile << 8) >> 24) * y + ((profile << 16) >> 24) * z) / (SLOPE * size)
    const { cuts } = this
    const at = CUT * (profile >>> 8)
    return Math.max(0, cuts[at + 4] + (cuts[at + 5] * x + cuts[at + 6] * y + cuts[at + 7] * z) / size)
  }

  trim(step: number): void {
    const { s } = this
    this.begin = s
    this.end = s + step
    const profile = this.profiles[this.cell]
    if ((profile & 1) === 0) return
    const depth = this.behindEdge(profile, this.x, this.y, this.z)
    const { cuts, ux, uy, uz } = this
    const at = CUT * (profile >>> 8)
    const rise = cuts[at] * ux + cuts[at + 1] * uy + cuts[at + 2] * uz
    if (depth > 0) {
      if (rise < 0) this.end = Math.min(this.end, s - depth / rise)
    } else this.begin = rise > 0 ? Math.min(this.end, s - depth / rise) : this.end
  }

  /** Of a density that varies evenly the mean is that in the middle. */
  weighed(step: number): number {
    if ((this.profiles[this.cell] & 1) === 0) return step * this.density(this.s + 0.5 * step)
    this.trim(step)
    return (this.end - this.begin) * this.density(0.5 * (this.begin + this.end))
  }

  stepOf(weighed: number): number {
    this.trim(this.sWall - this.s)
    const { begin, end } = this
    const here = Math.max(this.density(begin), 0)
    // Along the ray the density changes evenly: its integral is a parabola.
    const change = end > begin ? (this.density(end) - here) / (end - begin) : 0
    const sum = here + Math.sqrt(Math.max(here * here + 2 * change * weighed, 0))
    return (sum > 0 ? Math.min(begin + (2 * weighed) / sum, end) : end) - this.s
  }

  /** Whether the edge of the dust cuts the present cell. */
  atEdge(): boolean {
    return (this.profiles[this.cell] & 1) === 1
  }

  /** How far a point is behind the edge of the dust that cuts the present cell, of such a profile, cm. */
  private behindEdge(profile: number, x: number, y: number, z: number): number {
    const { cuts, unit, size } = this
    const at = CUT * (profile >>> 8)
    const half = 0.5 * size
    const px = x - this.ox - (this.cx + half) * unit
    const py = y - this.oy - (this.cy + half) * unit
    const pz = z - this.oz - (this.cz + half) * unit
    return cuts[at] * px + cuts[at + 1] * py + cuts[at + 2] * pz - cuts[at + 3] * size * unit
  }

  /** Distance from a point of the present cell to its nearest wall, or to the edge of the dust, cm. */
  clearance(x: number, y: number, z: number): number {
    const { unit } = this
    const length = this.size * unit
    const profile = this.profiles[this.cell]
    const edge = (profile & 1) === 0 ? length : this.behindEdge(profile, x, y, z)
    const dx = x - this.ox - this.cx * unit
    const dy = y - this.oy - this.cy * unit
    const dz = z - this.oz - this.cz * unit
    return Math.min(dx, length - dx, dy, length - dy, dz, length - dz, edge)
  }

  /** Where a point lies in the present cell, in half sides from its middle, three numbers into `out`; returns the side, cm. */
  within(x: number, y: number, z: number, out: Float64Array): number {
    const { unit } = this
    const half = 0.5 * this.size * unit
    out[0] = (x - this.ox - this.cx * unit) / half - 1
    out[1] = (y - this.oy - this.cy * unit) / half - 1
    out[2] = (z - this.oz - this.cz * unit) / half - 1
    return 2 * half
  }

  private aim(x0: number, y0: number, z0: number, ux: number, uy: number, uz: number): void {
    this.x0 = x0
    this.y0 = y0
    this.z0 = z0
    this.ux = ux
    this.uy = uy
    this.uz = uz
    this.b2 = x0 * x0 + y0 * y0 + z0 * z0
    this.fromX = ux === 0 ? Number.NEGATIVE_INFINITY : x0
    this.fromY = uy === 0 ? Number.NEGATIVE_INFINITY : y0
    this.fromZ = uz === 0 ? Number.NEGATIVE_INFINITY : z0
    this.perX = ux === 0 ? Number.POSITIVE_INFINITY : 1 / ux
    this.perY = uy === 0 ? Number.POSITIVE_INFINITY : 1 / uy
    this.perZ = uz === 0 ? Number.POSITIVE_INFINITY : 1 / uz
    this.upX = ux > 0 ? -1 : 0
    this.upY = uy > 0 ? -1 : 0
    this.upZ = uz > 0 ? -1 : 0
  }

  /** Down to the cell that the ray is in at `s`, from the family of a cube whose corner is set. */
  private descend(family: number): void {
    const { records, unit, s, ux, uy, uz } = this
    let { cx, cy, cz } = this
    let record = 0
    let child = 0
    let size = 0
    let within = family
    do {
      record = RECORD * within
      size = records[record + SIZE]
      child = 0
      const x = cx + size
      const y = cy + size
      const z = cz + size
      // Beyond the plane in the middle, along the ray or, where it runs along the plane, by its place.
      const planeX = this.ox + x * unit
      if (ux === 0 ? planeX <= this.x0 : s >= (planeX - this.x0) * this.perX === ux > 0) {
        child = 1
        cx = x
      }
      const planeY = this.oy + y * unit
      if (uy === 0 ? planeY <= this.y0 : s >= (planeY - this.y0) * this.perY === uy > 0) {
        child |= 2
        cy = y
      }
      const planeZ = this.oz + z * unit
      if (uz === 0 ? planeZ <= this.z0 : s >= (planeZ - this.z0) * this.perZ === uz > 0) {
        child |= 4
        cz = z
      }
      within = records[record + CHILD + child]
    } while (within >= 0)
    this.record = record
    this.child = child
    this.size = size
    this.cx = cx
    this.cy = cy
    this.cz = cz
    this.cell = -1 - within
  }
}
