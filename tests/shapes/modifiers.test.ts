import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import type { CarveSpec, DustSpec, ShapeSpec } from '../../src/scene/types.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import type { Shape } from '../../src/shapes/shape.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

const DEGREE = Math.PI / 180
const wind: ShapeSpec = { kind: 'shell', inner: 1, outer: 100, slope: -2 }
const flat: ShapeSpec = {
  kind: 'disk',
  inner: 1,
  outer: 300,
  surfaceSlope: -1,
  scaleHeight: { value: 10, at: 100, flaring: 1.25 }
}
const collapse: ShapeSpec = { kind: 'infall', inner: 1, outer: 1000, centrifugalRadius: 50 }
const gap = (from: number, to: number, remaining: number): CarveSpec => ({ kind: 'gap', from, to, remaining })
const cavity = (degrees: number, remaining: number): CarveSpec => ({ kind: 'cavity', halfAngle: degrees * DEGREE, remaining })
const share = (spec: ShapeSpec, carve: CarveSpec[]) => makeShape(spec, { carve }).totalMass / makeShape(spec).totalMass

describe('carve', () => {
  it('leaves the analytic share of a shell', () => {
    // An r^-2 shell has the same mass in each unit of radius, and the same in each unit of cos(theta).
    expect(share(wind, [gap(20, 30, 0.01)])).toBeCloseTo(1 - (0.99 * 10) / 99, 12)
    expect(share(wind, [cavity(25, 0)])).toBeCloseTo(Math.cos(25 * DEGREE), 12)
    expect(share(wind, [cavity(25, 0.2), cavity(40, 0.5)])).toBeCloseTo(
      Math.cos(40 * DEGREE) + 0.5 * (Math.cos(25 * DEGREE) - Math.cos(40 * DEGREE)) + 0.1 * (1 - Math.cos(25 * DEGREE)),
      12
    )
    expect(share(wind, [gap(0, 20, 0), cavity(60, 0)])).toBeCloseTo((0.5 * 80) / 99, 12)
  })

  it('leaves the analytic column of a shell and of a disk', () => {
    const column = (spec: ShapeSpec, carve: CarveSpec[]) => makeShape(spec, { carve }).column / makeShape(spec).column
    const inverse = (a: number, b: number) => 1 / a - 1 / b
    expect(column(wind, [gap(20, 30, 0.01), cavity(25, 0)])).toBeCloseTo(1 - (0.99 * inverse(20, 30)) / inverse(1, 100), 9)
    // Midplane density ~ R^-2.25.
    const power = (a: number, b: number) => a ** -1.25 - b ** -1.25
    expect(column(flat, [gap(20, 30, 0)])).toBeCloseTo(1 - power(20, 30) / power(1, 300), 9)
  })

  it('takes a gap of a disk between two cylinders, of a shell between two spheres', () => {
    // Sigma ~ 1/R: the same mass in each unit of R.
    expect(Math.abs(share(flat, [gap(20, 30, 0.01)]) / (1 - (0.99 * 10) / 299) - 1)).toBeLessThan(1e-4)
    const carved = makeShape(flat, { carve: [gap(20, 30, 0)] })
    expect(carved.relativeDensity(25, 0, 20)).toBe(0)
    expect(carved.relativeDensity(19, 0, 10)).toBeGreaterThan(0)
    expect(makeShape(wind, { carve: [gap(20, 30, 0)] }).relativeDensity(25, 0, 20)).toBeGreaterThan(0)
    expect(makeShape(wind, { carve: [gap(20, 30, 0)] }).relativeDensity(5, 0, 24)).toBe(0)
  })

  it('finds the first dust beyond what was taken at the inner edge', () => {
    expect(makeShape(wind, { carve: [gap(7, 9, 0), gap(0.5, 7, 0)] }).innerRadius).toBe(9)
    expect(makeShape(wind, { carve: [gap(0.5, 7, 0.1)] }).innerRadius).toBe(1)
  })

  itWith(scipy, 'leaves what SciPy finds of a disk and of infall with a cavity', () => {
    const script = `
import numpy as np
from scipy.integrate import quad
from scipy.special import erf
h = lambda R: 10*(R/100)**1.25
disk = quad(lambda R: erf(R/np.tan(np.radians(75))/np.sqrt(2)/h(R)), 1, 300, epsrel=1e-9, limit=300)[0]/299
def layer(q, end):
    # over mu0, where d mu/d mu0 cancels the last factor of the density
    low = np.sqrt(max(0, 1 - q))
    top = max(np.roots([1, 0, q - 1, -end*q]).real) if end < 1 else 1.0
    return quad(lambda m: q**-1.5*(2 - (1 - m*m)/q)**-0.5, low, top, epsrel=1e-10)[0]
def mass(end):
    return sum(quad(lambda u: np.exp(3*u)*layer(np.exp(u), end), np.log(a), np.log(b), epsrel=1e-8, limit=200)[0] for a, b in [(0.02, 1), (1, 20)])
answer = [disk, mass(np.cos(np.radians(25)))/mass(1)]
`
    const [disk, envelope] = askPython<[number, number]>(script, null)
    expect(Math.abs(share(flat, [cavity(75, 0)]) / disk - 1)).toBeLessThan(1e-4)
    expect(Math.abs(share(collapse, [cavity(25, 0)]) / envelope - 1)).toBeLessThan(1e-4)
  })
})

/** Integral of the density over a cube about the origin, from the middles of equal small cubes. */
function massInCube({ relativeDensity }: Shape, half: number, side: number): number {
  const middle = (i: number) => half * (-1 + (2 * (i + 0.5)) / side)
  let sum = 0
  for (let i = 0; i < side; i++)
    for (let j = 0; j < side; j++) for (let k = 0; k < side; k++) sum += relativeDensity(middle(i), middle(j), middle(k))
  return sum * ((2 * half) / side) ** 3
}

describe('clumps', () => {
  const clumped = (spec: ShapeSpec, more: Pick<DustSpec, 'carve'> = {}, seed = 'a') =>
    makeShape(spec, { ...more, clumps: { count: 60, radius: 12, contrast: 10, seed } })
  const ball: ShapeSpec = { kind: 'ball', radius: 100, at: [0, 0, 0] }

  it.each([
    ['a ball', ball, {}, 100],
    ['a carved ball', ball, { carve: [cavity(30, 0)] }, 100],
    ['a slab', { kind: 'slab', thickness: 60, width: 180, at: [0, 0, 0] }, {}, 90]
  ] as [string, ShapeSpec, Pick<DustSpec, 'carve'>, number][])('keep the mass of %s', (_, spec, more, half) => {
    const shape = clumped(spec, more)
    expect(shape.totalMass).toBe(makeShape(spec, more).totalMass)
    expect(Math.abs(massInCube(shape, half, 150) / shape.totalMass - 1)).toBeLessThan(1e-3)
  })

  it('have the contrast asked for, and other places for another seed', () => {
    const [a, again, b] = [clumped(ball), clumped(ball), clumped(ball, {}, 'b')]
    const values = new Set<number>()
    let differ = 0
    const { x, y, z } = a.details
    for (let i = 0; i < x.length; i++) {
      for (const shift of [0, 20]) {
        const density = a.relativeDensity(x[i] + shift, y[i], z[i])
        if (density === 0) continue
        values.add(density)
        expect(again.relativeDensity(x[i] + shift, y[i], z[i])).toBe(density)
        if (b.relativeDensity(x[i] + shift, y[i], z[i]) !== density) differ++
      }
    }
    const [low, high] = [...values].sort((p, q) => p - q)
    expect(values.size).toBe(2)
    expect(high / low).toBeCloseTo(10, 12)
    expect(differ).toBeGreaterThan(0)
  })

  it('lie where the mass is, not where it was taken away', () => {
    const { details } = clumped(ball, { carve: [cavity(60, 0)] })
    for (let i = 0; i < details.x.length; i++) {
      expect(Math.abs(details.z[i])).toBeLessThanOrEqual(
        Math.cos(60 * DEGREE) * Math.hypot(details.x[i], details.y[i], details.z[i])
      )
    }
  })
})

describe('tilt and at', () => {
  it('tip the axis towards an azimuth, then move the shape', () => {
    const slab: ShapeSpec = { kind: 'slab', thickness: 2, width: 40, at: [0, 0, 0] }
    const tilt = { angle: 30 * DEGREE, toward: 40 * DEGREE }
    const { relativeDensity } = makeShape({ ...slab, at: [7, -3, 5], tilt })
    const axis = [Math.sin(0.5236) * Math.cos(40 * DEGREE), Math.sin(0.5236) * Math.sin(40 * DEGREE), Math.cos(0.5236)]
    const along = (s: number) => relativeDensity(7 + s * axis[0], -3 + s * axis[1], 5 + s * axis[2])
    expect([along(-1.01), along(-0.99), along(0.99), along(1.01)]).toEqual([0, 1, 1, 0])
    // The line about which it turned, in the plane z = 0 at right angles to the azimuth, stays in its middle.
    expect(relativeDensity(7 - 19 * Math.sin(40 * DEGREE), -3 + 19 * Math.cos(40 * DEGREE), 5.9)).toBe(1)
  })

  it('keep symmetric shapes as they are where they change nothing', () => {
    expect(makeShape({ ...wind, tilt: { angle: 1, toward: 0 } }).symmetry).toBe('spherical')
    expect(makeShape({ ...flat, tilt: { angle: 0, toward: 1 } }).symmetry).toBe('axial')
    expect(makeShape({ ...flat, tilt: { angle: 0.1, toward: 1 } }).symmetry).toBe('none')
    expect(makeShape({ kind: 'ball', radius: 3, at: [0, 0, 10] })).toMatchObject({
      symmetry: 'none',
      innerRadius: 7,
      outerRadius: 13
    })
  })

  it('place points as the mass lies, in every shape', () => {
    const shapes: [ShapeSpec, Pick<DustSpec, 'carve'>][] = [
      [wind, {}],
      [flat, {}],
      [collapse, {}],
      [{ kind: 'ring', radius: 80, width: 9, scaleHeight: 7, eccentricity: 0.3, periapsis: 1 }, {}],
      [{ kind: 'slab', thickness: 40, width: 90, at: [10, 0, 0], tilt: { angle: 0.5, toward: 2 } }, {}]
    ]
    const p = new Float64Array(3)
    for (const [spec, more] of shapes) {
      const shape = makeShape(spec, more)
      const uniform = stream(`place/${spec.kind}`)
      // Mass in a box that holds a good part of it: by points placed, and by the density at random points.
      const box = [5, 80, -20, 60, -15, 25]
      const inside = ([x, y, z]: Float64Array) => x > box[0] && x < box[1] && y > box[2] && y < box[3] && z > box[4] && z < box[5]
      const count = 300_000
      let placed = 0
      let [sum, square] = [0, 0]
      for (let n = 0; n < count; n++) {
        shape.place(uniform(), uniform(), uniform(), p)
        if (inside(p)) placed++
        const [x, y, z] = [0, 2, 4].map((k) => box[k] + uniform() * (box[k + 1] - box[k]))
        const density = shape.relativeDensity(x, y, z)
        sum += density
        square += density * density
      }
      const volume = (box[1] - box[0]) * (box[3] - box[2]) * (box[5] - box[4])
      const expected = (volume * sum) / count / shape.totalMass
      const found = placed / count
      const sigma = Math.hypot(
        (volume * Math.sqrt(square / count - (sum / count) ** 2)) / Math.sqrt(count) / shape.totalMass,
        Math.sqrt((found * (1 - found)) / count)
      )
      expect(found).toBeGreaterThan(0.003)
      // Fixed seeds; 4 sigma fails by chance once in 16000 for each shape.
      expect(Math.abs(found - expected)).toBeLessThan(4 * sigma)
    }
  })
})
