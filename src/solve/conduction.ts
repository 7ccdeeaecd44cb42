import { type Cells, isOctree } from '../grid/cells.js'
import type { SphericalWalls } from '../grid/geometry.js'
import { forEachCubeWall } from '../grid/octree/octree-neighbours.js'
import type { Model } from '../model/model.js'

/** Walls of the unknown cells through which radiation diffuses; those of unknown cell k are `first[k]` up to `first[k + 1]`. */
export interface Conduction {
  first: Int32Array
  /** The cell beyond the wall, and its place among the unknown ones, or -1. */
  neighbour: Int32Array
  other: Int32Array
  /** Area of the wall, cm2, and paths from the middles of the two cells to it, cm. */
  area: Float64Array
  path: Float64Array
  pathBeyond: Float64Array
  /** Optical depth between the middles of the two cells. */
  between: Float64Array
  /** Area of the wall over that, cm2; 0 where nothing is conducted. */
  conductance: Float64Array
}

/** The walls of cells, which conduct nothing yet. */
export function wallsOf({ walls, cells }: Pick<Model, 'walls' | 'cells'>, unknown: number[]): Conduction {
  const place = new Int32Array(cells).fill(-1)
  unknown.forEach((cell, k) => {
    place[cell] = k
  })
  const first = new Int32Array(unknown.length + 1)
  const neighbour: number[] = []
  const area: number[] = []
  const path: number[] = []
  const pathBeyond: number[] = []
  unknown.forEach((cell, k) => {
    forEachWall(walls, cell, (beyond, size, near, far) => {
      if (beyond < 0) return
      neighbour.push(beyond)
      area.push(size)
      path.push(near)
      pathBeyond.push(far)
    })
    first[k + 1] = neighbour.length
  })
  return {
    first,
    neighbour: Int32Array.from(neighbour),
    other: Int32Array.from(neighbour, (cell) => place[cell]),
    area: Float64Array.from(area),
    path: Float64Array.from(path),
    pathBeyond: Float64Array.from(pathBeyond),
    between: new Float64Array(area.length),
    conductance: new Float64Array(area.length)
  }
}

/** Sets what the walls conduct. `extinction` by cell: the Rosseland mean, cm-1, 0 where there is no dust that conducts. */
export function setConductances(conduction: Conduction, unknown: number[], extinction: Float64Array): void {
  const { first, neighbour, area, path, pathBeyond, between, conductance } = conduction
  unknown.forEach((cell, k) => {
    const here = extinction[cell]
    for (let e = first[k]; e < first[k + 1]; e++) {
      const there = extinction[neighbour[e]]
      between[e] = here * path[e] + there * pathBeyond[e]
      conductance[e] = here > 0 && there > 0 ? area[e] / between[e] : 0
    }
  })
}

/**
 * Calls `visit` for every wall of a cell: the cell beyond, or -1 for none, the area (cm2), and the paths (cm) from the middles of the
 * two cells to the wall. Paths along the radius are such that shells conduct exactly: area x int dr / (area at r).
 */
export function forEachWall(
  cells: Cells,
  cell: number,
  visit: (beyond: number, area: number, path: number, pathBeyond: number) => void
): void {
  if (isOctree(cells)) forEachCubeWall(cells, cell, visit)
  else forEachSphericalWall(cells, cell, visit)
}

function forEachSphericalWall(
  { r, cosTheta, phi }: SphericalWalls,
  cell: number,
  visit: (beyond: number, area: number, path: number, pathBeyond: number) => void
): void {
  const nr = r.length - 1
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  const index = (ir: number, it: number, ip: number) => (ir === 0 ? 0 : 1 + ((ir - 1) * nt + it) * np + ip)
  const middle = (ir: number) => 0.5 * (r[ir] + r[ir + 1])
  const across = (wall: number, ir: number) => r[wall] * Math.abs(1 - r[wall] / middle(ir))
  const radial = (wall: number, it: number, ip: number, from: number, to: number) => {
    const area = r[wall] ** 2 * (cosTheta[it] - cosTheta[it + 1]) * (phi[ip + 1] - phi[ip])
    if (to < nr) visit(index(to, it, ip), area, across(wall, from), across(wall, to))
    else visit(-1, area, across(wall, from), 0)
  }
  if (cell === 0) {
    for (let it = 0; it < nt; it++) for (let ip = 0; ip < np; ip++) radial(1, it, ip, 0, 1)
    return
  }
  const ip = (cell - 1) % np
  const it = Math.floor((cell - 1) / np) % nt
  const ir = 1 + Math.floor((cell - 1) / (np * nt))
  radial(ir, it, ip, ir, ir - 1)
  radial(ir + 1, it, ip, ir, ir + 1)
  const strip = 0.5 * (r[ir + 1] ** 2 - r[ir] ** 2)
  const theta = (wall: number) => Math.acos(cosTheta[wall])
  const half = (k: number) => 0.5 * middle(ir) * (theta(k + 1) - theta(k))
  for (const [wall, beyond] of [
    [it, it - 1],
    [it + 1, it + 1]
  ]) {
    if (beyond < 0 || beyond >= nt) continue
    const area = strip * Math.sin(theta(wall)) * (phi[ip + 1] - phi[ip])
    visit(index(ir, beyond, ip), area, half(it), half(beyond))
  }
  if (np > 1) {
    const area = strip * (theta(it + 1) - theta(it))
    const lever = 0.5 * middle(ir) * Math.sin(0.5 * (theta(it) + theta(it + 1)))
    for (const beyond of [(ip + np - 1) % np, (ip + 1) % np])
      visit(index(ir, it, beyond), area, lever * (phi[ip + 1] - phi[ip]), lever * (phi[beyond + 1] - phi[beyond]))
  }
}
