import { applyRule, type QuadratureRule } from '../math/quadrature.js'
import type { AxialShape, Shape } from './shape.js'

/** Azimuths at which a shape without symmetry is sampled. */
const AZIMUTHS = Array.from({ length: 8 }, (_, k) => [Math.cos((Math.PI * (k + 0.5)) / 4), Math.sin((Math.PI * (k + 0.5)) / 4)])

/**
 * Mean of the relative density over |cos(theta)| from `from` to `to` on the sphere of radius r (cm), with a quadrature rule
 * over each part between the shape's edges, which are found exactly; coarsely over azimuth. 0 <= from < to <= 1.
 */
export function polarMean(shape: Shape, r: number, from: number, to: number, rule: QuadratureRule): number {
  if (shape.symmetry === 'spherical') return shape.relativeDensity(r, 0, 0)
  const { relativeDensity } = shape
  if (shape.symmetry === 'none') {
    const around = (mu: number) => {
      const rho = r * Math.sqrt((1 - mu) * (1 + mu))
      const z = r * mu
      return AZIMUTHS.reduce(
        (sum, [cos, sin]) => sum + relativeDensity(rho * cos, rho * sin, z) + relativeDensity(rho * cos, rho * sin, -z),
        0
      )
    }
    return applyRule(rule, around, from, to) / (2 * AZIMUTHS.length * (to - from))
  }
  if (shape.polarIntegral) return shape.polarIntegral(r, from, to) / (to - from)
  const density = (mu: number) => relativeDensity(r * Math.sqrt((1 - mu) * (1 + mu)), 0, r * mu)
  const cuts = polarCuts(shape, [r], from, to)
  let sum = 0
  for (let i = 1; i < cuts.length; i++) sum += applyRule(rule, density, cuts[i - 1], cuts[i])
  return sum / (to - from)
}

/** cos(theta) from `from` to `to`, and those between at which an edge of the shape meets one of the spheres. */
export function polarCuts({ cylinderEdges, coneEdges }: AxialShape, radii: number[], from: number, to: number): number[] {
  const cuts = radii.flatMap((r) => cylinderEdges.map((R) => cosThetaAt(r, R)))
  return [from, ...[...cuts, ...coneEdges].filter((mu) => mu > from && mu < to).sort((a, b) => a - b), to]
}

/** cos(theta) where the sphere of radius r meets the cylinder of radius R above the midplane; 0 when it lies within. */
function cosThetaAt(r: number, R: number): number {
  return r > R ? Math.sqrt((r - R) * (r + R)) / r : 0
}
