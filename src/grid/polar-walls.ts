import type { Shape } from '../shapes/shape.js'
import { equalSteps } from './equal-steps.js'

/** Cells a scale height near the midplane, before the number of cells is fixed. */
const CELLS_A_HEIGHT = 4
/** The density is followed at full resolution to this many scale heights; rho falls by e in h/5 there. */
const HEIGHTS = 5.5
/** Cells from the midplane to the pole where there is no disk. */
const BACKGROUND = 10
const FEWEST = 60
const MOST = 120
const POINTS = 4000

/**
 * Cosines of the polar walls, from 1 to -1, symmetric about the midplane (a wall when their number is even).
 * With t = z/R the number of cells a unit of t is CELLS_A_HEIGHT/H for the thinnest of the aspect ratios H = h/R that are
 * met where t < HEIGHTS H, and falls as t^-4 beyond. The nearest walls are moved onto the cones at which a density jumps.
 * `count` 0: chosen so that this resolution is reached, within bounds.
 */
export function polarWalls(shapes: Shape[], count: number): Float64Array {
  const axial = shapes.filter((shape) => shape.symmetry === 'axial')
  const disks = axial.flatMap(({ aspectRatios }) => (aspectRatios ? [aspectRatios] : []))
  const finest = Math.min(1, ...disks.map(([thin]) => thin))
  const elevation = new Float64Array(POINTS + 1)
  const cells = new Float64Array(POINTS + 1)
  const span = Math.asinh(Math.PI / 2 / (0.1 * finest))
  for (let i = 1; i <= POINTS; i++) {
    elevation[i] = i === POINTS ? Math.PI / 2 : 0.1 * finest * Math.sinh((span * i) / POINTS)
    const step = elevation[i] - elevation[i - 1]
    cells[i] = cells[i - 1] + step * cellsPerRadian(disks, elevation[i - 1] + 0.5 * step)
  }
  const chosen = count > 0 ? count : 2 * Math.round(0.5 * Math.min(MOST, Math.max(FEWEST, 2 * cells[POINTS])))
  return withCones(
    mirrored(elevation, cells, chosen),
    axial.flatMap(({ coneEdges }) => coneEdges)
  )
}

function cellsPerRadian(disks: [number, number][], elevation: number): number {
  const t = Math.tan(elevation)
  let most = 0
  for (const [thin, thick] of disks) {
    const aspect = Math.min(thick, Math.max(thin, t / HEIGHTS))
    const beyond = Math.max(1, t / (HEIGHTS * aspect))
    most = Math.max(most, (CELLS_A_HEIGHT / aspect) * beyond ** -4)
  }
  return BACKGROUND / (Math.PI / 2) + most * (1 + t * t)
}

/** Equal steps from pole to pole of a running sum given from the midplane to the pole; cosines from 1 to -1. */
function mirrored(elevation: Float64Array, cells: Float64Array, count: number): Float64Array {
  const half = equalSteps(elevation, cells, count)
  const cosTheta = new Float64Array(count + 1)
  for (let k = 0; 2 * k < count; k++) {
    // Wall k lies (count - 2 k)/count of the way from the midplane to the pole.
    cosTheta[k] = k === 0 ? 1 : Math.sin(half[count - 2 * k])
    cosTheta[count - k] = -cosTheta[k]
  }
  return cosTheta
}

/** The walls with those nearest to given cosines (above 0), and their mirror images, moved there; a wall moves once. */
function withCones(cosTheta: Float64Array, cones: number[]): Float64Array {
  const last = cosTheta.length - 1
  const free = new Set(Array.from({ length: Math.ceil(last / 2) - 1 }, (_, i) => i + 1))
  for (const cone of [...new Set(cones)]) {
    if (free.size === 0) break
    const off = (k: number) => Math.abs(Math.acos(cosTheta[k]) - Math.acos(cone))
    const nearest = [...free].reduce((a, b) => (off(b) < off(a) ? b : a))
    cosTheta[nearest] = cone
    cosTheta[last - nearest] = -cone
    free.delete(nearest)
  }
  return cosTheta.sort((a, b) => b - a)
}
