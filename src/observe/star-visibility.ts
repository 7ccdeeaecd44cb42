import { jinc } from '../math/bessel.js'

/**
 * Visibility of a star's disk with linear limb darkening u, relative to its flux, at x = 2 pi q theta (q: length of the baseline in
 * wavelengths, theta: angular radius, rad): Hanbury Brown, Davis, Lake & Thompson 1974, MNRAS 167, 475. Without darkening it is
 * 2 J1(x) / x.
 */
export function diskVisibility(x: number, limbDarkening: number): number {
  if (limbDarkening === 0) return jinc(x)
  const u = limbDarkening
  // sqrt(pi/2) J_{3/2}(x) / x^{3/2}
  const darkened = Math.abs(x) < 1e-3 ? 1 / 3 - (x * x) / 30 : (Math.sin(x) / x - Math.cos(x)) / (x * x)
  return ((1 - u) * 0.5 * jinc(x) + u * darkened) / ((1 - u) / 2 + u / 3)
}
