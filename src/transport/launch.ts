import { type Cells, drawInCell, isOctree, reachOf, type Walk } from '../grid/cells.js'
import { impactParameter, impactWeight } from '../sources/impact.js'
import { deflect, directionInOrder, isotropicDirection } from './direction.js'

/** Starts a packet on the surface of a star of radius R about (x, y, z), by the cosine law; `number` in [0, 1) chooses the place in order. */
export function launchFromSurface(
  walk: Walk,
  x: number,
  y: number,
  z: number,
  radius: number,
  number: number,
  uniform: () => number,
  out: Float64Array
): void {
  directionInOrder(out, number, uniform)
  const [nx, ny, nz] = out
  deflect(out, nx, ny, nz, Math.sqrt(uniform()), uniform())
  walk.startAt(x + nx * radius, y + ny * radius, z + nz * radius, out[0], out[1], out[2])
}

/** Starts a packet isotropically, at a point drawn evenly in the volume of a cell. */
export function launchFromCell(walk: Walk, cells: Cells, cell: number, uniform: () => number, out: Float64Array): void {
  drawInCell(cells, cell, uniform, out)
  const [x, y, z] = out
  isotropicDirection(out, uniform(), uniform())
  walk.startIn(x, y, z, out[0], out[1], out[2], cell)
}

/** Cubes know no inner radius: half of the light from outside is drawn towards this share of their reach. */
const INNER = 0.1

/**
 * Starts a packet of isotropic light on its way into the sphere about all cells; u chooses the impact parameter. Returns its weight.
 * About cubes some miss all of them: the walk is in no cell then.
 */
export function launchInwards(walk: Walk, cells: Cells, u: number, uniform: () => number, out: Float64Array): number {
  const reach = reachOf(cells)
  const closest = isOctree(cells) ? INNER * reach : cells.r[1]
  const b = impactParameter(reach, closest, u)
  isotropicDirection(out, uniform(), uniform())
  const [ux, uy, uz] = out
  deflect(out, ux, uy, uz, 0, uniform())
  if (!walk.enter(b * out[0], b * out[1], b * out[2], ux, uy, uz)) walk.cell = -1
  out[0] = ux
  out[1] = uy
  out[2] = uz
  return impactWeight(reach, closest, b)
}
