import { describe, expect, it, test } from 'vitest'
import { besselJ1 } from '../../src/math/bessel.js'
import { diskVisibility } from '../../src/observe/star-visibility.js'
import { measureVisibilities } from '../../src/observe/visibilities.js'
import { ARCSECOND } from '../../src/units/angles.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'
import { cameraSource, firstWavelength, MJY, visibilitiesSpec } from './sources.js'

const see = (source: ReturnType<typeof cameraSource>, baselines: [number, number][], change = {}) =>
  measureVisibilities(visibilitiesSpec(baselines, change), source, firstWavelength(source), 'seed')
/** A baseline (cm) that is `u`, `v` in units of 1 / arcsec, at the 10 um of the test sources. */
const per = (u: number, v: number): [number, number] => [(1e-3 * u) / ARCSECOND, (1e-3 * v) / ARCSECOND]
const J = 1e-23

describe('visibilities', () => {
  it('of a uniform disk are 2 J1(x)/x (Thompson, Moran & Swenson, chapter 2; common practice), and so is their mean over directions', () => {
    // Pixels hold their means: 40 x 40 points in each at the rim.
    const [radius, pixel, points] = [1.5, 0.1, 40]
    const source = cameraSource(
      (east, north) => {
        let inside = 0
        for (let j = 0; j < points; j++)
          for (let i = 0; i < points; i++)
            if (Math.hypot(east + ((i + 0.5) / points - 0.5) * pixel, north + ((j + 0.5) / points - 0.5) * pixel) < radius)
              inside++
        return (MJY * inside) / points ** 2
      },
      { pixel }
    )
    const baselines = [0.05, 0.3, 0.4066, 0.7, 1.2].flatMap((q) => [per(q, 0), per(0.6 * q, -0.8 * q)])
    const { expected, flux, curve } = see(source, baselines)
    expect(flux / (Math.PI * (radius * ARCSECOND) ** 2 * MJY)).toBeCloseTo(1, 4)
    baselines.forEach(([east, north], i) => {
      const x = 2 * Math.PI * Math.hypot(east, north) * 1e3 * radius * ARCSECOND
      expect(expected.re[i] / flux).toBeCloseTo((2 * besselJ1(x)) / x, 3)
      expect(expected.im[i] / flux).toBeCloseTo(0, 12)
    })
    curve.baseline.forEach((length, i) => {
      const x = 2 * Math.PI * length * 1e3 * radius * ARCSECOND
      expect(curve.visibility[i] / flux).toBeCloseTo(diskVisibility(x, 0), 3)
    })
  })

  it('of a Gaussian are a Gaussian: exp(-2 pi^2 sigma^2 q^2)', () => {
    const sigma = 0.4
    const source = cameraSource((east, north) => MJY * Math.exp(-(east ** 2 + north ** 2) / 2 / sigma ** 2))
    const { expected, flux } = see(source, [per(0.2, 0.1), per(0.5, -0.6)])
    // The source holds values at centres, not means of pixels: their own square is not in them.
    const sinc = (x: number) => Math.sin(Math.PI * x) / (Math.PI * x)
    ;[
      [0.2, 0.1],
      [0.5, -0.6]
    ].forEach(([u, v], i) => {
      const square = sinc(0.1 * u) * sinc(0.1 * v)
      expect((expected.re[i] / flux) * square).toBeCloseTo(Math.exp(-2 * (Math.PI * sigma) ** 2 * (u * u + v * v)), 8)
    })
  })

  it('of a binary: 1 + r exp(-2 pi i u.x), with the companion in the north-east', () => {
    const ratio = 0.4
    const stars = [
      { flux: new Float64Array([J]) },
      { east: 0.3 * ARCSECOND, north: 0.2 * ARCSECOND, flux: new Float64Array([ratio * J]) }
    ]
    const source = cameraSource(() => 0, { stars })
    const uv = [
      [1, 0],
      [0, 1.3],
      [2.2, -0.7],
      [20, 11]
    ]
    const { expected } = see(
      source,
      uv.map(([u, v]) => per(u, v))
    )
    uv.forEach(([u, v], i) => {
      const angle = -2 * Math.PI * (u * 0.3 + v * 0.2)
      expect(expected.re[i] / J).toBeCloseTo(1 + ratio * Math.cos(angle), 10)
      expect(expected.im[i] / J).toBeCloseTo(ratio * Math.sin(angle), 10)
    })
  })

  it('of light in pixels have the same phases as of a star at the same place', () => {
    const place = [0.45, -0.25]
    const dot = cameraSource((east, north) => (Math.hypot(east - place[0], north - place[1]) < 0.01 ? MJY : 0))
    const star = cameraSource(() => 0, {
      stars: [{ east: place[0] * ARCSECOND, north: place[1] * ARCSECOND, flux: new Float64Array([J]) }]
    })
    const baselines = [per(1.1, 0.4), per(-0.3, 2)]
    const [a, b] = [see(dot, baselines).expected, see(star, baselines).expected]
    baselines.forEach((_, i) => {
      expect(Math.atan2(a.im[i], a.re[i])).toBeCloseTo(Math.atan2(b.im[i], b.re[i]), 9)
    })
  })

  it('closure phases of all triangles, whichever way round, without the phases of the stations', () => {
    const stars = [{ flux: new Float64Array([J]) }, { east: 0.3 * ARCSECOND, flux: new Float64Array([0.5 * J]) }]
    const source = cameraSource(() => 0, { stars })
    const stations = [per(0, 0), per(1, 0.2), per(-0.4, 0.9), per(0.7, -1.1)]
    const between = (a: number, b: number): [number, number] => [stations[b][0] - stations[a][0], stations[b][1] - stations[a][1]]
    const baselines = [between(0, 1), between(2, 1), between(0, 2), between(3, 0), between(1, 3), between(3, 2)]
    const { closures, expected } = see(source, baselines)
    expect(closures).toHaveLength(4)
    const phase = (n: number) => Math.sign(n) * Math.atan2(expected.im[Math.abs(n) - 1], expected.re[Math.abs(n) - 1])
    for (const { baselines: three, expected: closure } of closures) {
      const [east, north] = [0, 1].map((axis) =>
        three.reduce((sum, n) => sum + Math.sign(n) * baselines[Math.abs(n) - 1][axis], 0)
      )
      expect(Math.hypot(east, north)).toBeLessThan(1e-6)
      expect(Math.cos(closure - three.reduce((sum, n) => sum + phase(n), 0))).toBeCloseTo(1, 12)
      expect(Math.abs(closure)).toBeGreaterThan(1e-3)
    }
    // A source at a point has none.
    const point = see(
      cameraSource(() => 0, { stars: [{ east: ARCSECOND, flux: new Float64Array([J]) }] }),
      baselines
    )
    for (const { expected: closure } of point.closures) expect(closure).toBeCloseTo(0, 10)
  })

  itWith(scipy, 'of a limb-darkened disk are the Hankel transform of its intensity, by scipy', () => {
    const cases = [0, 0.4, 1].flatMap((u) => [1e-4, 0.5, 2, 3.9, 9].map((x) => ({ u, x })))
    const theirs = askPython<number[]>(
      `from scipy.integrate import quad
from scipy.special import j0
import numpy as np
def one(u, x):
    profile = lambda r: (1 - u + u * np.sqrt(1 - r * r)) * r
    return quad(lambda r: profile(r) * j0(x * r), 0, 1, epsabs=1e-12)[0] / quad(profile, 0, 1, epsabs=1e-12)[0]
answer = [one(**case) for case in data]`,
      cases
    )
    cases.forEach(({ u, x }, i) => {
      expect(diskVisibility(x, u), `${u} ${x}`).toBeCloseTo(theirs[i], 9)
    })
  })

  test('noise has its level, and the sigma of a run adds its two extremes', () => {
    const baselines = Array.from({ length: 2000 }, (_, i) => per(0.001 * i, 0.3))
    const source = cameraSource(() => MJY, { width: 16, height: 16 })
    const seen = see(source, baselines, { noise: { kind: 'rms', level: { number: 2, unit: 'mJy' } } })
    const squares = [seen.observed.re, seen.observed.im].map((part, p) => {
      const truth = p === 0 ? seen.expected.re : seen.expected.im
      return part.reduce((sum, value, i) => sum + ((value - truth[i]) / 2e-26) ** 2, 0) / part.length
    })
    for (const square of squares) expect(Math.abs(square - 1)).toBeLessThan(5 * Math.sqrt(2 / 2000))
    const pixel = 0.01 * MJY * (0.1 * ARCSECOND) ** 2
    const [zero] = see(source, [per(1e-9, 0)]).sigma
    // All pixels alike: 256 of them add up, and 256 independent ones add in quadrature.
    expect(zero / pixel).toBeCloseTo(Math.hypot(256, 16), 6)
  })
})
