import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { cosThetaAt } from '../shapes/polar-mean.js'
import type { AxialShape, Shape } from '../shapes/shape.js'

/** Relative difference of rules of 3 and 5 points that is accepted; the 5 points are then far better. */
const ACCURACY = 1e-4
/** Densities below this fraction of the midplane density at the same radius need no accuracy. */
const NEGLIGIBLE = 1e-10
const DEEPEST = 12
/** Longest ln r for one rule of four points. */
const RADIAL_PANEL = 0.2
const THREE = gaussLegendre(3)
const FOUR = gaussLegendre(4)
const FIVE = gaussLegendre(5)

/** Mean relative density between two radii (cm) and two cosines of the polar angle, a < b, low < high. */
export function cellMean(shape: Shape, a: number, b: number, low: number, high: number): number {
  if (shape.symmetry === 'spherical') return shape.massBetween(a, b) / (4 * Math.PI * layer(a, b))
  // Shapes are symmetric about the midplane: cells below it are mirrored, cells across it are cut there.
  const sum =
    high <= 0
      ? sumAbove(shape, a, b, -high, -low)
      : low >= 0
        ? sumAbove(shape, a, b, low, high)
        : sumAbove(shape, a, b, 0, high) + sumAbove(shape, a, b, 0, -low)
  return sum / (layer(a, b) * (high - low))
}

/** (b^3 - a^3)/3 */
function layer(a: number, b: number): number {
  return ((b - a) * (a * a + a * b + b * b)) / 3
}

/**
 * Integral of rho r^2 dr dmu for 0 <= low < high. At each mu the rim of the disk bounds r; that bound enters or leaves the
 * cell at up to four mu, between which the integral over r is smooth.
 */
function sumAbove(shape: AxialShape, a: number, b: number, low: number, high: number): number {
  const [inner, outer] = shape.cylinderEdges
  const kinks = [a, b].flatMap((r) => [cosThetaAt(r, inner), cosThetaAt(r, outer)])
  const cuts = [low, ...kinks.filter((mu) => mu > low && mu < high).sort((p, q) => p - q), high]
  const alongRadius = (mu: number) => radialSum(shape, a, b, mu)
  const negligible = NEGLIGIBLE * shape.relativeDensity(0.5 * (a + b), 0, 0) * layer(a, b)
  let sum = 0
  for (let i = 1; i < cuts.length; i++) sum += refine(alongRadius, cuts[i - 1], cuts[i], negligible, DEEPEST)
  return sum
}

function refine(f: (mu: number) => number, low: number, high: number, negligible: number, depth: number): number {
  const sum = applyRule(FIVE, f, low, high)
  const difference = Math.abs(sum - applyRule(THREE, f, low, high))
  if (depth === 0 || difference <= ACCURACY * sum + negligible * (high - low)) return sum
  const middle = 0.5 * (low + high)
  return refine(f, low, middle, negligible, depth - 1) + refine(f, middle, high, negligible, depth - 1)
}

/** Integral of rho r^2 dr from a to b along one polar angle, within the shape's cylindrical edges. */
function radialSum(shape: AxialShape, a: number, b: number, mu: number): number {
  const sin = Math.sqrt((1 - mu) * (1 + mu))
  const from = Math.max(a, shape.cylinderEdges[0] / sin)
  const to = Math.min(b, shape.cylinderEdges[1] / sin)
  if (!(from < to)) return 0
  const panels = Math.ceil(Math.log(to / from) / RADIAL_PANEL)
  const integrand = (r: number) => r * r * shape.relativeDensity(r * sin, 0, r * mu)
  let sum = 0
  for (let k = 0; k < panels; k++) {
    sum += applyRule(FOUR, integrand, from * (to / from) ** (k / panels), from * (to / from) ** ((k + 1) / panels))
  }
  return sum
}
