import { describe, expect, it } from 'vitest'
import { ring } from '../../src/shapes/ring.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const spec = { kind: 'ring', radius: 100, width: 6, scaleHeight: 4, eccentricity: 0, periapsis: 0 } as const

describe('ring', () => {
  it('has the mass and the vertical column of its Gaussians', () => {
    for (const eccentricity of [0, 0.2, 0.6]) {
      const shape = ring({ ...spec, eccentricity })
      // sqrt(2 pi) h times the area integral of exp(-(a - a0)^2 / 2 w^2), with area pi sqrt(1 - e^2) a^2 of an ellipse.
      const mass = (2 * Math.PI) ** 2 * 4 * 6 * 100 * Math.sqrt(1 - eccentricity ** 2)
      expect(shape.totalMass / mass).toBeCloseTo(1, 7)
      expect(shape.column / (Math.sqrt(2 * Math.PI) * 4)).toBeCloseTo(1, 7)
    }
  })

  it('is densest along an ellipse about a focus', () => {
    const { relativeDensity, innerRadius, outerRadius } = ring({ ...spec, eccentricity: 0.3, periapsis: 1 })
    const at = (r: number, angle: number) => relativeDensity(r * Math.cos(angle), r * Math.sin(angle), 0)
    expect(at(70, 1)).toBeCloseTo(1, 12)
    expect(at(130, 1 + Math.PI)).toBeCloseTo(1, 12)
    // Semi-latus rectum a (1 - e^2) at right angles to the periapsis.
    expect(at(91, 1 + Math.PI / 2)).toBeCloseTo(1, 12)
    expect(at(73, 1)).toBeLessThan(1)
    expect(relativeDensity(91 * Math.cos(1 + Math.PI / 2), 91 * Math.sin(1 + Math.PI / 2), 4)).toBeCloseTo(Math.exp(-0.5), 12)
    expect([innerRadius, outerRadius]).toEqual([0.7 * 64, Math.hypot(1.3 * 136, 24)])
  })

  itWith(scipy, 'agrees with integrals over radius and azimuth by SciPy (scipy.integrate.dblquad)', () => {
    const cases = [
      { radius: 100, width: 6, scaleHeight: 4, eccentricity: 0.4, periapsis: 2 },
      { radius: 100, width: 45, scaleHeight: 9, eccentricity: 0.1, periapsis: 0 },
      { radius: 5, width: 30, scaleHeight: 9, eccentricity: 0, periapsis: 0 }
    ]
    const script = `
import numpy as np
from scipy.integrate import dblquad
def mass(c):
    e = c['eccentricity']
    a = lambda R, f: R*(1 + e*np.cos(f))/(1 - e*e)
    g = lambda R, f: R*np.exp(-(a(R, f) - c['radius'])**2/2/c['width']**2)
    edge = lambda sign: lambda f: max(0, c['radius'] + sign*7*c['width'])*(1 - e*e)/(1 + e*np.cos(f))
    return np.sqrt(2*np.pi)*c['scaleHeight']*dblquad(g, 0, 2*np.pi, edge(-1), edge(1), epsabs=0, epsrel=1e-9)[0]
answer = [mass(c) for c in data]
`
    askPython<number[]>(script, cases).forEach((mass, i) => {
      expect(ring({ kind: 'ring', ...cases[i] }).totalMass / mass).toBeCloseTo(1, 7)
    })
  })
})
