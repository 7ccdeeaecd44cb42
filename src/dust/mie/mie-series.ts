/** Complex numbers of one index, real and imaginary parts apart. */
export interface ComplexArray {
  re: Float64Array
  im: Float64Array
}

/**
 * Expansion of the field scattered by one sphere in vector spherical harmonics: coefficients a_n and b_n at index n = 1..terms
 * (0 at terms + 1), in the convention of Bohren & Huffman (1983): time factor exp(-i omega t), refractive index n + i k with k >= 0.
 * Made once for the largest sphere and written anew for each.
 */
export interface MieSeries {
  /** Size parameter 2 pi radius / wavelength of the sphere last written. */
  x: number
  /** Its number of terms. */
  terms: number
  /** Sum of (2n + 1) (Re a_n - |a_n|^2 + Re b_n - |b_n|^2), free of cancellation. */
  absorbed: number
  a: ComplexArray
  b: ComplexArray
  scratch: {
    /** psi_{n+1} / psi_n of the size parameter itself. */
    outside: Float64Array
    /** The same of arguments inside the sphere, and what a coat makes of them. */
    inside: [ComplexArray, ComplexArray, ComplexArray]
    electric: ComplexArray
    magnetic: ComplexArray
  }
}

/**
 * Terms after which a series of size parameter x has converged to rounding. With 4.05 in place of 6 (Wiscombe 1980, Appl. Opt. 19,
 * 1505, eq. 6) backscattering keeps only seven digits.
 */
export function seriesTerms(x: number): number {
  return Math.ceil(x + 6 * Math.cbrt(x) + 2)
}

/** Order at which a downward recurrence of psi_{n+1} / psi_n of an argument of this modulus may start, if it must hold at `terms`. */
export function startingOrder(terms: number, modulus: number): number {
  return Math.ceil(Math.max(terms, modulus) + 16 * Math.cbrt(modulus) + 15)
}

/** Room for spheres up to size parameter `largestX`. */
export function makeMieSeries(largestX: number): MieSeries {
  const length = seriesTerms(largestX) + 2
  const array = (): ComplexArray => ({ re: new Float64Array(length), im: new Float64Array(length) })
  return {
    x: 0,
    terms: 0,
    absorbed: 0,
    a: array(),
    b: array(),
    scratch: {
      outside: new Float64Array(length),
      inside: [array(), array(), array()],
      electric: array(),
      magnetic: array()
    }
  }
}
