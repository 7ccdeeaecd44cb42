import { powerOf } from '../math/power.js'
import { powerIntegral } from './power-integral.js'
import { noDetails, type SphericalShape } from './shape.js'

/** Spherical shell, density ~ r^slope for inner <= r <= outer (cm). Relative to the density at `outer`. */
export function shell(inner: number, outer: number, slope: number): SphericalShape {
  const massBetween = (from: number, to: number): number => {
    const a = Math.max(from, inner)
    const b = Math.min(to, outer)
    return a < b ? 4 * Math.PI * outer ** 3 * powerIntegral(a / outer, b / outer, slope + 2) : 0
  }
  const power = powerOf(slope)
  return {
    symmetry: 'spherical',
    relativeDensity: (x, y, z) => {
      const r = Math.sqrt(x * x + y * y + z * z)
      return r >= inner && r <= outer ? power(r / outer) : 0
    },
    totalMass: massBetween(inner, outer),
    column: outer * powerIntegral(inner / outer, 1, slope),
    line: { from: [inner, 0, 0], to: [outer, 0, 0] },
    innerRadius: inner,
    outerRadius: outer,
    sphereEdges: inner > 0 ? [inner, outer] : [outer],
    massBetween,
    place: (u, v, w, out) => onSphere(outer * powerQuantile(inner / outer, slope + 3, u), v, 2 * w - 1, out),
    details: inner > 0 ? { x: [0], y: [0], z: [0], radius: [inner] } : noDetails
  }
}

/** x between a and 1 below which a share u of the integral of x^(n - 1) lies. */
function powerQuantile(a: number, n: number, u: number): number {
  const logSpan = -Math.log(a)
  if (Math.abs(n) * logSpan < 1e-9) return a ** (1 - u)
  const low = a ** n
  return (low + u * (1 - low)) ** (1 / n)
}

/** The point at radius r, azimuth 2 pi v and cosine mu of the polar angle. */
export function onSphere(r: number, v: number, mu: number, out: Float64Array): void {
  const rho = r * Math.sqrt((1 - mu) * (1 + mu))
  out[0] = rho * Math.cos(2 * Math.PI * v)
  out[1] = rho * Math.sin(2 * Math.PI * v)
  out[2] = r * mu
}
