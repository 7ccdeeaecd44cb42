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

/** Steps of an even sequence modulo 1: the golden section (common practice). */
export const GOLDEN = 0.6180339887498949

/**
 * Impact parameter (cm) of isotropic light that enters a sphere of radius `outer`, and its weight, into `out`. Half of the packets
 * (u < 0.5) are spread evenly over the area, as the light is; half as 1 / b^2, evenly within `closest`, so that dust far inside is
 * met as often. Both kinds have the weight of the mixture, 2 at most (composite biasing, Baes et al. 2016, A&A 590, A55).
 */
export function impactParameter(out: Float64Array, outer: number, closest: number, u: number): void {
  // Of the second kind 1 part lies within `closest`, the others outside.
  const parts = 1 + 2 * Math.log(outer / closest)
  const part = (2 * u - 1) * parts
  let b = outer * Math.sqrt(2 * u)
  if (u >= 0.5) b = part < 1 ? closest * Math.sqrt(part) : closest * Math.exp(0.5 * (part - 1))
  out[0] = Math.min(b, outer * (1 - 1e-12))
  out[1] = 2 / (1 + (outer / Math.max(b, closest)) ** 2 / parts)
}

/** Starts a packet of isotropic light on its way in through the outer wall; u chooses the impact parameter. Returns its weight. */
export function launchInwards(
  walk: SphericalWalk,
  { r }: SphericalWalls,
  u: number,
  uniform: () => number,
  out: Float64Array
): number {
  impactParameter(out, r[r.length - 1], r[1], u)
  const [b, weight] = out
  isotropicDirection(out, uniform(), uniform())
  const [ux, uy, uz] = out
  deflect(out, ux, uy, uz, 0, uniform())
  walk.enter(b * out[0], b * out[1], b * out[2], ux, uy, uz)
  out[0] = ux
  out[1] = uy
  out[2] = uz
  return weight
}

/** Cell that emits, drawn in proportion to its luminosity. */
export function emittingCell(cells: SamplingTable, uniform: () => number): number {
  return sampleBin(cells, 0, uniform())
}
