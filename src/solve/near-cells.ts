import { type Cells, isOctree } from '../grid/cells.js'
import { cellCube } from '../grid/octree/octree.js'
import type { Vector } from '../scene/types.js'
import type { Place } from '../transport/observers.js'

/** A cell is near where it is seen under more than this angle, rad. */
const NEAR = 0.25
/** So many cells are near at most, those seen largest. */
export const MOST_NEAR = 1000

/** A place among cells of three dimensions, and the cells that are near to it. */
export function placeAmong(cells: Cells, count: number, at: Vector): Place {
  const found: { cell: number; angle: number; reach: number }[] = []
  const box = new Float64Array(4)
  for (let cell = 0; cell < count; cell++) {
    const [x, y, z, size] = boxOf(cells, cell, box)
    const distance = Math.hypot(x - at[0], y - at[1], z - at[2])
    if (size > NEAR * distance) found.push({ cell, angle: size / distance, reach: distance + size })
  }
  const near = found.sort((a, b) => b.angle - a.angle).slice(0, MOST_NEAR)
  return {
    at,
    near: Int32Array.from(near, ({ cell }) => cell),
    within: near.reduce((most, { reach }) => Math.max(most, reach), 0)
  }
}

/** Middle and largest width of a cell, cm, four numbers into `out`. */
function boxOf(cells: Cells, cell: number, out: Float64Array): Float64Array {
  if (isOctree(cells)) return cellCube(cells, cell, out)
  const { r, cosTheta, phi } = cells
  if (cell === 0) {
    out.fill(0)
    out[3] = 2 * r[1]
    return out
  }
  const [nt, np] = [cosTheta.length - 1, phi.length - 1]
  const ip = (cell - 1) % np
  const it = ((cell - 1 - ip) / np) % nt
  const ir = 1 + Math.floor((cell - 1) / (np * nt))
  const [low, high] = [r[ir], r[ir + 1]]
  const radius = 0.5 * (low + high)
  const polar = 0.5 * (Math.acos(cosTheta[it]) + Math.acos(cosTheta[it + 1]))
  const azimuth = 0.5 * (phi[ip] + phi[ip + 1])
  const across = radius * Math.sin(polar)
  out[0] = across * Math.cos(azimuth)
  out[1] = across * Math.sin(azimuth)
  out[2] = radius * Math.cos(polar)
  out[3] = Math.max(
    high - low,
    radius * (Math.acos(cosTheta[it + 1]) - Math.acos(cosTheta[it])),
    across * Math.min(2, phi[ip + 1] - phi[ip])
  )
  return out
}
