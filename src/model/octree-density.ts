import { cellCube, cubeVolumes, type Octree } from '../grid/octree/octree.js'
import type { Shape } from '../shapes/shape.js'
import { gaussPoints, spreadPoints } from './cube-points.js'
import { type CellDensities, settleMass } from './density.js'

/** Where samples, or the corners of a cell, differ by more than this share of the mean, so many evenly spread points are taken. */
const CONTRAST = 0.3
const POINTS = 250

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
