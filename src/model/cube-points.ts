import { gaussLegendre } from '../math/quadrature.js'
import { spreadPoint } from '../math/spread-points.js'

/** Corners, just inside. */
const CORNER = 0.4999

/** Three by three by three Gauss points of a cube of side 1 about the origin, and its corners with no weight. */
export function gaussPoints(): { places: Float64Array; weights: Float64Array } {
  const { nodes, weights } = gaussLegendre(3)
  const [places, products]: number[][] = [[], []]
  for (let k = 0; k < 27; k++) {
    const digits = [k % 3, Math.floor(k / 3) % 3, Math.floor(k / 9)]
    places.push(...digits.map((digit) => 0.5 * nodes[digit]))
    products.push(digits.reduce((product, digit) => 0.5 * product * weights[digit], 1))
  }
  for (let k = 0; k < 8; k++) {
    places.push(...[0, 1, 2].map((a) => ((k >> a) & 1 ? CORNER : -CORNER)))
    products.push(0)
  }
  return { places: Float64Array.from(places), weights: Float64Array.from(products) }
}

/** Points in a cube of side 1 about the origin, three numbers each, an even number: each with its mirror image, so that even changes cancel. */
export function spreadPoints(count: number): Float64Array {
  const points = new Float64Array(3 * count)
  for (let n = 0; n < count; n += 2) {
    const point = points.subarray(3 * n, 3 * n + 3)
    spreadPoint(n / 2, point)
    for (let a = 0; a < 3; a++) {
      point[a] -= 0.5
      points[3 * (n + 1) + a] = -point[a]
    }
  }
  return points
}
