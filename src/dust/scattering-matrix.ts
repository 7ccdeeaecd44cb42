/**
 * Scattering matrix of spheres on a grid of scattering angles; per sr, s11 normalised to 1 over 4 pi sr.
 * Signs: Bohren & Huffman (1983, eq. 3.16).
 */
export interface ScatteringMatrix {
  /** Scattering angles, rad, increasing from 0 to pi. */
  angles: Float64Array
  s11: Float64Array
  s12: Float64Array
  s33: Float64Array
  s34: Float64Array
}
