import { cellCube, cubeVolumes, type Octree } from '../grid/octree/octree.js'
import { gaussLegendre } from '../math/quadrature.js'
import { spreadPoint } from '../math/spread-points.js'
import type { Shape } from '../shapes/shape.js'
import { type CellDensities, settleMass } from './density.js'

/** Where samples, or the corners of a cell, differ by more than this share of the mean, so many evenly spread points are taken. */
const CONTRAST = 0.3
const POINTS = 250
/** Corners, just inside. */
const CORNER = 0.4999

/** Mean density of a component in every cell of an octree; as `cellDensities`. */
export function octreeDensities(octree: Octree, shape: Shape, scale: number): CellDensities {
  const { cells } = octree
  const { relativeDensity } = shape
  const density = new Float64Array(cells)
  const cube = new Float64Array(4)
  const { places, weights } = gaussPoints()
  const spread = spreadPoints(POINTS)
  for (let cell = 0; cell < cells; cell++) {
    const [x, y, z, length] = cellCube(octree, cell, cube)
    const at = (points: Float64Array, k: number) =>
      relativeDensity(x + points[3 * k] * length, y + points[3 * k + 1] * length, z + points[3 * k + 2] * length)
    let [sum, least, most] = [0, Number.POSITIVE_INFINITY, 0]
    for (let k = 0; k < weights.length; k++) {
      const value = at(places, k)
      sum += weights[k] * value
      least = Math.min(least, value)
      most = Math.max(most, value)
    }
    density[cell] = sum
    if (most - least <= CONTRAST * sum) continue
    sum = 0
    for (let k = 0; k < POINTS; k++) sum += at(spread, k)
    density[cell] = sum / POINTS
  }
  return settleMass(density, cubeVolumes(octree, new Float64Array(cells)), shape, scale)
}

/** Three by three by three Gauss points of a cube of side 1 about the origin, and its corners with no weight. */
function gaussPoints(): { places: Float64Array; weights: Float64Array } {
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

/** Points in a cube of side 1 about the origin, three numbers each. */
function spreadPoints(count: number): Float64Array {
  const points = new Float64Array(3 * count)
  for (let n = 0; n < count; n++) spreadPoint(n, points.subarray(3 * n, 3 * n + 3))
  return points.map((value) => value - 0.5)
}
