import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { bracket, interpolateLinear, interpolateLogLog } from '../../src/math/interp.js'

describe('bracket', () => {
  it('finds the interval that a plain search finds', () => {
    const increasing = fc.uniqueArray(fc.integer({ min: -50, max: 50 }), { minLength: 2, maxLength: 30 })
    fc.assert(
      fc.property(increasing, fc.double({ min: -60, max: 60, noNaN: true }), (values, x) => {
        const xs = values.sort((a, b) => a - b)
        let slow = 0
        while (slow < xs.length - 2 && xs[slow + 1] <= x) slow++
        expect(bracket(xs, x)).toBe(slow)
      })
    )
  })
})

describe('interpolation', () => {
  const xs = [1, 2, 4, 10]

  it('reproduces straight lines and powers between the rows', () => {
    for (const x of [1, 1.3, 2, 3.7, 9.99, 10]) {
      expect(interpolateLinear(xs, [3, 5, 9, 21], x)).toBeCloseTo(2 * x + 1, 12)
      const power = xs.map((v) => 5 * v ** -1.7)
      expect(interpolateLogLog(xs, power, x) / (5 * x ** -1.7)).toBeCloseTo(1, 12)
    }
  })

  it('is linear where an end is zero', () => {
    expect(interpolateLogLog(xs, [0, 6, 6, 0], 1.5)).toBe(3)
    expect(interpolateLogLog(xs, [0, 6, 6, 0], 7)).toBe(3)
    expect(interpolateLogLog(xs, [0, 0, 6, 0], 1.5)).toBe(0)
  })

  it('gives the nearest value outside, and works with one row', () => {
    for (const f of [interpolateLinear, interpolateLogLog]) {
      expect(f(xs, [3, 5, 9, 21], 0.1)).toBe(3)
      expect(f(xs, [3, 5, 9, 21], 99)).toBe(21)
      expect(f([2], [7], 5)).toBe(7)
    }
  })
})
