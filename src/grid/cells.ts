import { cellVolumes, type SphericalWalls } from './geometry.js'
import { cellCube, cubeVolumes, type Octree } from './octree/octree.js'
import { OctreeWalk } from './octree/octree-walk.js'
import { densityIn, mostIn } from './octree/profile.js'
import { SphericalWalk } from './walk.js'

/** Cells of either kind. A model has one kind: all loops of its threads meet walks of one class. */
export type Cells = SphericalWalls | Octree
export type Walk = SphericalWalk | OctreeWalk

export function isOctree(cells: Cells): cells is Octree {
  return 'families' in cells
}

/** Cells that are known to be spherical. */
export function sphericalOf(cells: Cells): SphericalWalls {
  if (isOctree(cells)) throw new TypeError('spherical cells are expected')
  return cells
}

/** 1, 2 or 3: in how many coordinates the cells are divided. */
export function dimensionsOf(cells: Cells): 1 | 2 | 3 {
  if (isOctree(cells) || cells.phi.length > 2) return 3
  return cells.cosTheta.length > 2 ? 2 : 1
}

export function openWalk(cells: Cells): Walk {
  return isOctree(cells) ? new OctreeWalk(cells) : new SphericalWalk(cells)
}

/** Radius of the sphere about the origin that holds all cells, cm. */
export function reachOf(cells: Cells): number {
  if (!isOctree(cells)) return cells.r[cells.r.length - 1]
  const { origin, side } = cells
  return Math.hypot(...Array.from(origin, (low) => Math.max(Math.abs(low), Math.abs(low + side))))
}

/** Whether a point (cm) lies in a cell. */
export function holds(cells: Cells, [x, y, z]: [number, number, number]): boolean {
  if (!isOctree(cells)) return Math.hypot(x, y, z) < reachOf(cells)
  const { origin, side } = cells
  return [x, y, z].every((component, a) => component >= origin[a] && component < origin[a] + side)
}

/** Volume of every cell, cm3, into `out`. */
export function volumesOf(cells: Cells, out: Float64Array): Float64Array {
  return isOctree(cells) ? cubeVolumes(cells, out) : cellVolumes(cells, out)
}

const cube = new Float64Array(4)

/** A point drawn in a cell as the dust lies there, cm, three numbers into `out`. */
export function drawInCell(cells: Cells, cell: number, uniform: () => number, out: Float64Array): void {
  if (isOctree(cells)) {
    cellCube(cells, cell, cube)
    const { cuts } = cells
    const profile = cells.profiles[cell]
    const most = mostIn(profile, cuts)
    do for (let a = 0; a < 3; a++) out[a] = uniform() - 0.5
    while (uniform() * most > densityIn(profile, cuts, out[0], out[1], out[2]))
    for (let a = 0; a < 3; a++) out[a] = cube[a] + out[a] * cube[3]
    return
  }
  const { r, cosTheta, phi } = cells
  const np = phi.length - 1
  const nt = cosTheta.length - 1
  const whole = cell === 0
  const ip = whole ? 0 : (cell - 1) % np
  const it = whole ? 0 : ((cell - 1 - ip) / np) % nt
  const ir = whole ? 0 : 1 + Math.floor((cell - 1) / (np * nt))
  const a = r[ir]
  const b = r[ir + 1]
  const radius = Math.cbrt(a * a * a + uniform() * (b * b * b - a * a * a))
  const cosLow = whole ? -1 : cosTheta[it + 1]
  const cosHigh = whole ? 1 : cosTheta[it]
  const phiLow = whole ? 0 : phi[ip]
  const phiHigh = whole ? 2 * Math.PI : phi[ip + 1]
  const mu = cosLow + uniform() * (cosHigh - cosLow)
  const azimuth = phiLow + uniform() * (phiHigh - phiLow)
  const sin = Math.sqrt(Math.max(0, 1 - mu * mu)) * radius
  out[0] = sin * Math.cos(azimuth)
  out[1] = sin * Math.sin(azimuth)
  out[2] = mu * radius
}
