import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { polarCuts } from '../shapes/polar-mean.js'
import type { AxialShape, Shape } from '../shapes/shape.js'

/** Relative difference of rules of 3 and 5 points that is accepted; the 5 points are then far better. */
const ACCURACY = 1e-4
/** Densities below this fraction of the midplane density at the same radius need no accuracy. */
const NEGLIGIBLE = 1e-10
const DEEPEST = 12
const THREE = gaussLegendre(3)
const FOUR = gaussLegendre(4)
const FIVE = gaussLegendre(5)

/** Mean relative density of a shape with symmetry between two radii (cm) and two cosines of the polar angle, a < b, low < high. */
export function cellMean(shape: Exclude<Shape, { symmetry: 'none' }>, a: number, b: number, low: number, high: number): number {
  if (shape.symmetry === 'spherical') return shape.massBetween(a, b) / (4 * Math.PI * layer(a, b))
  // Shapes are symmetric about the midplane: cells below it are mirrored, cells across it are cut there.
  const above = shape.polarIntegral ? sumOverRadius : sumOverCosine
  const sum =
    high <= 0
      ? above(shape, a, b, -high, -low)
      : low >= 0
        ? above(shape, a, b, low, high)
        : above(shape, a, b, 0, high) + above(shape, a, b, 0, -low)
  return sum / (layer(a, b) * (high - low))
}

/** (b^3 - a^3)/3 */
function layer(a: number, b: number): number {
  return ((b - a) * (a * a + a * b + b * b)) / 3
}

/** Integral of rho r^2 dr dmu for 0 <= low < high where that over mu is known. */
function sumOverRadius({ sphereEdges, polarIntegral, innerRadius }: AxialShape, a: number, b: number, low: number, high: number) {
  const from = Math.max(a, innerRadius)
  if (!(from < b)) return 0
  const cuts = [from, ...sphereEdges.filter((r) => r > from && r < b).sort((p, q) => p - q), b]
  const integrand = (r: number) => r * r * polarIntegral!(r, low, high)
  let sum = 0
  for (let i = 1; i < cuts.length; i++) sum += refine(integrand, cuts[i - 1], cuts[i], 0, DEEPEST)
  return sum
}

/**
 * Integral of rho r^2 dr dmu for 0 <= low < high. At each mu the edges of the shape cut r in parts; an edge enters or leaves the
 * cell at certain mu, between which the integral over r is smooth.
 */
function sumOverCosine(shape: AxialShape, a: number, b: number, low: number, high: number): number {
  const radii = shape.sphereEdges.filter((r) => r > a && r < b)
  const cuts = polarCuts(shape, [a, b, ...radii], low, high)
  const alongRadius = (mu: number) => radialSum(shape, radii, a, b, mu)
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

/** Integral of rho r^2 dr from a to b along one polar angle. */
function radialSum(shape: AxialShape, radii: number[], a: number, b: number, mu: number): number {
  const { cylinderEdges, radialStep, relativeDensity, innerRadius } = shape
  const sin = Math.sqrt((1 - mu) * (1 + mu))
  const first = Math.max(a, innerRadius)
  const cuts = [first, b]
  for (const r of radii) if (r > first) cuts.push(r)
  for (const R of cylinderEdges) if (R > first * sin && R < b * sin) cuts.push(R / sin)
  cuts.sort((p, q) => p - q)
  const integrand = (r: number) => r * r * relativeDensity(r * sin, 0, r * mu)
  let sum = 0
  for (let i = 1; i < cuts.length; i++) {
    const [from, to] = [cuts[i - 1], cuts[i]]
    const middle = 0.5 * (from + to)
    if (!(from < to) || relativeDensity(middle * sin, 0, middle * mu) === 0) continue
    const panels = from > 0 ? Math.ceil(Math.log(to / from) / radialStep) : 1
    for (let k = 0; k < panels; k++) {
      sum += applyRule(
        FOUR,
        integrand,
        panels === 1 ? from : from * (to / from) ** (k / panels),
        panels === 1 ? to : from * (to / from) ** ((k + 1) / panels)
      )
    }
  }
  return sum
}
