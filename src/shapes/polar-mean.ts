import { applyRule, type QuadratureRule } from '../math/quadrature.js'
import type { Shape } from './shape.js'

/**
 * Mean of the relative density over cos(theta) from `from` to `to` on the sphere of radius r (cm), with a quadrature rule
 * over the part between the shape's cylindrical edges, which is found exactly. 0 <= from < to <= 1.
 */
export function polarMean(shape: Shape, r: number, from: number, to: number, rule: QuadratureRule): number {
  if (shape.symmetry === 'spherical') return shape.relativeDensity(r, 0, 0)
  const low = Math.max(from, cosThetaAt(r, shape.cylinderEdges[1]))
  const high = Math.min(to, cosThetaAt(r, shape.cylinderEdges[0]))
  if (!(low < high)) return 0
  const density = (mu: number) => shape.relativeDensity(r * Math.sqrt((1 - mu) * (1 + mu)), 0, r * mu)
  return applyRule(rule, density, low, high) / (to - from)
}

/** cos(theta) where the sphere of radius r meets the cylinder of radius R above the midplane; 0 when it lies within. */
export function cosThetaAt(r: number, R: number): number {
  return r > R ? Math.sqrt((r - R) * (r + R)) / r : 0
}
