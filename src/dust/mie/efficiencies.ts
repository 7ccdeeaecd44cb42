import type { MieSeries } from './mie-series.js'

/** Cross sections in units of the geometric one, pi radius^2, and the mean cosine of the scattering angle. */
export interface Efficiencies {
  extinction: number
  scattering: number
  absorption: number
  /** 4 |S(180 deg)|^2 / x^2: 4 pi times the differential cross section straight back. */
  backscattering: number
  asymmetry: number
}

/**
 * Efficiencies of the sphere in `series`, into `out`: Bohren & Huffman (1983) eqs. 4.61 and 4.62, section 4.4.3 for the
 * backscattering, section 4.5 for the asymmetry. Absorption is its own sum, not a difference.
 */
export function writeEfficiencies(series: MieSeries, out: Efficiencies): void {
  const { x, terms } = series
  const { re: aRe, im: aIm } = series.a
  const { re: bRe, im: bIm } = series.b
  let scattered = 0
  let cosines = 0
  let backRe = 0
  let backIm = 0
  let sign = -1
  for (let n = 1; n <= terms; n++) {
    const ar = aRe[n]
    const ai = aIm[n]
    const br = bRe[n]
    const bi = bIm[n]
    const weight = 2 * n + 1
    scattered += weight * (ar * ar + ai * ai + br * br + bi * bi)
    cosines += (weight / (n * (n + 1))) * (ar * br + ai * bi)
    if (n < terms) cosines += ((n * (n + 2)) / (n + 1)) * (ar * aRe[n + 1] + ai * aIm[n + 1] + br * bRe[n + 1] + bi * bIm[n + 1])
    backRe += sign * weight * (ar - br)
    backIm += sign * weight * (ai - bi)
    sign = -sign
  }
  const scale = 2 / (x * x)
  out.scattering = scale * scattered
  out.absorption = scale * series.absorbed
  out.extinction = out.scattering + out.absorption
  out.backscattering = (backRe * backRe + backIm * backIm) / (x * x)
  out.asymmetry = scattered > 0 ? (2 * cosines) / scattered : 0
}

/** Efficiencies of a sphere, freshly allocated. */
export function efficiencies(series: MieSeries): Efficiencies {
  const out = { extinction: 0, scattering: 0, absorption: 0, backscattering: 0, asymmetry: 0 }
  writeEfficiencies(series, out)
  return out
}
