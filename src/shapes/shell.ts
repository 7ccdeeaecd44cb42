import { powerIntegral } from './power-integral.js'
import type { SphericalShape } from './shape.js'

/** Spherical shell, density ~ r^slope for inner <= r <= outer (cm). Relative to the density at `outer`. */
export function shell(inner: number, outer: number, slope: number): SphericalShape {
  const massBetween = (from: number, to: number): number => {
    const a = Math.max(from, inner)
    const b = Math.min(to, outer)
    return a < b ? 4 * Math.PI * outer ** 3 * powerIntegral(a / outer, b / outer, slope + 2) : 0
  }
  return {
    symmetry: 'spherical',
    relativeDensity: (x, y, z) => {
      const r = Math.sqrt(x * x + y * y + z * z)
      return r >= inner && r <= outer ? (r / outer) ** slope : 0
    },
    totalMass: massBetween(inner, outer),
    column: outer * powerIntegral(inner / outer, 1, slope),
    innerRadius: inner,
    outerRadius: outer,
    sphereEdges: inner > 0 ? [inner, outer] : [outer],
    massBetween
  }
}
