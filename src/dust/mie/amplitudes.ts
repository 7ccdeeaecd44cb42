import type { ComplexArray, MieSeries } from './mie-series.js'

/** Amplitude functions S1 and S2 of a sphere at the angles of a grid (Bohren & Huffman 1983, eq. 4.74), and scratch. */
export interface Amplitudes {
  /** Cosines of the scattering angles, as given. */
  cosines: Float64Array
  /** Field perpendicular to the plane of scattering. */
  s1: ComplexArray
  /** Field in the plane of scattering. */
  s2: ComplexArray
  scratch: { pi: Float64Array; piLast: Float64Array }
}

/** Room for the amplitudes at these cosines of scattering angles, in any order. */
export function makeAmplitudes(cosines: ArrayLike<number>): Amplitudes {
  const array = () => new Float64Array(cosines.length)
  return {
    cosines: Float64Array.from(cosines),
    s1: { re: array(), im: array() },
    s2: { re: array(), im: array() },
    scratch: { pi: array(), piLast: array() }
  }
}

/**
 * Amplitudes of the sphere in `series`, into `out`. Upward recurrence of pi_n and tau_n (Bohren & Huffman 1983, eq. 4.47) for all
 * angles at once; S1 + S2 = sum f (a_n + b_n)(pi_n + tau_n) and S1 - S2 = sum f (a_n - b_n)(pi_n - tau_n), f = (2n + 1) / (n (n + 1)),
 * take half the products of S1 and S2 (Wiscombe 1980, Appl. Opt. 19, 1505).
 */
export function writeAmplitudes(series: MieSeries, out: Amplitudes): void {
  const { cosines } = out
  const { re: sumRe, im: sumIm } = out.s1
  const { re: differenceRe, im: differenceIm } = out.s2
  const { pi, piLast } = out.scratch
  const { re: aRe, im: aIm } = series.a
  const { re: bRe, im: bIm } = series.b
  const count = cosines.length
  const terms = series.terms
  sumRe.fill(0)
  sumIm.fill(0)
  differenceRe.fill(0)
  differenceIm.fill(0)
  pi.fill(1)
  piLast.fill(0)
  for (let n = 1; n <= terms; n += 2) {
    // two orders at a time: half the traffic with memory; the series holds a zero behind an odd last order
    const m = n + 1
    const f = (2 * n + 1) / (n * m)
    const g = (2 * m + 1) / (m * (m + 1))
    const plusRe = f * (aRe[n] + bRe[n])
    const plusIm = f * (aIm[n] + bIm[n])
    const minusRe = f * (aRe[n] - bRe[n])
    const minusIm = f * (aIm[n] - bIm[n])
    const nextPlusRe = g * (aRe[m] + bRe[m])
    const nextPlusIm = g * (aIm[m] + bIm[m])
    const nextMinusRe = g * (aRe[m] - bRe[m])
    const nextMinusIm = g * (aIm[m] - bIm[m])
    const growth = m / n
    const nextGrowth = (m + 1) / m
    for (let j = 0; j < count; j++) {
      const cosine = cosines[j]
      const last = piLast[j]
      const p = pi[j]
      const s = cosine * p
      const t = s - last
      const tau = n * t - last
      const q = s + growth * t
      const u = cosine * q
      const v = u - p
      const nextTau = m * v - p
      const plus = p + tau
      const minus = p - tau
      const nextPlus = q + nextTau
      const nextMinus = q - nextTau
      sumRe[j] += plusRe * plus + nextPlusRe * nextPlus
      sumIm[j] += plusIm * plus + nextPlusIm * nextPlus
      differenceRe[j] += minusRe * minus + nextMinusRe * nextMinus
      differenceIm[j] += minusIm * minus + nextMinusIm * nextMinus
      piLast[j] = q
      pi[j] = u + nextGrowth * v
    }
  }
  for (let j = 0; j < count; j++) {
    const re = sumRe[j]
    const im = sumIm[j]
    sumRe[j] = 0.5 * (re + differenceRe[j])
    sumIm[j] = 0.5 * (im + differenceIm[j])
    differenceRe[j] = 0.5 * (re - differenceRe[j])
    differenceIm[j] = 0.5 * (im - differenceIm[j])
  }
}
