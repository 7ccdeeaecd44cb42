import { bracket } from '../math/interp.js'
import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { quantileOf } from '../math/quantile.js'
import { spreadPoint } from '../math/spread-points.js'
import type { DensityPoints } from '../scene/types.js'
import { runningSum } from './cube-field.js'
import { lazy } from './quantiles.js'
import type { FreeShape } from './shape.js'
import { onSphere } from './shell.js'
import { SphereTree } from './sphere-tree.js'

/** Samples of a kernel that the sides of the box cut. */
const CUT_SAMPLES = 2000
const FIVE = gaussLegendre(5)

/** The cubic spline kernel times h^3, for q = distance/h; 0 beyond q = 2 (Monaghan & Lattanzio 1985, A&A 149, 135). */
export function splineKernel(q: number): number {
  if (q >= 2) return 0
  return (q < 1 ? 1 - 1.5 * q * q + 0.75 * q * q * q : 0.25 * (2 - q) ** 3) / Math.PI
}

const distance = lazy(() => quantileOf((q) => q * q * splineKernel(q), [0, 1, 2]))

/**
 * Density of points with smoothing lengths in a box of side `width` (cm) about the origin: the sum of m W(distance, h) over the
 * points, h their own; nothing outside the box. A kernel that the box cuts loses what lies outside.
 */
export function pointField(points: DensityPoints, width: number): FreeShape {
  const { x, y, z, smoothingLength: h, mass } = points
  const half = 0.5 * width
  const reach = h.map((value) => 2 * value)
  const tree = new SphereTree(x, y, z, reach)
  let found = new Int32Array(256)
  const relativeDensity = (px: number, py: number, pz: number): number => {
    if (Math.abs(px) > half || Math.abs(py) > half || Math.abs(pz) > half) return 0
    let count = tree.find(px, py, pz, found)
    if (count > found.length) {
      found = new Int32Array(2 * count)
      count = tree.find(px, py, pz, found)
    }
    let sum = 0
    for (let k = 0; k < count; k++) {
      const i = found[k]
      const d = Math.sqrt((px - x[i]) ** 2 + (py - y[i]) ** 2 + (pz - z[i]) ** 2)
      sum += (mass[i] * splineKernel(d / h[i])) / h[i] ** 3
    }
    return sum
  }
  const inside = mass.map((value, i) => value * shareInside(x[i], y[i], z[i], h[i], half))
  let total = 0
  let farthest = 0
  for (let i = 0; i < inside.length; i++) {
    total += inside[i]
    if (inside[i] > 0) farthest = Math.max(farthest, Math.hypot(x[i], y[i], z[i]) + reach[i])
  }
  const sums = runningSum(inside)
  const outerRadius = Math.min(farthest, Math.sqrt(3) * half)
  return {
    symmetry: 'none',
    relativeDensity,
    totalMass: total,
    column: columnOf(points, half),
    line: { from: [0, 0, -half], to: [0, 0, half] },
    innerRadius: 0,
    outerRadius,
    halfSide: Math.min(farthest, half),
    sphereEdges: [outerRadius],
    place: (u, v, w, out) => {
      const i = bracket(sums, u * total)
      const share = (u * total - sums[i]) / (sums[i + 1] - sums[i])
      onSphere(h[i] * distance(share), v, 2 * w - 1, out)
      out[0] += x[i]
      out[1] += y[i]
      out[2] += z[i]
    },
    details: { x, y, z, radius: h }
  }
}

/** Share of a kernel's mass within the box. */
function shareInside(x: number, y: number, z: number, h: number, half: number): number {
  const farthest = Math.max(Math.abs(x), Math.abs(y), Math.abs(z))
  if (farthest + 2 * h <= half) return 1
  if (farthest - 2 * h >= half) return 0
  const out = new Float64Array(3)
  let count = 0
  for (let n = 0; n < CUT_SAMPLES; n++) {
    spreadPoint(n, out)
    onSphere(h * distance(out[0]), out[1], 2 * out[2] - 1, out)
    if (Math.abs(x + out[0]) <= half && Math.abs(y + out[1]) <= half && Math.abs(z + out[2]) <= half) count++
  }
  return count / CUT_SAMPLES
}

/** Integral of the density along z through the centre. */
function columnOf({ x, y, z, smoothingLength: h, mass }: DensityPoints, half: number): number {
  let sum = 0
  for (let i = 0; i < x.length; i++) {
    const b = Math.hypot(x[i], y[i]) / h[i]
    if (b >= 2) continue
    // The kernel bends at q = 1 and ends at q = 2.
    const [end, bend] = [Math.sqrt(4 - b * b), Math.sqrt(Math.max(0, 1 - b * b))]
    const along = (t: number) => splineKernel(Math.sqrt(b * b + t * t))
    const [low, high] = [(-half - z[i]) / h[i], (half - z[i]) / h[i]]
    const cuts = [-end, -bend, 0, bend, end].map((t) => Math.min(high, Math.max(low, t)))
    for (let k = 1; k < cuts.length; k++) {
      if (cuts[k] > cuts[k - 1]) sum += (mass[i] * applyRule(FIVE, along, cuts[k - 1], cuts[k])) / h[i] ** 2
    }
  }
  return sum
}
