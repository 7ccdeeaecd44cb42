/** Isotropic unit vector from two uniforms, into `out`. */
export function isotropicDirection(out: Float64Array, u: number, v: number): void {
  const mu = 2 * u - 1
  const sin = Math.sqrt(1 - mu * mu)
  const azimuth = 2 * Math.PI * v
  out[0] = sin * Math.cos(azimuth)
  out[1] = sin * Math.sin(azimuth)
  out[2] = mu
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
