import { describe, expect, it } from 'vitest'
import { AmountError, amountScale } from '../../src/shapes/amount-scale.js'
import { infall } from '../../src/shapes/infall.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const spec = (inner: number, outer: number, centrifugalRadius: number) =>
  ({ kind: 'infall', inner, outer, centrifugalRadius }) as const

describe('infall', () => {
  it('is free fall without rotation far from the centrifugal radius', () => {
    const { relativeDensity } = infall(spec(1, 1e6, 0.01))
    // mu0 -> mu and mu/mu0 -> 1 in the formula of Ulrich (1976): rho -> q^-3/2 / sqrt(2), the same in every direction.
    for (const mu of [0.05, 0.5, 1]) {
      const density = relativeDensity(1e5 * Math.sqrt(1 - mu * mu), 0, 1e5 * mu)
      expect(density / (1e7 ** -1.5 / Math.SQRT2)).toBeCloseTo(1, 5)
    }
  })

  itWith(scipy, 'has the density, mass and columns of the formula of Ulrich (1976), by SciPy', () => {
    const specs = [spec(1, 1000, 50), spec(60, 1000, 50), spec(1, 40, 50), spec(0.5, 300, 299)]
    const points = [0.1, 0.6, 0.97, 1.02, 1.7, 9].flatMap((q) => [0.02, 0.3, 0.9, 1].map((mu) => [q, mu]))
    const script = `
import numpy as np
from scipy.integrate import quad
from scipy.optimize import brentq
def rho(q, mu):
    root = brentq(lambda m: m**3 + m*(q - 1) - mu*q, max(mu, np.sqrt(max(0, 1 - q)))*(1 - 1e-12), 1 + 1e-12, xtol=1e-15)
    return q**-1.5 * (1 + mu/root)**-0.5 / (mu/root + 2*root**2/q)
def layer(q):
    # mu = t^3 tames the peak at the midplane
    return quad(lambda t: 3*t*t*rho(q, t**3), 0, 1, epsabs=0, epsrel=1e-8, limit=400)[0]
def mass(s):
    rc = s['centrifugalRadius']
    cuts = sorted({s['inner']/rc, s['outer']/rc} | ({1.0} if s['inner'] < rc < s['outer'] else set()))
    return rc**3 * sum(4*np.pi*quad(lambda u: np.exp(3*u)*layer(np.exp(u)), np.log(a), np.log(b), epsabs=0, epsrel=1e-6, limit=200)[0] for a, b in zip(cuts, cuts[1:]))
def column(s):
    rc = s['centrifugalRadius']
    if s['inner'] < rc < s['outer']: return None
    return rc*quad(lambda q: rho(q, 1e-9), s['inner']/rc, s['outer']/rc, epsabs=0, epsrel=1e-9, limit=400)[0]
answer = {'densities': [rho(q, mu) for q, mu in data['points']], 'shapes': [[mass(s), column(s)] for s in data['specs']]}
`
    const { densities, shapes } = askPython<{ densities: number[]; shapes: [number, number | null][] }>(script, { specs, points })
    const { relativeDensity } = infall(spec(0.01, 1000, 1))
    points.forEach(([q, mu], i) => {
      const rho = q * Math.sqrt(1 - mu * mu)
      expect(relativeDensity(0, rho, q * mu) / densities[i]).toBeCloseTo(1, 9)
      expect(relativeDensity(rho, 0, -q * mu) / densities[i]).toBeCloseTo(1, 9)
    })
    specs.forEach((one, i) => {
      const shape = infall(one)
      expect(shape.totalMass / shapes[i][0]).toBeCloseTo(1, 5)
      if (shapes[i][1] === null) expect(shape.column).toBe(Number.POSITIVE_INFINITY)
      else expect(shape.column / shapes[i][1]!).toBeCloseTo(1, 6)
    })
  })

  it('has no optical depth across its centrifugal radius', () => {
    const amount = { kind: 'optical-depth', opticalDepth: 1, at: 1e-4 } as const
    expect(() => amountScale(infall(spec(1, 100, 50)), amount, () => 1)).toThrow(AmountError)
    expect(() => amountScale(infall(spec(1, 100, 50)), amount, () => 1)).toThrow(/infinite at its centrifugal radius/)
  })
})
