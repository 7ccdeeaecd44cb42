/** Isotropic unit vector from two uniforms, into `out`. */
export function isotropicDirection(out: Float64Array, u: number, v: number): void {
  const mu = 2 * u - 1
  const sin = Math.sqrt(1 - mu * mu)
  const azimuth = 2 * Math.PI * v
  out[0] = sin * Math.cos(azimuth)
  out[1] = sin * Math.sin(azimuth)
  out[2] = mu
}

/** Bits of each coordinate that `directionInOrder` takes from its number. */
const ORDERED = 10

/**
 * Isotropic unit vector for a number in [0, 1), into `out`: numbers side by side give directions side by side (the order of Morton
 * 1966), so packets that are started one after another meet the same cells while a cache still holds them, and numbers that are
 * spread evenly give directions that are. What is finer than the order is drawn.
 */
export function directionInOrder(out: Float64Array, number: number, uniform: () => number): void {
  const bits = (number * 2 ** (2 * ORDERED)) | 0
  let [u, v] = [0, 0]
  for (let i = 0; i < ORDERED; i++) {
    u |= ((bits >> (2 * i + 1)) & 1) << i
    v |= ((bits >> (2 * i)) & 1) << i
  }
  isotropicDirection(out, (u + uniform()) / 2 ** ORDERED, (v + uniform()) / 2 ** ORDERED)
}

/** Unit vector at an angle of cosine `mu` from the unit vector (ux, uy, uz), turned about it by 2 pi v, into `out`. */
export function deflect(out: Float64Array, ux: number, uy: number, uz: number, mu: number, v: number): void {
  const sin = Math.sqrt(Math.max(0, 1 - mu * mu))
  const azimuth = 2 * Math.PI * v
  const a = sin * Math.cos(azimuth)
  const b = sin * Math.sin(azimuth)
  const h = Math.sqrt(ux * ux + uy * uy)
  if (h < 1e-9) {
    out[0] = a
    out[1] = b
    out[2] = uz > 0 ? mu : -mu
    return
  }
  const x = mu * ux + (a * ux * uz - b * uy) / h
  const y = mu * uy + (a * uy * uz + b * ux) / h
  const z = mu * uz - a * h
  const norm = 1 / Math.sqrt(x * x + y * y + z * z)
  out[0] = x * norm
  out[1] = y * norm
  out[2] = z * norm
}

/**
 * Cosine of an azimuth drawn evenly by u: -cos(pi u) = sin(pi (u - 1/2)), by a polynomial fitted at Chebyshev points, to 3e-11 (the
 * step of u is 2e-10). Inline in a loop, where Math.cos is a call.
 */
export function cosAzimuth(u: number): number {
  const w = u - 0.5
  const x = w * w
  const x2 = x * x
  const low = 3.14159265353629 - x * 5.167712764624471
  const middle = 2.5501633189452115 - x * 0.5992521978037336
  const high = 0.08205040171614679 - x * 0.007028386258010294
  return w * (low + x2 * (middle + x2 * high))
}
