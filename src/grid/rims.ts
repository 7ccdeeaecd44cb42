import { allocateShared } from '../math/allocate.js'
import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { cellCount, type SphericalWalls } from './geometry.js'

/** Cylinders about the z axis between which all dust lies. Cells that they cut are filled between them only. */
export interface Rims {
  /** Radii of the cylinders, cm. */
  inner: number
  outer: number
  /** By cell: share of its volume between them; 1 where neither cuts it. */
  filled: Float64Array
}

/** Smaller and larger shares are rounding. */
const LEAST = 1e-9
const RULE = gaussLegendre(6)

/** What two cylinders of radii `inner` < `outer` (cm) leave of spherical cells. */
export function cutByRims({ r, cosTheta, phi }: SphericalWalls, inner: number, outer: number): Rims {
  const np = phi.length - 1
  const cells = cellCount({ r, cosTheta, phi })
  const filled = new Float64Array(allocateShared(8 * cells)).fill(1)
  let cell = 1
  for (let ir = 1; ir < r.length - 1; ir++) {
    for (let it = 0; it < cosTheta.length - 1; it++) {
      const share = shareBetween(r[ir], r[ir + 1], cosTheta[it + 1], cosTheta[it], inner, outer)
      if (share > LEAST && share < 1 - LEAST) filled.fill(share, cell, cell + np)
      cell += np
    }
  }
  return { inner, outer, filled }
}

/** Share of the volume between two spheres and two cones that lies between two cylinders. */
function shareBetween(a: number, b: number, low: number, high: number, inner: number, outer: number): number {
  const cuts = [low, high]
  for (const sphere of [a, b]) {
    for (const cylinder of [inner, outer]) {
      if (sphere <= cylinder) continue
      const mu = Math.sqrt((sphere - cylinder) * (sphere + cylinder)) / sphere
      for (const cut of [-mu, mu]) if (cut > low && cut < high) cuts.push(cut)
    }
  }
  cuts.sort((p, q) => p - q)
  const between = (mu: number) => {
    const sin = Math.sqrt((1 - mu) * (1 + mu))
    return Math.max(0, Math.min(b, outer / sin) ** 3 - Math.max(a, inner / sin) ** 3)
  }
  let sum = 0
  for (let i = 1; i < cuts.length; i++) sum += applyRule(RULE, between, cuts[i - 1], cuts[i])
  return sum / ((b ** 3 - a ** 3) * (high - low))
}
