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
