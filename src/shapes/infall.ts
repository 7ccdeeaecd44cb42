import { integrate } from '../math/quadrature.js'
import { quantileOf } from '../math/quantile.js'
import type { ShapeSpec } from '../scene/types.js'
import { lazy } from './quantiles.js'
import type { AxialShape } from './shape.js'
import { onSphere } from './shell.js'

type InfallSpec = Extract<ShapeSpec, { kind: 'infall' }>

/**
 * Rotating infall (Ulrich 1976, ApJ 210, 377): with q = r/rc and mu0 the
 * root in [0, 1] of mu0^3 + mu0 (q - 1) = mu q, the cosine from which the matter at (r, mu) has come,
 *   rho = q^-3/2 (1 + mu/mu0)^-1/2 (mu/mu0 + 2 mu0^2/q)^-1, where mu/mu0 = 1 - (1 - mu0^2)/q.
 * It is infinite on the circle r = rc of the midplane, and so is a column through that circle, but not the mass: d mu/d mu0
 * equals the last bracket, so that the integral over mu at one radius is that of q^-3/2 (1 + mu/mu0)^-1/2 over mu0, elementary.
 */
export function infall({ inner, outer, centrifugalRadius: rc }: InfallSpec): AxialShape {
  /** Integral of (2 - (1 - m^2)/q)^-1/2 over m from 0. */
  const antiderivative = (q: number, m: number) => Math.sqrt(q) * Math.log(m / Math.sqrt(q) + Math.sqrt(2 - (1 - m * m) / q))
  const polarIntegral = (r: number, from: number, to: number) => {
    if (r < inner || r > outer) return 0
    const q = r / rc
    return q ** -1.5 * (antiderivative(q, origin(q, to)) - antiderivative(q, origin(q, from)))
  }
  const perLogRadius = (lnR: number) => Math.exp(3 * lnR) * polarIntegral(Math.exp(lnR), 0, 1)
  const breaks = [inner, ...(inner < rc && rc < outer ? [rc] : []), outer]
  const logBreaks = breaks.map(Math.log)
  const lnRadius = lazy(() => quantileOf(perLogRadius, logBreaks))
  let mass = 0
  for (let i = 1; i < breaks.length; i++) mass += 4 * Math.PI * integrate(perLogRadius, logBreaks[i - 1], logBreaks[i])
  return {
    symmetry: 'axial',
    relativeDensity: (x, y, z) => {
      const r = Math.sqrt(x * x + y * y + z * z)
      if (r < inner || r > outer) return 0
      const q = r / rc
      const m2 = origin(q, Math.abs(z) / r) ** 2
      const ratio = 1 - (1 - m2) / q
      return q ** -1.5 / (Math.sqrt(1 + ratio) * (ratio + (2 * m2) / q))
    },
    totalMass: mass,
    column: rc * midplane(inner / rc, outer / rc),
    line: { from: [inner, 0, 0], to: [outer, 0, 0] },
    innerRadius: inner,
    outerRadius: outer,
    sphereEdges: breaks,
    cylinderEdges: [],
    coneEdges: [],
    aspectRatios: [0.05, 0.2],
    radialStep: 0.2,
    polarIntegral,
    place: (u, v, w, out) => {
      const r = Math.exp(lnRadius(u))
      const q = r / rc
      const low = antiderivative(q, Math.sqrt(Math.max(0, 1 - q)))
      const t = Math.exp((low + Math.abs(2 * w - 1) * (antiderivative(q, 1) - low)) / Math.sqrt(q))
      const m = Math.min(1, 0.5 * Math.sqrt(q) * (t - (2 - 1 / q) / t))
      const mu = Math.min(1, Math.max(0, m * (1 - (1 - m * m) / q)))
      onSphere(r, v, w < 0.5 ? -mu : mu, out)
    },
    details: { x: [0, 0], y: [0, 0], z: [0, 0], radius: [inner, Math.min(rc, outer)] }
  }
}

/** The root in [0, 1] of m^3 + m (q - 1) = mu q, by the closed forms of a cubic and one step of Newton. */
function origin(q: number, mu: number): number {
  const p = q - 1
  const c = mu * q
  const s = 2 * Math.sqrt(Math.abs(p) / 3)
  const t = (1.5 * c) / (0.5 * s * Math.abs(p))
  let m: number
  if (Math.abs(p) < 1e-9) m = Math.cbrt(c)
  else if (p > 0) m = s * Math.sinh(Math.asinh(t) / 3)
  else m = s * (t < 1 ? Math.cos(Math.acos(t) / 3) : Math.cosh(Math.acosh(t) / 3))
  const slope = 3 * m * m + p
  return Math.min(1, Math.max(0, slope > 1e-6 ? m - (m * m * m + p * m - c) / slope : m))
}

/**
 * Integral of the midplane density over q. Inside rc matter comes from mu0^2 = 1 - q and the density is q^(-1/2) / (2 (1 - q));
 * outside from the midplane itself, and it is (2 q - 1)^(-1/2) / (q - 1).
 */
function midplane(from: number, to: number): number {
  if (from <= 1 && to >= 1) return Number.POSITIVE_INFINITY
  if (to < 1) return Math.atanh(Math.sqrt(to)) - Math.atanh(Math.sqrt(from))
  const inside = (q: number) => {
    const s = Math.sqrt(2 * q - 1)
    return Math.log((s - 1) / (s + 1))
  }
  return inside(to) - inside(from)
}
