import type { ExtinctionCurve } from './extinction-curve.js'

const polynomial = (coefficients: readonly number[], y: number) => coefficients.reduceRight((sum, c) => sum * y + c, 0)

const OPTICAL_A = [1, 0.17699, -0.50447, -0.02427, 0.72085, 0.01979, -0.7753, 0.32999]
const OPTICAL_B = [0, 1.41338, 2.28305, 1.07233, -5.38434, -0.62251, 5.3026, -2.09002]
const FAR_A = [-1.073, -0.628, 0.137, -0.07]
const FAR_B = [13.67, 4.257, -0.42, 0.374]

/**
 * A(lambda) / A(V) = a(x) + b(x) / R_V of Cardelli, Clayton & Mathis (1989, ApJ 345, 245), eqs. 1 to 5, x = 1 / lambda in um-1 from 0.3
 * to 10; R_V = A(V) / E(B-V), about 2.5 to 6. Beyond 3.33 um the infrared power law goes on; below 0.1 um the value at 0.1 um holds.
 */
export function cardelli1989(rv: number): ExtinctionCurve {
  return {
    ratio: (wavelength) => {
      const [a, b] = coefficients(Math.min(10, 1e-4 / wavelength))
      return a + b / rv
    },
    range: [1e-5, 1e-4 / 0.3]
  }
}

/** a and b at x in um-1. */
function coefficients(x: number): [number, number] {
  if (x <= 1.1) return [0.574 * x ** 1.61, -0.527 * x ** 1.61]
  if (x <= 3.3) return [polynomial(OPTICAL_A, x - 1.82), polynomial(OPTICAL_B, x - 1.82)]
  if (x > 8) return [polynomial(FAR_A, x - 8), polynomial(FAR_B, x - 8)]
  const y = Math.max(0, x - 5.9)
  return [
    1.752 - 0.316 * x - 0.104 / ((x - 4.67) ** 2 + 0.341) - 0.04473 * y ** 2 - 0.009779 * y ** 3,
    -3.09 + 1.825 * x + 1.206 / ((x - 4.62) ** 2 + 0.263) + 0.213 * y ** 2 + 0.1207 * y ** 3
  ]
}
