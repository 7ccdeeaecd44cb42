import { describe, expect, it } from 'vitest'
import { cellCount, type SphericalWalls } from '../../src/grid/geometry.js'
import { cellCube, type Octree } from '../../src/grid/octree/octree.js'
import { OctreeBuilder } from '../../src/grid/octree/octree-builder.js'
import { stream } from '../../src/math/random.js'
import { buriedCells } from '../../src/solve/buried-cells.js'
import { fitByDiffusion, fitDeviations } from '../../src/solve/diffusion-fit.js'

const even = (count: number, from: number, to: number) =>
  Float64Array.from({ length: count + 1 }, (_, i) => from + ((to - from) * i) / count)
const wallsOf = (r: Float64Array, nt: number, np: number): SphericalWalls => ({
  r: Float64Array.of(0, ...r),
  cosTheta: even(nt, 0, Math.PI).map((theta, k) => (k === 0 ? 1 : k === nt ? -1 : Math.cos(theta))),
  phi: even(np, 0, 2 * Math.PI)
})

/**
 * Largest relative error of T^4 when all cells but those at the inner and outer edge are solved for, from a wrong first guess. A
 * deviation that is T^4 at those edges has to be T^4 everywhere.
 */
function worst(walls: SphericalWalls, fourth: (r: number, theta: number, phi: number) => number, chi: (r: number) => number) {
  const { r, cosTheta, phi } = walls
  const nr = r.length - 1
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  const cells = cellCount(walls)
  const exact = new Float64Array(cells)
  const middle = new Float64Array(cells)
  const unknown: number[] = []
  for (let cell = 1; cell < cells; cell++) {
    const ip = (cell - 1) % np
    const it = Math.floor((cell - 1) / np) % nt
    const ir = 1 + Math.floor((cell - 1) / (np * nt))
    const theta = 0.5 * (Math.acos(cosTheta[it]) + Math.acos(cosTheta[it + 1]))
    middle[cell] = 0.5 * (r[ir] + r[ir + 1])
    exact[cell] = fourth(middle[cell], theta, 0.5 * (phi[ip] + phi[ip + 1]))
    if (ir > 1 && ir < nr - 1) unknown.push(cell)
  }
  const temperature = exact.map((value) => value ** 0.25)
  for (const cell of unknown) temperature[cell] = 1
  const nothing = new Float64Array(cells).fill(Number.POSITIVE_INFINITY)
  const fit = fitByDiffusion({ walls, cells }, temperature, unknown, { error: nothing, depth: nothing }, (cell) =>
    cell === 0 ? 0 : chi(middle[cell])
  )
  const deviations = exact.slice()
  for (const cell of unknown) deviations[cell] = 0
  const within = fitDeviations(fit, deviations)
  // Diffusion is linear in T^4, and solved for deviations to a residual of 1e-6.
  unknown.forEach((cell, k) => {
    expect(within[k] / temperature[cell] ** 4).toBeCloseTo(1, 3)
  })
  return unknown.reduce((most, cell) => Math.max(most, Math.abs(temperature[cell] ** 4 / exact[cell] - 1)), 0)
}

/** Harmonic functions: Jackson 1999, Classical Electrodynamics, sections 3.1 and 3.3. */
describe('diffusion where nothing is measured', () => {
  const radii = even(30, 2, 5)

  it('is exact for shells of one opacity: T^4 = a + b / r', () => {
    expect(
      worst(
        wallsOf(radii, 1, 1),
        (r) => 1 + 50 / r,
        () => 30
      )
    ).toBeLessThan(1e-7)
  })

  it('follows shells whose opacity falls with the radius: chi ~ r^-2 gives T^4 = a + b r^-3', () => {
    expect(
      worst(
        wallsOf(radii, 1, 1),
        (r) => 1 + 500 / r ** 3,
        (r) => 30 / r ** 2
      )
    ).toBeLessThan(3e-3)
  })

  it('finds a dipole in two dimensions, better in finer cells', () => {
    const dipole = (r: number, theta: number) => 20 + (r + 8 / r ** 2) * Math.cos(theta)
    const coarse = worst(wallsOf(even(15, 2, 5), 10, 1), dipole, () => 30)
    const fine = worst(wallsOf(radii, 20, 1), dipole, () => 30)
    expect(fine).toBeLessThan(1e-3)
    expect(fine).toBeLessThan(0.4 * coarse)
  })

  it('finds a field along x in three dimensions', () => {
    const field = (r: number, theta: number, phi: number) => 20 + r * Math.sin(theta) * Math.cos(phi)
    expect(worst(wallsOf(even(15, 2, 5), 16, 16), field, () => 30)).toBeLessThan(3e-3)
  })
})

/** 8^levels cubes of side 1, those of the first octant divided once more. */
function cubes(levels: number): Octree {
  const builder = new OctreeBuilder([0, 0, 0], 2 ** levels)
  const divide = (node: number, level: number, lower: boolean) => {
    if (level === levels && !lower) return
    if (level > levels) return
    const first = builder.split(node)
    for (let k = 0; k < 8; k++) divide(first + k, level + 1, level === 0 ? k === 0 : lower)
  }
  divide(0, 0, false)
  return builder.finish()
}

describe('diffusion in cubes', () => {
  const walls = cubes(3)
  const { cells } = walls
  const middles = Array.from({ length: cells }, (_, cell) => Float64Array.from(cellCube(walls, cell, new Float64Array(4))))
  const { buried } = buriedCells({ walls, cells }, new Float64Array(cells).fill(10))

  it('buries those that do not touch the outside', () => {
    const inside = middles.flatMap((middle, cell) =>
      middle.subarray(0, 3).every((x) => x - middle[3] / 2 > 0 && x + middle[3] / 2 < 8) ? [cell] : []
    )
    expect(cells).toBe(7 * 64 + 8 * 64)
    expect(buried).toEqual(inside)
  })

  it('finds T^4 that rises along x, near cubes of another size to 2 %', () => {
    const exact = Float64Array.from(middles, ([x]) => 4 + x)
    const temperature = exact.map((value) => value ** 0.25)
    for (const cell of buried) temperature[cell] = 1
    const nothing = new Float64Array(cells).fill(Number.POSITIVE_INFINITY)
    fitByDiffusion({ walls, cells }, temperature, buried, { error: nothing, depth: nothing }, () => 10)
    const errors = buried.map((cell) => Math.abs(temperature[cell] ** 4 / exact[cell] - 1))
    expect(Math.max(...errors)).toBeLessThan(0.02)
  })
})

/** Shells of optical depth 6 each, T^4 = 1 + 50 / r measured with noise, known at the innermost and outermost. */
function fitted(noise: number, error = noise, falls = 50) {
  const walls = wallsOf(even(40, 2, 10), 1, 1)
  const cells = cellCount(walls)
  const exact = Float64Array.from({ length: cells }, (_, i) => 1 + falls / (0.5 * (walls.r[i] + walls.r[i + 1])))
  const uniform = stream(`shells/${noise}`)
  const measured = exact.map((value, i) => value * (i < 2 || i === cells - 1 ? 1 : 1 + noise * (uniform() < 0.5 ? -1 : 1)))
  const unknown = Array.from({ length: cells - 3 }, (_, k) => k + 2)
  const known = { error: new Float64Array(cells).fill(error), depth: exact.map((_, i) => 6 * Math.min(i, cells - i)) }
  const temperature = measured.map((value) => value ** 0.25)
  const fit = fitByDiffusion({ walls, cells }, temperature, unknown, known, (cell) => (cell === 0 ? 0 : 30))
  const rms = (values: Float64Array) =>
    Math.sqrt(unknown.reduce((sum, cell) => sum + (values[cell] / exact[cell] - 1) ** 2, 0) / unknown.length)
  return { fit, unknown, measured, fourth: temperature.map((kelvin) => kelvin ** 4), rms }
}

describe('diffusion together with what is measured', () => {
  it('takes most of the noise where it is large, and is as exact as diffusion without gradients', () => {
    const { fourth, rms } = fitted(0.2)
    expect(rms(fourth)).toBeLessThan(0.25 * 0.2)
    const even = fitted(0.2, 0.2, 0)
    expect(even.rms(even.fourth)).toBeLessThan(1e-4)
  })

  it('leaves alone what is measured better than diffusion knows', () => {
    // Measured values that do not diffuse, but are said to be exact to 1e-6.
    const { fourth, measured, unknown } = fitted(0.2, 1e-6)
    for (const cell of unknown) expect(fourth[cell] / measured[cell]).toBeCloseTo(1, 3)
  })

  it('carries deviations through as it does values', () => {
    const { fit, unknown, measured, fourth } = fitted(0.1)
    const all = fitDeviations(fit, measured)
    unknown.forEach((cell, k) => {
      expect(all[k] / fourth[cell]).toBeCloseTo(1, 3)
    })
  })
})
