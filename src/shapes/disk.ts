import { powerOf } from '../math/power.js'
import { integrate } from '../math/quadrature.js'
import { quantileOf } from '../math/quantile.js'
import type { ShapeSpec } from '../scene/types.js'
import { oneMinusExpOver, powerIntegral } from './power-integral.js'
import { lazy, normalQuantile } from './quantiles.js'
import type { AxialShape } from './shape.js'

type DiskSpec = Extract<ShapeSpec, { kind: 'disk' }>

/** The Gaussian profile is followed to this many scale heights; 2e-9 of the mass lies beyond. */
const HEIGHTS = 6
/** The exponential edge has fallen to e^-18 where polar cells cease to follow the scale height. */
const TAPER_DEPTH = 18

/**
 * Disk with a Gaussian vertical profile, rho = Sigma(R)/(sqrt(2 pi) h) exp(-z^2/(2 h^2)) for inner <= R <= outer,
 * h = value (R/at)^flaring, Sigma = (R/at)^s, or with a taper at Rt the self-similar profile
 * Sigma = (R/Rt)^s exp(-(R/Rt)^(2+s)) (Lynden-Bell & Pringle 1974, MNRAS 168, 603; in this form Hartmann et al. 1998,
 * ApJ 495, 385). Lengths in cm; the relative density has the unit of Sigma / cm. `inner` > 0.
 */
export function disk(spec: DiskSpec): AxialShape {
  const { inner, outer, surfaceSlope: s, taper } = spec
  const { value, at, flaring } = spec.scaleHeight
  const unit = taper ?? at
  const q = taper === undefined ? 0 : 2 + s
  const norm = 1 / Math.sqrt(2 * Math.PI)
  const [flare, fall] = [powerOf(flaring), powerOf(s)]
  const height = (R: number) => value * flare(R / at)
  const edge = taper === undefined ? () => 1 : (R: number) => Math.exp(-((R / unit) ** q))
  const surface = (R: number) => fall(R / unit) * edge(R)

  const relativeDensity = (x: number, y: number, z: number): number => {
    const R = Math.sqrt(x * x + y * y)
    if (R < inner || R > outer) return 0
    const h = height(R)
    const u = z / h
    return (surface(R) * norm * Math.exp(-0.5 * u * u)) / h
  }

  const lnRadius = lazy(() => quantileOf((u) => surface(Math.exp(u)) * Math.exp(2 * u), [Math.log(inner), Math.log(outer)]))
  const reach = (R: number) => Math.hypot(R, HEIGHTS * height(R))
  const bulkEdge = q > 0 ? Math.min(outer, unit * TAPER_DEPTH ** (1 / q)) : outer
  const aspects = [inner, bulkEdge > inner ? bulkEdge : outer].map((R) => height(R) / R)
  return {
    symmetry: 'axial',
    relativeDensity,
    totalMass:
      2 *
      Math.PI *
      unit *
      unit *
      (taper === undefined ? powerIntegral(inner / unit, outer / unit, s + 1) : taperedMass(inner / unit, outer / unit, q)),
    column:
      taper === undefined
        ? ((norm * at) / value) * powerIntegral(inner / at, outer / at, s - flaring)
        : integrate((u) => relativeDensity(Math.exp(u), 0, 0) * Math.exp(u), Math.log(inner), Math.log(outer)),
    line: { from: [inner, 0, 0], to: [outer, 0, 0] },
    innerRadius: inner,
    outerRadius: Math.max(reach(inner), reach(outer)),
    sphereEdges: [],
    cylinderEdges: [inner, outer],
    coneEdges: [],
    rims: [inner, outer],
    aspectRatios: [Math.min(...aspects), Math.max(...aspects)],
    radialStep: 0.2,
    place: (u, v, w, out) => {
      const R = Math.exp(lnRadius(u))
      out[0] = R * Math.cos(2 * Math.PI * v)
      out[1] = R * Math.sin(2 * Math.PI * v)
      out[2] = height(R) * normalQuantile(w)
    },
    details: { x: [0], y: [0], z: [0], radius: [inner] }
  }
}

/**
 * Integral of x^(q-1) exp(-x^q) from a to b: (exp(-a^q) - exp(-b^q))/q, in a form that holds for q of either sign and for
 * q = 0, where the exponential is constant; b^q - a^q = q times the integral of x^(q-1).
 */
function taperedMass(a: number, b: number, q: number): number {
  const power = powerIntegral(a, b, q - 1)
  return Math.exp(-Math.min(a ** q, b ** q)) * power * oneMinusExpOver(Math.abs(q) * power)
}
