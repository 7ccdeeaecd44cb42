import { type Cells, drawInCell, isOctree, reachOf, type Walk } from '../grid/cells.js'
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

/**
 * Impact parameter (cm) of isotropic light that enters a sphere of radius `outer`, and its weight, into `out`. Half of the packets
 * (u < 0.5) are spread evenly over the area, as the light is; half as 1 / b^2, evenly within `closest`, so that dust far inside is
 * met as often. Both kinds have the weight of the mixture, 2 at most (composite biasing, Baes et al. 2016, A&A 590, A55).
 */
export function impactParameter(out: Float64Array, outer: number, closest: number, u: number): void {
  // Of the second kind 1 part lies within `closest`, the others outside.
  const parts = 1 + 2 * Math.log(outer / closest)
  const part = (2 * u - 1) * parts
  let b = outer * Math.sqrt(2 * u)
  if (u >= 0.5) b = part < 1 ? closest * Math.sqrt(part) : closest * Math.exp(0.5 * (part - 1))
  out[0] = Math.min(b, outer * (1 - 1e-12))
  out[1] = 2 / (1 + (outer / Math.max(b, closest)) ** 2 / parts)
}

/** Cubes know no inner radius: half of the light from outside is drawn towards this share of their reach. */
const INNER = 0.1

/**
 * Starts a packet of isotropic light on its way into the sphere about all cells; u chooses the impact parameter. Returns its weight.
 * About cubes some miss all of them: the walk is in no cell then.
 */
export function launchInwards(walk: Walk, cells: Cells, u: number, uniform: () => number, out: Float64Array): number {
  const reach = reachOf(cells)
  impactParameter(out, reach, isOctree(cells) ? INNER * reach : cells.r[1], u)
  const [b, weight] = out
  isotropicDirection(out, uniform(), uniform())
  const [ux, uy, uz] = out
  deflect(out, ux, uy, uz, 0, uniform())
  if (!walk.enter(b * out[0], b * out[1], b * out[2], ux, uy, uz)) walk.cell = -1
  out[0] = ux
  out[1] = uy
  out[2] = uz
  return weight
}
