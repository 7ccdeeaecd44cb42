import type { Amplitudes } from './amplitudes.js'

/** The four independent elements of a sphere's scattering matrix, one value for each angle. */
export interface MatrixElements {
  s11: Float64Array
  s12: Float64Array
  s33: Float64Array
  s34: Float64Array
}

/**
 * Scattering matrix of a sphere from its amplitudes (Bohren & Huffman 1983, eq. 4.77), into `out`: the scattered Stokes vector is the
 * matrix times the incident one over (k r)^2, both referred to the plane of scattering.
 */
export function writeMatrix({ s1, s2 }: Amplitudes, out: MatrixElements): void {
  const { s11, s12, s33, s34 } = out
  for (let j = 0; j < s11.length; j++) {
    const perpendicular = s1.re[j] * s1.re[j] + s1.im[j] * s1.im[j]
    const parallel = s2.re[j] * s2.re[j] + s2.im[j] * s2.im[j]
    s11[j] = 0.5 * (parallel + perpendicular)
    s12[j] = 0.5 * (parallel - perpendicular)
    s33[j] = s1.re[j] * s2.re[j] + s1.im[j] * s2.im[j]
    s34[j] = s2.im[j] * s1.re[j] - s2.re[j] * s1.im[j]
  }
}

/** Room for the matrix at `count` angles. */
export function makeMatrix(count: number): MatrixElements {
  const array = () => new Float64Array(count)
  return { s11: array(), s12: array(), s33: array(), s34: array() }
}
