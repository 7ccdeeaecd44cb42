import { isOctree } from '../grid/cells.js'
import { cellCube, type Octree } from '../grid/octree/octree.js'
import { OctreeWalk } from '../grid/octree/octree-walk.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import type { Vector } from '../scene/types.js'
import { pathToStar } from '../transport/star-spheres.js'
import type { WorkerPool } from '../workers/pool.js'
import { sphereStars } from './sphere-stars.js'

/** What lies between a point star and the cells of an octree: the same at all wavelengths. */
export interface StarColumns {
  star: Model['stars'][number]
  /**
   * cells x components x 8: column density (g/cm2) from the star to the points at BEAM_POINT of each half side from the middle of a
   * cell with dust, upper half of x, y and z as in the octree; HIDDEN behind another star.
   */
  columns: Float32Array
}

/** The two points of Gauss quadrature on (-1, 1): lines through values there miss cubes of the coordinate by least. */
export const BEAM_POINT = 1 / Math.sqrt(3)
/** Optical depth of what is behind another star; larger ones are of no interest. */
export const DARK = 100
/** g/cm2, dark in any dust. */
const HIDDEN = 1e30

/** What threads have to know to fill the columns of all stars. */
export interface ColumnsRequest {
  octree: Octree
  /** components x cells, g/cm3. */
  density: Float64Array
  /** By component: least opacity, cm2/g, at any wavelength. */
  opacity: Float64Array
  spheres: Float64Array
  stars: { at: Vector; columns: Float32Array }[]
}

const CELLS_A_TASK = 2048

/** Columns from every point star of a model, found by rays from the points of all cells; undefined when it was stopped. */
export async function starColumns(
  model: Model,
  pool: WorkerPool,
  onProgress: (done: number, of: number) => void,
  stop?: AbortSignal
): Promise<StarColumns[] | undefined> {
  const { walls, cells, components } = model
  const stars = model.stars.filter(({ spec }) => spec.extent === 'point')
  if (!isOctree(walls) || stars.length === 0) return []
  const found = stars.map((star) => ({ star, columns: new Float32Array(allocateShared(32 * cells * components.length)) }))
  const density = new Float64Array(allocateShared(8 * cells * components.length))
  for (const [c, component] of components.entries()) density.set(component.density, c * cells)
  const wavelengths = observedWavelengths(model.scene)
  const request: ColumnsRequest = {
    octree: walls,
    density,
    opacity: Float64Array.from(components, ({ law }) =>
      Math.min(...wavelengths.map((wavelength) => law.absorption(wavelength) + law.scattering(wavelength)))
    ),
    spheres: sphereStars(model),
    stars: found.map(({ star, columns }) => ({ at: star.spec.at, columns }))
  }
  pool.share('star-columns', request)
  const tasks = Array.from({ length: Math.ceil(cells / CELLS_A_TASK) }, (_, i) => ({
    name: 'star-columns',
    input: { from: i * CELLS_A_TASK, to: Math.min(cells, (i + 1) * CELLS_A_TASK) }
  }))
  const done = await pool.run(tasks, (_, i) => onProgress(tasks[i].input.to, cells), stop)
  pool.forget('star-columns')
  return done === tasks.length ? found : undefined
}

/** Fills the columns of some cells, which nobody else writes; runs on the threads. */
export function fillColumns({ octree, density, opacity, spheres, stars }: ColumnsRequest, from: number, to: number): void {
  const { cells } = octree
  const components = opacity.length
  const walk = new OctreeWalk(octree)
  const cube = new Float64Array(4)
  const column = new Float64Array(components)
  for (let cell = from; cell < to; cell++) {
    let dusty = false
    for (let c = 0; c < components; c++) dusty ||= density[c * cells + cell] > 0
    if (!dusty) continue
    const [x, y, z, length] = cellCube(octree, cell, cube)
    const off = 0.5 * length * BEAM_POINT
    for (const { at, columns } of stars) {
      for (let k = 0; k < 8; k++) {
        const [px, py, pz] = [x + (k & 1 ? off : -off), y + (k & 2 ? off : -off), z + (k & 4 ? off : -off)]
        columnsBetween(walk, density, opacity, spheres, px, py, pz, cell, at, column)
        for (let c = 0; c < components; c++) columns[(cell * components + c) * 8 + k] = column[c]
      }
    }
  }
}

/**
 * Columns of each component from a point of a cell to another point, g/cm2, into `out`, as far as the optical depth by the opacities
 * given stays below DARK; HIDDEN behind a star. Returns that optical depth.
 */
export function columnsBetween(
  walk: OctreeWalk,
  density: Float64Array,
  opacity: Float64Array,
  spheres: Float64Array,
  x: number,
  y: number,
  z: number,
  cell: number,
  to: Vector,
  out: Float64Array
): number {
  const components = opacity.length
  const cells = density.length / components
  const dx = to[0] - x
  const dy = to[1] - y
  const dz = to[2] - z
  const distance = Math.sqrt(dx * dx + dy * dy + dz * dz)
  out.fill(0)
  if (!(distance > 0)) return 0
  walk.startIn(x, y, z, dx / distance, dy / distance, dz / distance, cell)
  if (spheres.length > 0 && pathToStar(walk, spheres) < distance) {
    out.fill(HIDDEN)
    return DARK
  }
  let left = distance
  let depth = 0
  do {
    const step = walk.toWall()
    const path = walk.weighed(Math.min(step, left))
    for (let c = 0; c < components; c++) {
      const column = path * density[c * cells + walk.cell]
      out[c] += column
      depth += column * opacity[c]
    }
    left -= step
  } while (left > 0 && depth < DARK && walk.cross() >= 0)
  return Math.min(depth, DARK)
}
