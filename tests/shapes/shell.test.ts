import { describe, expect, it } from 'vitest'
import { ball } from '../../src/shapes/ball.js'
import { shell } from '../../src/shapes/shell.js'
import { AU } from '../../src/units/constants.js'

describe('shell', () => {
  it('has the mass of the textbook formula', () => {
    // Mass of rho = rho1 (r/r1)^-2 between r1 and r2: 4 pi rho1 r1^2 (r2 - r1) (elementary calculus); rho is relative to r2 here.
    const wind = shell(6 * AU, 3000 * AU, -2)
    const atInner = wind.relativeDensity(0, 6 * AU, 0)
    expect(atInner).toBeCloseTo(500 ** 2, 6)
    expect(wind.totalMass / (4 * Math.PI * atInner * (6 * AU) ** 2 * 2994 * AU)).toBeCloseTo(1, 12)
    // Its column: rho1 r1 (1 - r1/r2).
    expect(wind.column / (atInner * 6 * AU * (1 - 6 / 3000))).toBeCloseTo(1, 12)
  })

  it('takes the slopes at which the integrals become logarithms', () => {
    expect(shell(1, Math.E, -3).totalMass / (4 * Math.PI * Math.E ** 3)).toBeCloseTo(1, 13)
    expect(shell(1, Math.E, -1).column / Math.E).toBeCloseTo(1, 13)
  })

  it('ends sharply at both edges and is symmetric', () => {
    const layer = shell(10, 20, -2)
    expect(layer.relativeDensity(10, 0, 0)).toBeGreaterThan(0)
    expect(layer.relativeDensity(9.999, 0, 0)).toBe(0)
    expect(layer.relativeDensity(0, 20.001, 0)).toBe(0)
    expect(layer.relativeDensity(0, 0, -15)).toBe(layer.relativeDensity(15, 0, 0))
    expect(layer.massBetween(0, 100)).toBe(layer.totalMass)
    expect(layer.massBetween(0, 10)).toBe(0)
    expect(layer.massBetween(20, 30)).toBe(0)
  })

  it('may reach the origin when its mass is finite', () => {
    const cusp = shell(0, 2, -1)
    expect(cusp.totalMass).toBeCloseTo(4 * Math.PI * 2 * 2, 10)
    expect(cusp.column).toBe(Number.POSITIVE_INFINITY)
    expect(cusp.innerRadius).toBe(0)
    expect(cusp.sphereEdges).toEqual([2])
  })
})

describe('ball', () => {
  it('is a uniform sphere', () => {
    const sphere = ball(3)
    expect(sphere.totalMass).toBeCloseTo(36 * Math.PI, 10)
    expect(sphere.column).toBeCloseTo(3, 13)
    expect(sphere.relativeDensity(0, 0, 0)).toBe(1)
    expect(sphere.relativeDensity(1, 2, 2)).toBe(1)
    expect(sphere.relativeDensity(1, 2, 2.01)).toBe(0)
  })
})
