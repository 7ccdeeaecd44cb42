import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import type { DensityPoints } from '../../src/scene/types.js'
import { cubeField } from '../../src/shapes/cube-field.js'
import { pointField, splineKernel } from '../../src/shapes/point-field.js'

function points(list: number[][]): DensityPoints {
  const column = (k: number) => Float64Array.from(list, (row) => row[k])
  return { kind: 'points', file: '', x: column(0), y: column(1), z: column(2), smoothingLength: column(3), mass: column(4) }
}

describe('cubeField', () => {
  it('holds the values it was given, x fastest, and their mass and column', () => {
    const values = Float64Array.from({ length: 2 * 3 * 4 }, (_, i) => i + 1)
    const shape = cubeField({ kind: 'cube', file: '', size: [2, 3, 4], values }, 10)
    // Cubes of side 5: x from -5 to 5, y to 7.5, z to 10.
    expect(shape.relativeDensity(-2, -7, -9)).toBe(1)
    expect(shape.relativeDensity(2, -7, -9)).toBe(2)
    expect(shape.relativeDensity(-2, 0, -9)).toBe(3)
    expect(shape.relativeDensity(2, 7, 9)).toBe(24)
    expect(shape.relativeDensity(2, 7.6, 9)).toBe(0)
    expect(shape.totalMass).toBeCloseTo(300 * 125, 6)
    // The two columns that meet at x = 0, y = 0 hold 3, 9, 15, 21 and 4, 10, 16, 22.
    expect(shape.column).toBeCloseTo(5 * 50, 9)
  })
})

describe('pointField', () => {
  it('spreads each mass by the cubic spline (Monaghan & Lattanzio 1985)', () => {
    // Their normalisation: 1/pi at the centre, 1/(4 pi) at q = 1.
    expect(splineKernel(0)).toBeCloseTo(1 / Math.PI, 14)
    expect(splineKernel(1)).toBeCloseTo(0.25 / Math.PI, 14)
    const { relativeDensity, totalMass, column } = pointField(points([[1, 2, 3, 0.5, 8]]), 100)
    expect(relativeDensity(1, 2, 3)).toBeCloseTo(8 / Math.PI / 0.125, 9)
    expect(relativeDensity(1, 2, 3.5)).toBeCloseTo(2 / Math.PI / 0.125, 9)
    expect(relativeDensity(1, 2, 4.01)).toBe(0)
    expect(totalMass).toBe(8)
    expect(column).toBe(0)
    // 2/(pi h^2) times the integral of the spline from 0 to 2, which is 3/4.
    expect(pointField(points([[0, 0, 0, 0.5, 8]]), 100).column).toBeCloseTo((8 * 2 * 0.75) / Math.PI / 0.25, 9)
  })

  it('finds every point that reaches a place, and loses no mass', () => {
    const uniform = stream('points')
    const list = Array.from({ length: 3000 }, () => {
      const r = 40 * uniform() ** 3
      const mu = 2 * uniform() - 1
      const sin = Math.sqrt(1 - mu * mu)
      const azimuth = 2 * Math.PI * uniform()
      return [r * sin * Math.cos(azimuth), r * sin * Math.sin(azimuth), r * mu, 0.1 + 0.1 * r, 1 + uniform()]
    })
    const shape = pointField(points(list), 200)
    for (let n = 0; n < 200; n++) {
      const [x, y, z] = [20, 20, 20].map((size) => size * (2 * uniform() - 1))
      const direct = list.reduce(
        (sum, [a, b, c, h, m]) => sum + (m * splineKernel(Math.hypot(x - a, y - b, z - c) / h)) / h ** 3,
        0
      )
      expect(shape.relativeDensity(x, y, z)).toBeCloseTo(direct, 10)
    }
    expect(shape.totalMass).toBeCloseTo(
      list.reduce((sum, row) => sum + row[4], 0),
      8
    )
  })

  it('counts only what is in the box', () => {
    const cut = pointField(
      points([
        [5, 0, 0, 1, 3],
        [0, 0, 0, 1, 1],
        [9, 0, 0, 1, 7]
      ]),
      10
    )
    // The first point sits on a side of the box and keeps half of its mass; the last lies outside.
    expect(Math.abs(cut.totalMass / 2.5 - 1)).toBeLessThan(1e-3)
    expect(cut.relativeDensity(5.1, 0, 0)).toBe(0)
  })
})
