import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import type { DustLayer } from '../../src/grid/dust-layer.js'
import { placeWalls, type WallRequest } from '../../src/grid/place-walls.js'
import type { ShapeSpec } from '../../src/scene/types.js'
import { amountScale } from '../../src/shapes/amount-scale.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import { AU } from '../../src/units/constants.js'

const EXTINCTION = 2e4

function layer(spec: ShapeSpec, opticalDepth: number): DustLayer {
  const shape = makeShape(spec)
  return {
    shape,
    extinction: EXTINCTION,
    scale: amountScale(shape, { kind: 'optical-depth', opticalDepth, at: 1e-4 }, () => EXTINCTION)
  }
}

const place = (layers: DustLayer[], dimensions: 1 | 2 | 3, request: Partial<WallRequest> = {}) =>
  placeWalls({ layers, dimensions, radial: 0, polar: 0, azimuthal: 0, ...request })

const wind = (inner: number, outer: number): ShapeSpec => ({ kind: 'shell', inner, outer, slope: -2 })
const flared: ShapeSpec = {
  kind: 'disk',
  inner: AU,
  outer: 300 * AU,
  surfaceSlope: -1,
  scaleHeight: { value: 10 * AU, at: 100 * AU, flaring: 1.2 }
}

function expectIncreasing(r: Float64Array): void {
  expect(r[0]).toBe(0)
  for (let i = 1; i < r.length; i++) expect(r[i]).toBeGreaterThan(r[i - 1])
}

describe('placeWalls', () => {
  it('makes the cavity the core and ends where the dust ends', () => {
    const { r, cosTheta, phi } = place([layer(wind(6 * AU, 3000 * AU), 5)], 1)
    expect(r[1]).toBe(6 * AU)
    expect(r[r.length - 1]).toBe(3000 * AU)
    expect([...cosTheta]).toEqual([1, -1])
    expect([...phi]).toEqual([0, 2 * Math.PI])
    expect(r.length - 1).toBeGreaterThanOrEqual(120)
    expect(r.length - 1).toBeLessThanOrEqual(201)
  })

  it.each([0.1, 1, 100, 1e4, 1e6])('begins a shell of optical depth %f with a transparent cell', (tau) => {
    const { r } = place([layer(wind(1, 1000), tau)], 1)
    expectIncreasing(r)
    // Optical depth of an r^-2 shell from the inside: tau (1 - r1/r)/(1 - r1/r2).
    const depth = (radius: number) => (tau * (radius - 1)) / radius / 0.999
    expect(depth(r[2])).toBeLessThan(0.1)
    // and no step of more than 0.3 while the inside is still seen (optical depth below 1)
    for (let i = 2; i < r.length && depth(r[i - 1]) < 1; i++) expect(depth(r[i]) - depth(r[i - 1])).toBeLessThan(0.3)
    for (let i = 2; i < r.length; i++) expect(Math.log(r[i] / r[i - 1])).toBeLessThan(0.35)
  })

  it.each([1, 1e3, 1e6])('refines the surface of a ball of optical depth %f, and keeps its core transparent', (tau) => {
    const { r } = place([layer({ kind: 'ball', radius: AU, at: [0, 0, 0] }, tau)], 1)
    expectIncreasing(r)
    const last = r.length - 1
    expect(r[last]).toBe(AU)
    expect((tau * (AU - r[last - 1])) / AU).toBeLessThan(0.2)
    expect((tau * r[1]) / AU).toBeLessThan(1.01)
  })

  it('puts a wall on every edge of every component, and one cell in a gap', () => {
    const layers = [
      layer(wind(2 * AU, 10 * AU), 1),
      layer(wind(40 * AU, 50 * AU), 20),
      layer({ kind: 'ball', radius: 5 * AU, at: [0, 0, 0] }, 0.5)
    ]
    const { r } = place(layers, 1)
    expectIncreasing(r)
    const walls = [...r]
    for (const edge of [2, 5, 10, 40, 50]) expect(walls).toContain(edge * AU)
    expect(walls.indexOf(40 * AU) - walls.indexOf(10 * AU)).toBe(1)
    expect(r[1]).toBeLessThanOrEqual(0.01 * 2 * AU)
  })

  it('uses the numbers of cells given', () => {
    const { r, cosTheta, phi } = place([layer(flared, 1e3)], 3, { radial: 57, polar: 31, azimuthal: 9 })
    expect(r.length - 1).toBe(57)
    expect(cosTheta.length - 1).toBe(31)
    expect(phi.length - 1).toBe(9)
    expect(phi[9]).toBe(2 * Math.PI)
    for (let k = 0; k < 9; k++) expect(phi[k + 1] - phi[k]).toBeCloseTo((2 * Math.PI) / 9, 13)
  })

  it('raises a number of cells that cannot hold the edges', () => {
    expect(place([layer(wind(1, 2), 1), layer(wind(3, 4), 1)], 1, { radial: 2 }).r).toEqual(Float64Array.of(0, 1, 2, 3, 4))
  })

  it('puts walls on the rims of a disk and reaches up to six scale heights beyond the outer one', () => {
    const { r, cosTheta } = place([layer(flared, 1e4)], 2)
    expectIncreasing(r)
    expect(r[1]).toBe(AU)
    expect([...r]).toContain(300 * AU)
    expect(r[r.length - 1] / AU).toBeCloseTo(Math.hypot(300, 60 * 3 ** 1.2), 9)
    expect(r.length - 1).toBeGreaterThanOrEqual(90)
    expect(r.length - 1).toBeLessThanOrEqual(131)
    expect(cosTheta.length - 1).toBeLessThanOrEqual(120)
  })

  it('takes no longer for very many polar cells, and finds nearly the same radii', () => {
    const [few, many] = [100, 8000].map((polar) =>
      placeWalls({ layers: [layer(flared, 1e4)], dimensions: 2, radial: 60, polar, azimuthal: 0 })
    )
    expect(many.cosTheta.length).toBe(8001)
    expect(many.r.length).toBe(few.r.length)
    for (let i = 1; i < few.r.length; i++) expect(Math.abs(Math.log(many.r[i] / few.r[i]))).toBeLessThan(0.3)
  })

  it('merges a disk with an envelope', () => {
    const { r } = place([layer(flared, 1e4), layer(wind(0.3 * AU, 5000 * AU), 0.2)], 2)
    expectIncreasing(r)
    expect(r[1]).toBe(0.3 * AU)
    for (const edge of [1, 300, 5000]) expect([...r]).toContain(edge * AU)
    // Both rims stay resolved: the next wall is closer than 1e-4 of the radius at the opaque one.
    const rim = r.indexOf(AU)
    expect(r[rim + 1] / r[rim] - 1).toBeLessThan(1e-4)
  })

  it('keeps walls apart and the counts within bounds over wide decades', () => {
    const e = (min: number, max: number) => fc.double({ min, max, noNaN: true }).map((x) => 10 ** x)
    fc.assert(
      fc.property(e(8, 17), e(-9, 5), e(-3, 9), fc.double({ min: -4, max: 1, noNaN: true }), (inner, extent, tau, slope) => {
        const { r } = place([layer({ kind: 'shell', inner, outer: inner * (1 + extent), slope }, tau)], 1)
        expect(r.length).toBeLessThanOrEqual(202)
        for (let i = 1; i < r.length; i++) expect(r[i] / r[i - 1] - 1).toBeGreaterThan(1e-13)
      }),
      { seed: 13, numRuns: 100 }
    )
  })
})
