import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cellCount, cellVolumes, type SphericalWalls } from '../../src/grid/geometry.js'
import { placeWalls } from '../../src/grid/place-walls.js'
import { cellMean } from '../../src/model/cell-mean.js'
import { cellDensities } from '../../src/model/density.js'
import type { ShapeSpec } from '../../src/scene/types.js'
import { amountScale } from '../../src/shapes/amount-scale.js'
import { disk } from '../../src/shapes/disk.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import type { Shape } from '../../src/shapes/shape.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const EXTINCTION = 1e4
type DiskSpec = Extract<ShapeSpec, { kind: 'disk' }>

function wallsFor(
  shape: Shape,
  tau: number,
  numbers: { radial?: number; polar?: number } = {}
): { walls: SphericalWalls; scale: number } {
  const scale = amountScale(shape, { kind: 'optical-depth', opticalDepth: tau, at: 1e-4 }, () => EXTINCTION)
  const dimensions = shape.symmetry === 'spherical' ? 1 : 2
  const walls = placeWalls({
    layers: [{ shape, scale, extinction: EXTINCTION }],
    dimensions,
    radial: 0,
    polar: 0,
    azimuthal: 0,
    ...numbers
  })
  return { walls, scale }
}

function massIn(walls: SphericalWalls, density: Float64Array): number {
  const volume = cellVolumes(walls, new Float64Array(cellCount(walls)))
  return density.reduce((sum, value, i) => sum + value * volume[i], 0)
}

const diskSpec = (aspect: number, flaring: number, more: Partial<DiskSpec> = {}): DiskSpec => ({
  kind: 'disk',
  inner: 1,
  outer: 300,
  surfaceSlope: -1,
  scaleHeight: { value: 100 * aspect, at: 100, flaring },
  ...more
})

describe('cellDensities', () => {
  it.each([
    [0.01, 1],
    [0.01, 1.3],
    [0.1, 1],
    [0.1, 1.25],
    [0.3, 1],
    [0.3, 1.3]
  ])('holds the mass of a disk of h/R = %f, flaring %f before any correction', (aspect, flaring) => {
    for (const more of [{}, { taper: 60 }, { surfaceSlope: -2 }, { surfaceSlope: 0.5, inner: 200 }]) {
      const shape = disk(diskSpec(aspect, flaring, more))
      const { walls, scale } = wallsFor(shape, 1e4)
      const { density, massRatio } = cellDensities(walls, shape, scale)
      // 2e-9 of the mass lies beyond six scale heights; the quadrature is asked for 1e-4 a cell and does far better.
      expect(Math.abs(massRatio - 1)).toBeLessThan(1e-7)
      expect(massIn(walls, density) / (scale * shape.totalMass)).toBeCloseTo(1, 12)
      expect(density[0]).toBe(0)
    }
  })

  it.each([1e2, 1e4, 1e6])('begins the midplane of a disk of optical depth %f with a cell of less than 0.1', (tau) => {
    for (const aspect of [0.01, 0.03, 0.1, 0.3]) {
      for (const flaring of [1, 1.15, 1.3]) {
        const shape = disk(diskSpec(aspect, flaring))
        const { walls, scale } = wallsFor(shape, tau)
        const { density } = cellDensities(walls, shape, scale)
        const nt = walls.cosTheta.length - 1
        const depths = Array.from(
          { length: walls.r.length - 2 },
          (_, i) => density[1 + i * nt + nt / 2 - 1] * EXTINCTION * (walls.r[i + 2] - walls.r[i + 1])
        )
        expect(depths[0]).toBeGreaterThan(0)
        expect(depths[0]).toBeLessThan(0.1)
        let inside = 0
        for (const depth of depths) {
          if (inside < 1) expect(depth).toBeLessThan(1)
          inside += depth
        }
        // The row next to the midplane is a little thinner than the midplane itself.
        expect(inside / tau).toBeGreaterThan(0.95)
        expect(inside / tau).toBeLessThan(1)
      }
    }
  })

  it('also holds the mass on few cells, in three dimensions and with a cell across the midplane', () => {
    const shape = disk(diskSpec(0.05, 1.1))
    const { scale, walls } = wallsFor(shape, 1e3, { radial: 12, polar: 5 })
    expect(Math.abs(cellDensities(walls, shape, scale).massRatio - 1)).toBeLessThan(1e-4)
    const sectors = { ...walls, phi: Float64Array.of(0, 1, 4, 2 * Math.PI) }
    const { density, massRatio } = cellDensities(sectors, shape, scale)
    expect(Math.abs(massRatio - 1)).toBeLessThan(1e-4)
    expect(density[1 + 3 * (3 * 5 + 2)]).toBe(density[1 + 3 * (3 * 5 + 2) + 2])
  })

  it('leaves the densities alone and says so when the cells miss much of the mass', () => {
    const shape = makeShape({ kind: 'shell', inner: 1, outer: 10, slope: 0 })
    const walls = { r: Float64Array.of(0, 1, 5), cosTheta: Float64Array.of(1, -1), phi: Float64Array.of(0, 2 * Math.PI) }
    const { density, massRatio } = cellDensities(walls, shape, 3e-20)
    expect(massRatio).toBeCloseTo(124 / 999, 12)
    expect(density[1] / 3e-20).toBeCloseTo(1, 12)
  })

  it('fills the core of a ball', () => {
    const shape = makeShape({ kind: 'ball', radius: 7e13, at: [0, 0, 0] })
    const { walls, scale } = wallsFor(shape, 10)
    const { density } = cellDensities(walls, shape, scale)
    for (const value of density) expect(value / scale).toBeCloseTo(1, 6)
  })

  it('gives shells their exact mass over wide decades', () => {
    const e = (min: number, max: number) => fc.double({ min, max, noNaN: true }).map((x) => 10 ** x)
    fc.assert(
      fc.property(e(8, 17), e(-5, 5), e(-3, 7), fc.double({ min: -4, max: 1, noNaN: true }), (inner, extent, tau, slope) => {
        const shape = makeShape({ kind: 'shell', inner, outer: inner * (1 + extent), slope })
        const { walls, scale } = wallsFor(shape, tau)
        const { density, massRatio } = cellDensities(walls, shape, scale)
        expect(Math.abs(massRatio - 1)).toBeLessThan(1e-7)
        // Between the densities at its walls, to what the rounding of radii (1e-16) allows in a layer of 1e-13.
        const { r } = walls
        for (let i = 1; i < r.length - 1; i++) {
          const ends = [r[i], r[i + 1]].map((x) => scale * (x / shape.outerRadius) ** slope)
          expect(density[i]).toBeGreaterThan(Math.min(...ends) * 0.998)
          expect(density[i]).toBeLessThan(Math.max(...ends) * 1.002)
        }
      }),
      { seed: 14, numRuns: 60 }
    )
  })
})

describe('cellMean', () => {
  itWith(scipy, 'agrees with SciPy (scipy.integrate.dblquad over r and theta) in cells of every kind', () => {
    const spec = diskSpec(0.1, 1.2, { inner: 10 })
    // a, b (radii), low, high (cos theta): midplane, surface, far above, and cells cut by the inner and the outer rim.
    const cells = [
      [50, 53, 0, 0.02],
      [50, 53, 0.3, 0.33],
      [50, 80, 0.1, 0.5],
      [10, 10.001, 0, 0.01],
      [10.05, 10.2, 0.1, 0.15],
      [10.5, 11.5, 0.2, 0.5],
      [300, 303, 0.05, 0.1],
      [299, 340, 0.02, 0.4]
    ]
    const script = `
import math
from scipy.integrate import dblquad
inner, outer = data['inner'], data['outer']
def rho(r, th):
    R, z = r*math.sin(th), r*math.cos(th)
    h = 10*(R/100)**1.2
    return (R/100)**-1/math.sqrt(2*math.pi)/h*math.exp(-z*z/2/h/h)
answer = []
for a, b, lo, hi in data['cells']:
    # theta outside, r inside, between the rims; theta is cut where a rim enters or leaves the cell
    cuts = sorted({lo, hi, *[c for c in [math.sqrt(max(0, 1-(R/x)**2)) for R in (inner, outer) for x in (a, b)] if lo < c < hi]})
    total = 0
    for p, q in zip(cuts, cuts[1:]):
        total += dblquad(lambda r, th: rho(r, th)*r*r*math.sin(th), math.acos(q), math.acos(p),
            lambda th: min(max(a, inner/math.sin(th)), max(a, min(b, outer/math.sin(th)))), lambda th: max(a, min(b, outer/math.sin(th))), epsabs=0, epsrel=1e-9)[0]
    answer.append(total/((b**3-a**3)/3*(hi-lo)))
`
    const expected = askPython<number[]>(script, { cells, inner: spec.inner, outer: spec.outer })
    expect(expected).toHaveLength(cells.length)
    const shape = disk(spec)
    cells.forEach(([a, b, low, high], i) => {
      expect(expected[i]).toBeGreaterThan(0)
      expect(Math.abs(cellMean(shape, a, b, low, high) / expected[i] - 1), `cell ${i}`).toBeLessThan(1e-4)
      expect(cellMean(shape, a, b, -high, -low)).toBe(cellMean(shape, a, b, low, high))
    })
  })
})
