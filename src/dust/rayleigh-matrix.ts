import type { ScatteringMatrix } from './scattering-matrix.js'

const angles = Float64Array.from({ length: 181 }, (_, degree) => (degree * Math.PI) / 180)
const element = (of: (cosine: number) => number) => angles.map((angle) => (3 / (16 * Math.PI)) * of(Math.cos(angle)))

const matrix: ScatteringMatrix = {
  angles,
  s11: element((cosine) => 1 + cosine ** 2),
  s12: element((cosine) => cosine ** 2 - 1),
  s33: element((cosine) => 2 * cosine),
  s34: element(() => 0)
}

/** Scattering matrix of spheres much smaller than the wavelength, the same at all (Bohren & Huffman 1983, eq. 5.4). */
export const rayleighMatrix = (): ScatteringMatrix => matrix
