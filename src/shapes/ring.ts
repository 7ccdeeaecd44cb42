import { integrate } from '../math/quadrature.js'
import { quantileOf } from '../math/quantile.js'
import type { ShapeSpec } from '../scene/types.js'
import { lazy, normalQuantile } from './quantiles.js'
import type { AxialShape, FreeShape } from './shape.js'

type RingSpec = Extract<ShapeSpec, { kind: 'ring' }>

/** The Gaussians are cut at this many sigma; 2e-9 of the mass lies beyond in each. */
const SIGMAS = 6
/** Walls at these distances from the densest radius, in sigma. */
const WALLS = [-6, -4, -3, -2.5, -2, -1.5, -1, -0.5, 0, 0.5, 1, 1.5, 2, 2.5, 3, 4, 6]

/**
 * Ring of Gaussian profile in semi-major axis and in height: exp(-(a - radius)^2 / (2 width^2) - z^2 / (2 h^2)), with
 * a = R (1 + e cos(phi - periapsis)) / (1 - e^2) that of the ellipse with a focus at the origin through the point; 1 where it is
 * densest. The area between two ellipses is pi sqrt(1 - e^2) times the difference of their a^2.
 */
export function ring({ radius, width, scaleHeight: h, eccentricity: e, periapsis }: RingSpec): AxialShape | FreeShape {
  const first = Math.max(0, radius - SIGMAS * width)
  const last = radius + SIGMAS * width
  const profile = (a: number) => Math.exp(-0.5 * ((a - radius) / width) ** 2)
  const [cosP, sinP] = [Math.cos(periapsis), Math.sin(periapsis)]
  const columnAtPeak = h * integrate((t) => Math.exp(-0.5 * t * t), -SIGMAS, SIGMAS)
  const semiMajor = lazy(() => quantileOf((a) => a * profile(a), [first, last]))
  const anomaly = lazy(() => quantileOf((f) => (1 + e * Math.cos(f)) ** -2, [0, 2 * Math.PI]))
  const densest = radius * (1 - e)
  const base = {
    relativeDensity: (x: number, y: number, z: number) => {
      const a = (Math.sqrt(x * x + y * y) + e * (x * cosP + y * sinP)) / (1 - e * e)
      if (a < first || a > last || Math.abs(z) > SIGMAS * h) return 0
      return profile(a) * Math.exp(-0.5 * (z / h) ** 2)
    },
    totalMass: columnAtPeak * 2 * Math.PI * Math.sqrt(1 - e * e) * integrate((a) => a * profile(a), first, last),
    column: columnAtPeak,
    line: {
      from: [densest * cosP, densest * sinP, -SIGMAS * h] as const,
      to: [densest * cosP, densest * sinP, SIGMAS * h] as const
    },
    innerRadius: first * (1 - e),
    outerRadius: Math.hypot(last * (1 + e), SIGMAS * h),
    place: (u: number, v: number, w: number, out: Float64Array) => {
      const f = anomaly(v)
      const R = (semiMajor(u) * (1 - e * e)) / (1 + e * Math.cos(f))
      out[0] = R * Math.cos(f + periapsis)
      out[1] = R * Math.sin(f + periapsis)
      out[2] = h * normalQuantile(w)
    },
    details: spheresAlong(radius, e, periapsis, Math.min(width, h))
  }
  if (e > 0) {
    const sphereEdges = [first * (1 - e), densest, radius * (1 + e), last * (1 + e), base.outerRadius].filter((r) => r > 0)
    return { symmetry: 'none', ...base, sphereEdges }
  }
  return {
    symmetry: 'axial',
    ...base,
    sphereEdges: WALLS.map((sigmas) => radius + sigmas * width).filter((r) => r > 0),
    cylinderEdges: [first, last].filter((R) => R > 0),
    coneEdges: [],
    aspectRatios: [h / (radius + 2 * width), h / Math.max(radius - 2 * width, 0.3 * radius)],
    radialStep: Math.min(0.2, width / radius)
  }
}

/** Spheres of the size of the ring's thickness along its densest ellipse. */
function spheresAlong(radius: number, e: number, periapsis: number, thickness: number) {
  const count = Math.min(100_000, Math.ceil((2 * Math.PI * radius) / thickness))
  const distance = (f: number) => (radius * (1 - e * e)) / (1 + e * Math.cos(f))
  const angles = Array.from({ length: count }, (_, i) => (2 * Math.PI * i) / count)
  return {
    x: angles.map((f) => distance(f) * Math.cos(f + periapsis)),
    y: angles.map((f) => distance(f) * Math.sin(f + periapsis)),
    z: new Float64Array(count),
    radius: new Float64Array(count).fill(thickness)
  }
}
