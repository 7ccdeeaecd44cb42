import { integrate } from '../math/quadrature.js'
import { spreadPoint } from '../math/spread-points.js'
import type { CarveSpec } from '../scene/types.js'
import type { AxialShape, Shape } from './shape.js'

/** Points that find how much of the mass is left where no formula does; good to about 1e-5. */
const SAMPLES = 2 ** 17

/** Whether a gap is a layer between two spheres, or between two cylinders. */
export type GapKind = 'spheres' | 'cylinders'

/** A shape with dust taken away. */
export function carve(shape: Shape, cuts: CarveSpec[], kind: GapKind): Shape {
  const gaps = cuts.filter((cut) => cut.kind === 'gap')
  const cavities = cuts.filter((cut) => cut.kind === 'cavity')
  /** What remains at a distance from the centre or the axis, and at a cosine of the polar angle. */
  const atRadius = (r: number) =>
    gaps.reduce((share, { from, to, remaining }) => (r >= from && r < to ? share * remaining : share), 1)
  const cones = cavities.map(({ halfAngle, remaining }) => ({ cosine: Math.cos(halfAngle), remaining }))
  const atCosine = (mu: number) => cones.reduce((share, { cosine, remaining }) => (mu > cosine ? share * remaining : share), 1)
  const remains = (x: number, y: number, z: number) => {
    const R2 = x * x + y * y
    const r = Math.sqrt(R2 + z * z)
    return atRadius(kind === 'spheres' ? r : Math.sqrt(R2)) * atCosine(r > 0 ? Math.abs(z) / r : 0)
  }
  const radii = [...new Set(gaps.flatMap(({ from, to }) => [from, to]))].filter((r) => r > 0 && r < shape.outerRadius)
  const within = (low: number, high: number) => [low, ...radii.filter((r) => r > low && r < high).sort((a, b) => a - b), high]
  const coneEdges = cones.map(({ cosine }) => cosine)
  const { relativeDensity } = shape
  const base = {
    relativeDensity: (x: number, y: number, z: number) => relativeDensity(x, y, z) * remains(x, y, z),
    counts: remains,
    column: carvedColumn(shape, remains, radii, coneEdges),
    innerRadius: innerRadius(shape.innerRadius, gaps)
  }

  if (shape.symmetry === 'none') {
    return {
      ...shape,
      ...base,
      totalMass: shape.totalMass * meanRemaining(shape, remains),
      sphereEdges: [...shape.sphereEdges, ...radii]
    }
  }
  if (shape.symmetry === 'spherical') {
    const massBetween = (from: number, to: number) =>
      pieces(within(from, to), (a, b) => shape.massBetween(a, b) * atRadius(0.5 * (a + b)))
    const sphereEdges = [...shape.sphereEdges, ...radii]
    if (cavities.length === 0)
      return { ...shape, ...base, totalMass: massBetween(0, shape.outerRadius), sphereEdges, massBetween }
    const share = overCosine(coneEdges, 0, 1, (a, b) => (b - a) * atCosine(0.5 * (a + b)))
    return {
      symmetry: 'axial',
      ...base,
      totalMass: massBetween(0, shape.outerRadius) * share,
      line: shape.line,
      outerRadius: shape.outerRadius,
      place: shape.place,
      details: shape.details,
      sphereEdges,
      cylinderEdges: [],
      coneEdges,
      radialStep: 0.2,
      polarIntegral: (r, from, to) =>
        relativeDensity(r, 0, 0) * atRadius(r) * overCosine(coneEdges, from, to, (a, b) => (b - a) * atCosine(0.5 * (a + b)))
    }
  }
  const { polarIntegral } = shape
  const carved: AxialShape = {
    ...shape,
    ...base,
    totalMass: shape.totalMass * meanRemaining(shape, remains),
    sphereEdges: kind === 'spheres' ? [...shape.sphereEdges, ...radii] : shape.sphereEdges,
    cylinderEdges: kind === 'cylinders' ? [...shape.cylinderEdges, ...radii] : shape.cylinderEdges,
    coneEdges,
    ...(polarIntegral && {
      polarIntegral: (r: number, from: number, to: number) =>
        atRadius(r) * overCosine(coneEdges, from, to, (a, b) => polarIntegral(r, a, b) * atCosine(0.5 * (a + b)))
    })
  }
  return carved
}

function pieces(cuts: number[], value: (from: number, to: number) => number): number {
  let sum = 0
  for (let i = 1; i < cuts.length; i++) if (cuts[i] > cuts[i - 1]) sum += value(cuts[i - 1], cuts[i])
  return sum
}

function overCosine(edges: number[], from: number, to: number, value: (from: number, to: number) => number): number {
  return pieces([from, ...edges.filter((mu) => mu > from && mu < to).sort((a, b) => a - b), to], value)
}

/** Mean over the mass of what remains. */
function meanRemaining({ place, relativeDensity }: Shape, remains: (x: number, y: number, z: number) => number): number {
  const p = new Float64Array(3)
  let [sum, count] = [0, 0]
  for (let n = 0; n < SAMPLES; n++) {
    spreadPoint(n, p)
    place(p[0], p[1], p[2], p)
    if (relativeDensity(p[0], p[1], p[2]) === 0) continue
    sum += remains(p[0], p[1], p[2])
    count++
  }
  return count > 0 ? sum / count : 0
}

/** Along the defining line, between the places where something is cut from it. */
function carvedColumn(
  { column, line: { from, to }, relativeDensity }: Shape,
  remains: (x: number, y: number, z: number) => number,
  radii: number[],
  coneEdges: number[]
): number {
  const vertical = from[2] !== to[2]
  const R = Math.hypot(from[0], from[1])
  if (!Number.isFinite(column)) return column
  // On the axis nothing changes along the line.
  if (vertical && R === 0) return column * remains(0, 0, to[2])
  const [low, high] = vertical ? [from[2], to[2]] : [from[0], to[0]]
  const edges = vertical ? coneEdges.map((mu) => (R * mu) / Math.sqrt((1 - mu) * (1 + mu))).flatMap((z) => [-z, z]) : radii
  const cuts = [low, ...edges.filter((s) => s > low && s < high).sort((a, b) => a - b), high]
  const at = (s: number): [number, number, number] => (vertical ? [from[0], from[1], s] : [s, 0, 0])
  return pieces(cuts, (a, b) => remains(...at(0.5 * (a + b))) * integrate((s) => relativeDensity(...at(s)), a, b))
}

/** Further out where nothing is left next to the inner edge. */
function innerRadius(radius: number, gaps: { from: number; to: number; remaining: number }[]): number {
  const gap = gaps.find(({ from, to, remaining }) => remaining === 0 && from <= radius && to > radius)
  return gap ? innerRadius(gap.to, gaps) : radius
}
