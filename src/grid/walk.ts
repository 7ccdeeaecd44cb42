import type { SphericalWalls } from './geometry.js'
import { StraightWalk } from './straight-walk.js'

/**
 * A straight walk through spherical cells of one, two or three dimensions.
 *
 * With b2 the squared impact parameter r^2 = b2 + s^2 along a ray. The next wall is chosen among the walls ahead of the ray by
 * the cell it is in; a point is never located anew, except on leaving the core, whose surface belongs to every direction. A step
 * is never negative, so rounding can neither lose a ray nor trap it.
 *
 * Along a ray cos(theta) = (z0 + s uz) / sqrt(b2 + s^2) has one extremum, at s = uz b2 / z0: it tells which of a
 * cell's two cones comes first. A cone of cosine c is met where
 *   (uz^2 - c^2) s^2 + 2 z0 uz s + z0^2 - c^2 b2 = 0,
 * and the root at which cos(theta) rises through c is (-z0 uz + c w) / (uz^2 - c^2), the one at which it falls
 * (-z0 uz - c w) / (uz^2 - c^2), with w = sqrt(z0^2 + b2 (uz^2 - c^2)): for either sign of c.
 */
export class SphericalWalk extends StraightWalk {
  ir = 0
  it = 0
  ip = 0
  private wall = 0
  private readonly r2: Float64Array
  private readonly cosTheta: Float64Array
  private readonly phi: Float64Array
  private readonly sinPhi: Float64Array
  private readonly cosPhi: Float64Array
  readonly nr: number
  readonly nt: number
  readonly np: number

  constructor(walls: SphericalWalls) {
    super()
    this.r2 = walls.r.map((value) => value * value)
    this.cosTheta = walls.cosTheta
    this.phi = walls.phi
    this.sinPhi = walls.phi.map(Math.sin)
    this.cosPhi = walls.phi.map(Math.cos)
    this.nr = walls.r.length - 1
    this.nt = walls.cosTheta.length - 1
    this.np = walls.phi.length - 1
  }

  /** Starts a ray at a point of the cell (ir, it, ip). */
  start(x: number, y: number, z: number, ux: number, uy: number, uz: number, ir: number, it: number, ip: number): void {
    this.turn(x, y, z, ux, uy, uz)
    this.ir = ir
    this.it = it
    this.ip = ip
    this.cell = ir === 0 ? 0 : 1 + ((ir - 1) * this.nt + it) * this.np + ip
  }

  /** Starts a ray at a point inside the grid whose cell is not known. */
  startAt(x: number, y: number, z: number, ux: number, uy: number, uz: number): void {
    this.turn(x, y, z, ux, uy, uz)
    const radius2 = x * x + y * y + z * z
    let low = 0
    let high = this.nr
    while (high - low > 1) {
      const middle = (low + high) >> 1
      if (this.r2[middle] <= radius2) low = middle
      else high = middle
    }
    this.ir = low
    this.locateAngles()
  }

  /** Starts a ray at a point of a cell. */
  startIn(x: number, y: number, z: number, ux: number, uy: number, uz: number, cell: number): void {
    const { np, nt } = this
    const whole = cell === 0
    const ip = whole ? 0 : (cell - 1) % np
    const it = whole ? 0 : ((cell - 1 - ip) / np) % nt
    const ir = whole ? 0 : 1 + Math.floor((cell - 1) / (np * nt))
    this.start(x, y, z, ux, uy, uz, ir, it, ip)
  }

  /** Gives the ray a new direction at a point of the cell it is in. */
  turn(x: number, y: number, z: number, ux: number, uy: number, uz: number): void {
    const s = x * ux + y * uy + z * uz
    const cx = y * uz - z * uy
    const cy = z * ux - x * uz
    const cz = x * uy - y * ux
    this.ux = ux
    this.uy = uy
    this.uz = uz
    this.s = s
    this.b2 = cx * cx + cy * cy + cz * cz
    this.x0 = x - s * ux
    this.y0 = y - s * uy
    this.z0 = z - s * uz
  }

  /** Starts a ray that comes from far away with closest approach (x0, y0, z0), at the outer wall; false when it misses. */
  enter(x0: number, y0: number, z0: number, ux: number, uy: number, uz: number): boolean {
    const b2 = x0 * x0 + y0 * y0 + z0 * z0
    const outer2 = this.r2[this.nr]
    if (!(b2 < outer2)) return false
    this.x0 = x0
    this.y0 = y0
    this.z0 = z0
    this.ux = ux
    this.uy = uy
    this.uz = uz
    this.b2 = b2
    this.s = -Math.sqrt(outer2 - b2)
    this.ir = this.nr - 1
    this.locateAngles()
    return true
  }

  /** Path to the next wall of the cell, cm, never negative; remembers the wall for `cross`. */
  toWall(): number {
    const s = this.s
    const b2 = this.b2
    const ir = this.ir
    let wall = 1
    let next: number
    if (s < 0 && b2 < this.r2[ir]) {
      wall = -1
      next = -Math.sqrt(this.r2[ir] - b2)
    } else {
      const h = this.r2[ir + 1] - b2
      next = h > 0 ? Math.sqrt(h) : 0
    }
    if (ir > 0) {
      if (this.nt > 1) {
        const g = this.uz * b2 - this.z0 * s
        // At the extremum, where every ray from a place on the axis begins, cos(theta) falls from a highest and rises from a lowest one.
        const extremum = g === 0 && b2 > 0 && this.z0 !== 0
        if (g !== 0 || extremum) {
          let up = extremum ? this.z0 < 0 : g > 0
          let cone = this.coneAhead(up)
          // Past an extremum that does not reach the cone, the ray turns to the other one.
          if (cone === Number.POSITIVE_INFINITY && (up ? this.z0 > 0 : this.z0 < 0)) {
            up = !up
            cone = this.coneAfterTurn(up)
          }
          if (cone < next) {
            next = cone
            wall = up ? 2 : 3
          }
        }
      }
      if (this.np > 1) {
        const forward = this.x0 * this.uy - this.y0 * this.ux >= 0
        const k = forward ? this.ip + 1 : this.ip
        const sin = this.sinPhi[k]
        const cos = this.cosPhi[k]
        const sign = forward ? 1 : -1
        const ahead = sign * ((this.x0 + s * this.ux) * sin - (this.y0 + s * this.uy) * cos)
        const rate = sign * (this.ux * sin - this.uy * cos)
        const plane =
          ahead <= 0 ? (rate < 0 ? s : Number.POSITIVE_INFINITY) : rate < 0 ? s - ahead / rate : Number.POSITIVE_INFINITY
        if (plane < next) {
          next = plane
          wall = forward ? 4 : 5
        }
      }
    }
    if (next < s) next = s
    this.sWall = next
    this.wall = wall
    return next - s
  }

  density(): number {
    return 1
  }

  trim(step: number): void {
    this.begin = this.s
    this.end = this.s + step
  }

  weighed(step: number): number {
    return step
  }

  stepOf(weighed: number): number {
    return weighed
  }

  /** Distance from a point of the present cell to its nearest wall, cm. */
  clearance(x: number, y: number, z: number): number {
    const { ir, r2 } = this
    const rho2 = x * x + y * y
    const radius = Math.sqrt(rho2 + z * z)
    let nearest = Math.sqrt(r2[ir + 1]) - radius
    if (ir > 0) {
      nearest = Math.min(nearest, radius - Math.sqrt(r2[ir]))
      if (this.nt > 1) {
        const rho = Math.sqrt(rho2)
        for (let k = this.it; k <= this.it + 1; k++) {
          const c = this.cosTheta[k]
          if (c < 1 && c > -1) nearest = Math.min(nearest, Math.abs(z * Math.sqrt(1 - c * c) - rho * c))
        }
      }
      if (this.np > 1) {
        for (let k = this.ip; k <= this.ip + 1; k++)
          nearest = Math.min(nearest, Math.abs(x * this.sinPhi[k] - y * this.cosPhi[k]))
      }
    }
    return nearest
  }

  /** Steps over the wall found by `toWall`; returns the new cell, or -1 outside. */
  cross(): number {
    this.s = this.sWall
    switch (this.wall) {
      case 1:
        this.ir++
        if (this.ir === this.nr) {
          this.cell = -1
          return -1
        }
        if (this.ir === 1) {
          this.locateAngles()
          return this.cell
        }
        this.cell += this.nt * this.np
        return this.cell
      case -1:
        this.ir--
        if (this.ir === 0) this.cell = 0
        else this.cell -= this.nt * this.np
        return this.cell
      case 2:
        this.it--
        this.cell -= this.np
        return this.cell
      case 3:
        this.it++
        this.cell += this.np
        return this.cell
      case 4:
        this.ip++
        this.cell++
        if (this.ip === this.np) {
          this.ip = 0
          this.cell -= this.np
        }
        return this.cell
      default:
        this.ip--
        this.cell--
        if (this.ip < 0) {
          this.ip = this.np - 1
          this.cell += this.np
        }
        return this.cell
    }
  }

  /** Where the ray meets the upper (`up`) or lower cone of its cell on the branch it is on; infinite when it does not. */
  private coneAhead(up: boolean): number {
    const c = this.cosTheta[up ? this.it : this.it + 1]
    if (c === 1 || c === -1) return Number.POSITIVE_INFINITY
    if (up ? this.z0 > 0 : this.z0 < 0) {
      const q = this.z0 * this.z0 + this.b2 * (this.uz * this.uz - c * c)
      const beyond = up ? c > 0 : c < 0
      if (beyond && q <= 0) return Number.POSITIVE_INFINITY
      return this.coneRoot(c, up)
    }
    return (up ? c < this.uz : c > this.uz) ? this.coneRoot(c, up) : Number.POSITIVE_INFINITY
  }

  private coneAfterTurn(up: boolean): number {
    const c = this.cosTheta[up ? this.it : this.it + 1]
    if (c === 1 || c === -1) return Number.POSITIVE_INFINITY
    return (up ? c < this.uz : c > this.uz) ? this.coneRoot(c, up) : Number.POSITIVE_INFINITY
  }

  /** The root at which cos(theta) rises (`up`) or falls through c, in the form without cancellation. */
  private coneRoot(c: number, up: boolean): number {
    const { z0, uz, b2 } = this
    const a = uz * uz - c * c
    const q = z0 * z0 + b2 * a
    const cw = (up ? c : -c) * (q > 0 ? Math.sqrt(q) : 0)
    const b = z0 * uz
    // Both are 0 where a ray along the axis meets the midplane: there the other form has no cancellation either.
    if (b > 0 === cw > 0 && b + cw !== 0) return (z0 * z0 - c * c * b2) / (-b - cw)
    return a === 0 ? Number.POSITIVE_INFINITY : (-b + cw) / a
  }

  /** Sets the angular indices and the cell from the present point, for the radial index already set. */
  private locateAngles(): void {
    const x = this.x0 + this.s * this.ux
    const y = this.y0 + this.s * this.uy
    const z = this.z0 + this.s * this.uz
    if (this.nt > 1) {
      const cos = this.cosTheta
      const mu = z / Math.sqrt(x * x + y * y + z * z)
      let low = 0
      let high = this.nt
      while (high - low > 1) {
        const middle = (low + high) >> 1
        if (cos[middle] >= mu) low = middle
        else high = middle
      }
      this.it = low
    } else this.it = 0
    if (this.np > 1) {
      // All azimuths meet on the axis: what lies ahead there is in the direction of the ray.
      const onAxis = x === 0 && y === 0
      let azimuth = onAxis ? Math.atan2(this.uy, this.ux) : Math.atan2(y, x)
      if (azimuth < 0) azimuth += 2 * Math.PI
      let low = 0
      let high = this.np
      while (high - low > 1) {
        const middle = (low + high) >> 1
        if (this.phi[middle] <= azimuth) low = middle
        else high = middle
      }
      this.ip = low
    } else this.ip = 0
    this.cell = this.ir === 0 ? 0 : 1 + ((this.ir - 1) * this.nt + this.it) * this.np + this.ip
  }
}
