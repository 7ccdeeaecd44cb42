import type { SphericalWalls } from '../grid/geometry.js'
import type { SphericalWalk } from '../grid/walk.js'
import { type SamplingTable, sampleBin } from '../math/cdf.js'
import { deflect, isotropicDirection } from './direction.js'

/** Starts a packet on the surface of a star of radius R at the origin, by the cosine law. */
export function launchFromSurface(walk: SphericalWalk, radius: number, uniform: () => number, out: Float64Array): void {
  isotropicDirection(out, uniform(), uniform())
  const [nx, ny, nz] = out
  deflect(out, nx, ny, nz, Math.sqrt(uniform()), uniform())
  walk.startAt(nx * radius, ny * radius, nz * radius, out[0], out[1], out[2])
}

/** Starts a packet isotropically, at a point drawn evenly in the volume of a cell. */
export function launchFromCell(
  walk: SphericalWalk,
  walls: SphericalWalls,
  cell: number,
  uniform: () => number,
  out: Float64Array
): void {
  const { r, cosTheta, phi } = walls
  const np = phi.length - 1
  const nt = cosTheta.length - 1
  let ir = 0
  let it = 0
  let ip = 0
  if (cell > 0) {
    ip = (cell - 1) % np
    const rest = (cell - 1 - ip) / np
    it = rest % nt
    ir = 1 + (rest - it) / nt
  }
  const a = r[ir]
  const b = r[ir + 1]
  const radius = Math.cbrt(a * a * a + uniform() * (b * b * b - a * a * a))
  const whole = ir === 0
  const cosLow = whole ? -1 : cosTheta[it + 1]
  const cosHigh = whole ? 1 : cosTheta[it]
  const phiLow = whole ? 0 : phi[ip]
  const phiHigh = whole ? 2 * Math.PI : phi[ip + 1]
  const mu = cosLow + uniform() * (cosHigh - cosLow)
  const azimuth = phiLow + uniform() * (phiHigh - phiLow)
  const sin = Math.sqrt(Math.max(0, 1 - mu * mu)) * radius
  isotropicDirection(out, uniform(), uniform())
  walk.start(sin * Math.cos(azimuth), sin * Math.sin(azimuth), mu * radius, out[0], out[1], out[2], ir, it, ip)
}

/** Cell that emits, drawn in proportion to its luminosity. */
export function emittingCell(cells: SamplingTable, uniform: () => number): number {
  return sampleBin(cells, 0, uniform())
}
