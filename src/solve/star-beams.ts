import { cellCube, type Octree } from '../grid/octree/octree.js'
import { OctreeWalk } from '../grid/octree/octree-walk.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import type { Vector } from '../scene/types.js'
import { pathToStar } from '../transport/star-spheres.js'
import { sphereStars } from './scatter-medium.js'

/** The light of a point star at one frequency on its way through cubes. */
export interface StarBeam {
  at: Vector
  /** erg/s/Hz */
  luminosity: number
  /** cells x 8: optical depth from the star to the points at BEAM_POINT of each half side from the middle of a cell with dust. */
  depths: Float32Array
}

/** The two points of Gauss quadrature on (-1, 1): lines through values there miss cubes of the coordinate by least. */
export const BEAM_POINT = 1 / Math.sqrt(3)
/** Behind another star, and where depths are of no more interest. */
export const DARK = 100

/** Optical depths from every point star to every cell with dust, by rays from the points to the star. */
export function starBeams(model: Model, cells: Octree, extinction: Float64Array, nu: number): StarBeam[] {
  const spheres = sphereStars(model)
  const walk = new OctreeWalk(cells)
  return model.stars.flatMap(({ spec: { extent, at }, spectrum }) => {
    const luminosity = spectrum.luminosityNu(nu)
    if (extent === 'sphere' || !(luminosity > 0)) return []
    const depths = new Float32Array(allocateShared(32 * cells.cells))
    const cube = new Float64Array(4)
    for (let cell = 0; cell < cells.cells; cell++) {
      if (!(extinction[cell] > 0)) continue
      const [x, y, z, length] = cellCube(cells, cell, cube)
      const off = 0.5 * length * BEAM_POINT
      for (let k = 0; k < 8; k++)
        depths[8 * cell + k] = depthToPoint(
          walk,
          extinction,
          spheres,
          x + (k & 1 ? off : -off),
          y + (k & 2 ? off : -off),
          z + (k & 4 ? off : -off),
          cell,
          at
        )
    }
    return [{ at, luminosity, depths }]
  })
}

/** Optical depth from a point of a cell to another point; DARK at most, and behind a star. */
export function depthToPoint(
  walk: OctreeWalk,
  extinction: Float64Array,
  spheres: Float64Array,
  x: number,
  y: number,
  z: number,
  cell: number,
  to: Vector
): number {
  const dx = to[0] - x
  const dy = to[1] - y
  const dz = to[2] - z
  const distance = Math.sqrt(dx * dx + dy * dy + dz * dz)
  if (!(distance > 0)) return 0
  walk.startIn(x, y, z, dx / distance, dy / distance, dz / distance, cell)
  if (spheres.length > 0 && pathToStar(walk, spheres) < distance) return DARK
  let left = distance
  let depth = 0
  do {
    const step = walk.toWall()
    depth += Math.min(step, left) * extinction[walk.cell]
    left -= step
  } while (left > 0 && depth < DARK && walk.cross() >= 0)
  return Math.min(depth, DARK)
}
