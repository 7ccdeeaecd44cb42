import { describe, expect, it } from 'vitest'
import { disk } from '../../src/shapes/disk.js'
import { AU } from '../../src/units/constants.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const flared = { value: 10 * AU, at: 100 * AU, flaring: 1.25 }

describe('disk', () => {
  it('has the mass and the midplane column of its power laws', () => {
    const plain = disk({ kind: 'disk', inner: 2 * AU, outer: 300 * AU, surfaceSlope: -1, scaleHeight: flared })
    // Sigma = 100 au/R: 2 pi (100 au) (R2 - R1). Column: integral of Sigma/(sqrt(2 pi) h), here of R^-2.25.
    expect(plain.totalMass / (2 * Math.PI * 100 * AU * 298 * AU)).toBeCloseTo(1, 12)
    const column = ((0.02 ** -1.25 - 3 ** -1.25) / 1.25) * (100 / 10 / Math.sqrt(2 * Math.PI))
    expect(plain.column / column).toBeCloseTo(1, 12)
  })

  it('is a Gaussian of the given scale height, between vertical edges', () => {
    const plain = disk({ kind: 'disk', inner: 2 * AU, outer: 300 * AU, surfaceSlope: -1, scaleHeight: flared })
    const middle = plain.relativeDensity(60 * AU, 80 * AU, 0)
    expect(plain.relativeDensity(100 * AU, 0, 10 * AU) / middle).toBeCloseTo(Math.exp(-0.5), 12)
    expect(plain.relativeDensity(0, -100 * AU, -30 * AU) / middle).toBeCloseTo(Math.exp(-4.5), 12)
    expect(plain.relativeDensity(1.99 * AU, 0, 5 * AU)).toBe(0)
    expect(plain.relativeDensity(300.1 * AU, 0, 0)).toBe(0)
    expect(plain.relativeDensity(2 * AU, 0, 0)).toBeGreaterThan(0)
    expect(plain.outerRadius).toBeCloseTo(Math.hypot(300 * AU, 60 * AU * 3 ** 1.25), -2)
  })

  it('has an exponential edge with the index 2 + surface-slope', () => {
    const spec = { kind: 'disk', inner: AU, outer: 1000 * AU, surfaceSlope: -0.5, scaleHeight: flared } as const
    const ratio = (R: number) => disk({ ...spec, taper: 80 * AU }).relativeDensity(R, 0, 0) / disk(spec).relativeDensity(R, 0, 0)
    expect(ratio(160 * AU) / ratio(40 * AU)).toBeCloseTo(Math.exp(-(2 ** 1.5) + 0.5 ** 1.5), 12)
  })

  itWith(scipy, 'agrees with integrals by SciPy (scipy.integrate.quad) over slopes, flarings and tapers', () => {
    const cases = []
    for (const surfaceSlope of [-2.5, -2, -1.99, -1.5, -1, 0, 0.5]) {
      for (const flaring of [1, 1.25]) {
        for (const taper of [80, undefined]) cases.push({ inner: 0.5, outer: 900, surfaceSlope, flaring, taper: taper ?? null })
      }
    }
    const script = `
import math
from scipy.integrate import quad
answer = []
for c in data:
    s, f, t = c['surfaceSlope'], c['flaring'], c['taper']
    unit = t or 100
    sigma = lambda R: (R/unit)**s * (math.exp(-(R/unit)**(2+s)) if t else 1)
    h = lambda R: 10*(R/100)**f
    along = lambda g: quad(lambda u: g(math.exp(u))*math.exp(u), math.log(c['inner']), math.log(c['outer']), epsabs=0, epsrel=1e-11, limit=500)[0]
    answer.append([along(lambda R: 2*math.pi*R*sigma(R)), along(lambda R: sigma(R)/math.sqrt(2*math.pi)/h(R))])
`
    const expected = askPython<[number, number][]>(script, cases)
    expect(expected).toHaveLength(28)
    cases.forEach(({ taper, flaring, ...spec }, i) => {
      const shape = disk({ kind: 'disk', ...spec, taper: taper ?? undefined, scaleHeight: { value: 10, at: 100, flaring } })
      expect(shape.totalMass / expected[i][0]).toBeCloseTo(1, 9)
      expect(shape.column / expected[i][1]).toBeCloseTo(1, 9)
    })
  })

  it('has no jump in mass where the taper index passes through zero', () => {
    const mass = (surfaceSlope: number) =>
      disk({ kind: 'disk', inner: 1, outer: 900, surfaceSlope, taper: 80, scaleHeight: { value: 10, at: 100, flaring: 1 } })
        .totalMass
    expect(mass(-2 + 1e-9) / mass(-2)).toBeCloseTo(1, 7)
    expect(mass(-2 - 1e-9) / mass(-2)).toBeCloseTo(1, 7)
  })

  it('reports the range of h/R over which the dust matters', () => {
    const [thin, thick] = disk({ kind: 'disk', inner: AU, outer: 100 * AU, surfaceSlope: -1, scaleHeight: flared }).aspectRatios!
    expect(thin).toBeCloseTo(0.1 * 0.01 ** 0.25, 12)
    expect(thick).toBeCloseTo(0.1, 12)
  })
})
