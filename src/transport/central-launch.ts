import { sphericalOf } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { sampleBin } from '../math/cdf.js'
import type { EquilibriumMedium, EquilibriumSource } from './equilibrium-medium.js'

/**
 * Brings the walk to where light of a bin, straight from the centre, first meets dust. By symmetry it may stand at azimuth 0, in one
 * dimension in any direction.
 */
export function meetDust(
  walk: SphericalWalk,
  { walls, components, bins, extinction }: EquilibriumMedium,
  { columns, columnDensity }: Extract<EquilibriumSource, { kind: 'central-stars' }>,
  bin: number,
  uniform: () => number
): void {
  const { r, cosTheta } = sphericalOf(walls)
  const nr = r.length - 1
  const nt = cosTheta.length - 1
  const column = nt > 1 ? sampleBin(columns, bin, uniform()) : 0
  const cosine = nt > 1 ? cosTheta[column + 1] + uniform() * (cosTheta[column] - cosTheta[column + 1]) : 0
  const depthTo = (wall: number) => {
    let depth = 0
    for (let c = 0; c < components; c++) depth += extinction[c * bins + bin] * columnDensity[(c * nt + column) * (nr + 1) + wall]
    return depth
  }
  const depth = -Math.log1p(uniform() * Math.expm1(-depthTo(nr)))
  let low = 0
  let high = nr
  let before = 0
  let behind = depthTo(nr)
  while (high - low > 1) {
    const middle = (low + high) >> 1
    const there = depthTo(middle)
    if (there <= depth) {
      low = middle
      before = there
    } else {
      high = middle
      behind = there
    }
  }
  const radius = r[low] + Math.min(1, (depth - before) / (behind - before)) * (r[low + 1] - r[low])
  const sine = Math.sqrt(1 - cosine * cosine)
  walk.start(sine * radius, 0, cosine * radius, sine, 0, cosine, low, column, 0)
}
