import type { ScatteringTables } from '../dust/scattering-tables.js'
import type { Walk } from '../grid/cells.js'
import { Stokes } from './stokes.js'

/** The polarisation of a packet in space. */
export class Polarisation {
  readonly stokes = new Stokes()
  /** Direction of flight, the direction d that the parameters refer to, and e = flight x d: nine numbers. */
  readonly frame = Float64Array.of(0, 0, 1, 1, 0, 0, 0, 1, 0)

  /** Unpolarised light that flies along a unit vector. */
  reset(kx: number, ky: number, kz: number): void {
    this.stokes.clear()
    // Any direction across will do: across an axis that is not near the flight.
    if (Math.abs(kz) > 0.8) this.point(kx, ky, kz, 0, -kz, ky)
    else this.point(kx, ky, kz, -ky, kx, 0)
  }

  /** Scatters the packet at path s of the walk; the new direction goes to the walk and into `out`. */
  scatter(tables: ScatteringTables, law: number, walk: Walk, s: number, uniform: () => number, out: Float64Array): void {
    const { stokes, frame } = this
    stokes.scatter(tables, law, uniform)
    const { mu, cos, sin } = stokes
    const across = Math.sqrt(Math.max(0, 1 - mu * mu))
    const kx = frame[0]
    const ky = frame[1]
    const kz = frame[2]
    const cx = cos * frame[3] + sin * frame[6]
    const cy = cos * frame[4] + sin * frame[7]
    const cz = cos * frame[5] + sin * frame[8]
    this.point(
      mu * kx + across * cx,
      mu * ky + across * cy,
      mu * kz + across * cz,
      mu * cx - across * kx,
      mu * cy - across * ky,
      mu * cz - across * kz
    )
    out[0] = frame[0]
    out[1] = frame[1]
    out[2] = frame[2]
    walk.turn(walk.x0 + s * walk.ux, walk.y0 + s * walk.uy, walk.z0 + s * walk.uz, out[0], out[1], out[2])
  }

  /** Sets the frame, made orthonormal again so that rounding does not add up. */
  private point(kx: number, ky: number, kz: number, dx: number, dy: number, dz: number): void {
    const { frame } = this
    const length = 1 / Math.sqrt(kx * kx + ky * ky + kz * kz)
    const x = kx * length
    const y = ky * length
    const z = kz * length
    const tilt = dx * x + dy * y + dz * z
    const ax = dx - tilt * x
    const ay = dy - tilt * y
    const az = dz - tilt * z
    const width = 1 / Math.sqrt(ax * ax + ay * ay + az * az)
    frame[0] = x
    frame[1] = y
    frame[2] = z
    frame[3] = ax * width
    frame[4] = ay * width
    frame[5] = az * width
    frame[6] = y * frame[5] - z * frame[4]
    frame[7] = z * frame[3] - x * frame[5]
    frame[8] = x * frame[4] - y * frame[3]
  }
}
