import { describe, expect, it } from 'vitest'
import { cellCount, type SphericalWalls } from '../../src/grid/geometry.js'
import { diffuseDeviations, fillByDiffusion } from '../../src/solve/diffusion-fill.js'

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
  const conduction = fillByDiffusion({ walls, cells }, temperature, unknown, (cell) => (cell === 0 ? 0 : chi(middle[cell])))
  const deviations = exact.slice()
  for (const cell of unknown) deviations[cell] = 0
  const within = diffuseDeviations(conduction, unknown, deviations)
  // Diffusion is linear in T^4, and solved for deviations to a residual of 1e-6.
  unknown.forEach((cell, k) => {
    expect(within[k] / temperature[cell] ** 4).toBeCloseTo(1, 3)
  })
  return unknown.reduce((most, cell) => Math.max(most, Math.abs(temperature[cell] ** 4 / exact[cell] - 1)), 0)
}

/** Harmonic functions: Jackson 1999, Classical Electrodynamics, sections 3.1 and 3.3. */
describe('the diffusion fill', () => {
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
