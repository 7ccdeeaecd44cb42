import { type ComplexArray, startingOrder } from './mie-series.js'

/**
 * Ratios psi_{n+1}(z) / psi_n(z) of Riccati-Bessel functions for n = 0..terms, z = zRe + i zIm not 0, zIm >= 0, into `out`.
 * Downward recurrence 1 / r_{n-1} = (2n + 1) / z - r_n, stable for every z; the orders above `terms` are not kept.
 * psi_n' / psi_n is (n + 1) / z - r_n; r_n ~ z / (2n + 3) keeps the digits that this difference loses for small z.
 */
export function besselRatios(zRe: number, zIm: number, terms: number, out: ComplexArray): void {
  const { re, im } = out
  const square = zRe * zRe + zIm * zIm
  const inverseRe = zRe / square
  const inverseIm = -zIm / square
  let ratioRe = 0
  let ratioIm = 0
  for (let n = startingOrder(terms, Math.sqrt(square)); n > 0; n--) {
    if (n <= terms) {
      re[n] = ratioRe
      im[n] = ratioIm
    }
    let denominatorRe = (2 * n + 1) * inverseRe - ratioRe
    const denominatorIm = (2 * n + 1) * inverseIm - ratioIm
    if (denominatorRe === 0 && denominatorIm === 0) denominatorRe = 1e-100
    const size = denominatorRe * denominatorRe + denominatorIm * denominatorIm
    ratioRe = denominatorRe / size
    ratioIm = -denominatorIm / size
  }
  re[0] = ratioRe
  im[0] = ratioIm
}

/**
 * The same for real x > 0 and n = from..terms, `from` >= 0, into `out`.
 */
export function realBesselRatios(x: number, from: number, terms: number, out: Float64Array): void {
  let ratio = 0
  for (let n = startingOrder(terms, x); n > from; n--) {
    if (n <= terms) out[n] = ratio
    ratio = 1 / ((2 * n + 1) / x - ratio)
  }
  out[from] = ratio
}
