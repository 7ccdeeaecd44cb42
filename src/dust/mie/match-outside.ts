import { realBesselRatios } from './bessel-ratios.js'
import { type ComplexArray, type MieSeries, seriesTerms } from './mie-series.js'

/**
 * Coefficients of a sphere of size parameter x whose outermost material has index m = n + i k, from its inside: u_n'/u_n =
 * (n + 1) / (m x) - inside_n at the surface, for the electric (a_n) and the magnetic (b_n) field; inside_n = psi_{n+1} / psi_n of
 * m x when all is one material. Written to `series`; the arrays must hold `seriesTerms(x)`.
 *
 * Bohren & Huffman (1983) eq. 4.88 with psi_{n-1} = (2n + 1) / x psi_n - psi_{n+1} becomes a_n = N / (N - i M),
 * N = alpha psi_n + psi_{n+1}, M the same of chi, alpha = (n + 1) / x (1 / m^2 - 1) - inside / m for a_n and -m inside for b_n: no
 * difference of nearly equal numbers for small x. Since psi_n chi_{n+1} - psi_{n+1} chi_n = 1, Re a_n - |a_n|^2 is
 * -Im alpha / |N - i M|^2: absorption keeps its digits however weak it is.
 */
export function matchOutside(
  series: MieSeries,
  x: number,
  n: number,
  k: number,
  electric: ComplexArray,
  magnetic: ComplexArray
): void {
  const { a, b, scratch } = series
  const { re: aRe, im: aIm } = a
  const { re: bRe, im: bIm } = b
  const { re: electricRe, im: electricIm } = electric
  const { re: magneticRe, im: magneticIm } = magnetic
  const ratios = scratch.outside
  const terms = seriesTerms(x)
  const turning = Math.min(Math.floor(x), terms)
  realBesselRatios(x, turning, terms, ratios)

  const square = n * n + k * k
  const inverseRe = n / square
  const inverseIm = -k / square
  const contrastRe =
    ((1 - n) * (1 + n) + k * k) * (inverseRe * inverseRe - inverseIm * inverseIm) + 4 * n * k * inverseRe * inverseIm
  const contrastIm = (-2 * n * k) / (square * square)

  let psi = Math.sin(x)
  let psiNext = turning > 0 ? psi / x - Math.cos(x) : ratios[0] * psi
  let chi = Math.cos(x)
  let chiNext = chi / x + Math.sin(x)
  let absorbed = 0
  for (let order = 1; order <= terms; order++) {
    const step = (2 * order + 1) / x
    const psiLast = psi
    psi = psiNext
    psiNext = order < turning ? step * psi - psiLast : ratios[order] * psi
    const chiLast = chi
    chi = chiNext
    chiNext = step * chi - chiLast

    const scale = (order + 1) / x
    const eRe = electricRe[order]
    const eIm = electricIm[order]
    const alphaRe = scale * contrastRe - (eRe * inverseRe - eIm * inverseIm)
    const alphaIm = scale * contrastIm - (eRe * inverseIm + eIm * inverseRe)
    const aTop = alphaRe * psi + psiNext
    const aTopIm = alphaIm * psi
    const aBottom = aTop + alphaIm * chi
    const aBottomIm = aTopIm - (alphaRe * chi + chiNext)
    const aSize = 1 / (aBottom * aBottom + aBottomIm * aBottomIm)
    aRe[order] = (aTop * aTop + aTopIm * aTopIm - alphaIm) * aSize
    aIm[order] = (aTopIm * aBottom - aTop * aBottomIm) * aSize

    const mRe = magneticRe[order]
    const mIm = magneticIm[order]
    const betaRe = k * mIm - n * mRe
    const betaIm = -(n * mIm + k * mRe)
    const bTop = betaRe * psi + psiNext
    const bTopIm = betaIm * psi
    const bBottom = bTop + betaIm * chi
    const bBottomIm = bTopIm - (betaRe * chi + chiNext)
    const bSize = 1 / (bBottom * bBottom + bBottomIm * bBottomIm)
    bRe[order] = (bTop * bTop + bTopIm * bTopIm - betaIm) * bSize
    bIm[order] = (bTopIm * bBottom - bTop * bBottomIm) * bSize

    absorbed -= (2 * order + 1) * (alphaIm * aSize + betaIm * bSize)
  }
  aRe[terms + 1] = aIm[terms + 1] = bRe[terms + 1] = bIm[terms + 1] = 0
  series.x = x
  series.terms = terms
  series.absorbed = absorbed
}
