import { describe, expect, it } from 'vitest'
import { gaussLegendre } from '../../src/math/quadrature.js'
import { disk } from '../../src/shapes/disk.js'
import { polarMean } from '../../src/shapes/polar-mean.js'
import { shell } from '../../src/shapes/shell.js'

const rule = gaussLegendre(5)

describe('polarMean', () => {
  const shape = disk({ kind: 'disk', inner: 10, outer: 100, surfaceSlope: -1, scaleHeight: { value: 10, at: 100, flaring: 1.2 } })

  it('agrees with a plain sum over many directions, with the rims inside the range', () => {
    for (const [r, from, to] of [
      [50, 0.1, 0.15],
      [10.01, 0, 0.1],
      [101, 0, 0.2],
      [100.2, 0.02, 0.08]
    ]) {
      const count = 200_000
      let sum = 0
      for (let i = 0; i < count; i++) {
        const mu = from + ((to - from) * (i + 0.5)) / count
        sum += shape.relativeDensity(r * Math.sqrt(1 - mu * mu), 0, r * mu) / count
      }
      // The plain sum is good to a cell of the rim, 1/count of the range.
      expect(Math.abs(polarMean(shape, r, from, to, gaussLegendre(24)) / sum - 1)).toBeLessThan(3e-5)
    }
  })

  it('is zero inside the hole and the density itself for a shell', () => {
    expect(polarMean(shape, 9.99, 0, 1, rule)).toBe(0)
    expect(polarMean(shell(1, 4, -2), 2, 0, 0.5, rule)).toBeCloseTo(4, 13)
  })
})
