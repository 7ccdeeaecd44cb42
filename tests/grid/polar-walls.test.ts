import { describe, expect, it } from 'vitest'
import { polarWalls } from '../../src/grid/polar-walls.js'
import { disk } from '../../src/shapes/disk.js'
import { shell } from '../../src/shapes/shell.js'

const flaredDisk = (aspect: number, flaring: number) =>
  disk({ kind: 'disk', inner: 1, outer: 300, surfaceSlope: -1, scaleHeight: { value: 100 * aspect, at: 100, flaring } })

describe('polarWalls', () => {
  it.each([0, 1, 2, 7, 40, 81])('gives the number asked for (%i), from pole to pole, symmetric and falling', (count) => {
    for (const shapes of [
      [flaredDisk(0.01, 1)],
      [flaredDisk(0.3, 1.3)],
      [shell(1, 9, -2)],
      [shell(1, 9, -2), flaredDisk(0.1, 1.1)]
    ]) {
      const walls = polarWalls(shapes, count)
      if (count > 0) expect(walls.length).toBe(count + 1)
      const last = walls.length - 1
      expect(walls[0]).toBe(1)
      expect(walls[last]).toBe(-1)
      for (let k = 0; k < last; k++) {
        expect(walls[k]).toBeGreaterThan(walls[k + 1])
        expect(walls[k] + walls[last - k]).toBe(0)
      }
      if (last % 2 === 0) expect(Math.abs(walls[last / 2])).toBe(0)
    }
  })

  it.each([
    [0.01, 1],
    [0.03, 1.1],
    [0.1, 1.25],
    [0.3, 1]
  ])('resolves scale heights of h/R = %f with flaring %f at every radius', (aspect, flaring) => {
    const shape = flaredDisk(aspect, flaring)
    const walls = polarWalls([shape], 0)
    expect(walls.length - 1).toBeLessThanOrEqual(120)
    for (const h of shape.aspectRatios!) {
      const z = (k: number) => walls[k] / Math.sqrt(1 - walls[k] ** 2) / h
      for (let k = walls.length >> 1; k > 1 && z(k) < 5.4; k--) expect(z(k - 1) - z(k)).toBeLessThan(0.36)
    }
  })

  it('divides a sphere into equal angles', () => {
    const walls = polarWalls([shell(1, 9, -2)], 6)
    walls.forEach((cosine, k) => {
      expect(cosine).toBeCloseTo(Math.cos((Math.PI * k) / 6), 10)
    })
  })
})
