import type { FitsUnit } from './read.js'

const DEGREE = Math.PI / 180

/** How pixels of an image lie on the sky, to first order. */
export interface PixelMatrix {
  /** Pixels (x, y) for each rad towards east and towards north. */
  perEast: [number, number]
  perNorth: [number, number]
  /** Solid angle of a pixel, sr. */
  pixelSr: number
}

/**
 * The scale and orientation of the first two axes, from CDi_j, or CDELTi with PCi_j or CROTA2 (Greisen & Calabretta 2002, A&A 395,
 * 1061; Calabretta & Greisen 2002, A&A 395, 1077, section 6.1), in deg; undefined where the header has none.
 */
export function pixelMatrix({ header }: FitsUnit): PixelMatrix | undefined {
  const number = (keyword: string, otherwise: number) => header.number(keyword) ?? otherwise
  let matrix: number[]
  if (['CD1_1', 'CD1_2', 'CD2_1', 'CD2_2'].some((keyword) => header.has(keyword)))
    matrix = ['CD1_1', 'CD1_2', 'CD2_1', 'CD2_2'].map((keyword) => number(keyword, 0))
  else {
    const [dx, dy] = [header.number('CDELT1'), header.number('CDELT2')]
    if (dx === undefined || dy === undefined) return undefined
    const turn = number('CROTA2', 0) * DEGREE
    const turned = !header.has('PC1_1') && !header.has('PC1_2') && turn !== 0
    matrix = turned
      ? [dx * Math.cos(turn), -dy * Math.sin(turn), dx * Math.sin(turn), dy * Math.cos(turn)]
      : [dx * number('PC1_1', 1), dx * number('PC1_2', 0), dy * number('PC2_1', 0), dy * number('PC2_2', 1)]
  }
  const [a, b, c, d] = matrix.map((value) => value * DEGREE)
  const determinant = a * d - b * c
  if (!(Math.abs(determinant) > 0)) return undefined
  return {
    perEast: [d / determinant, -c / determinant],
    perNorth: [-b / determinant, a / determinant],
    pixelSr: Math.abs(determinant)
  }
}
