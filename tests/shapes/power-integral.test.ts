import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { powerIntegral } from '../../src/shapes/power-integral.js'

const decades = (from: number, to: number) => fc.double({ min: from, max: to, noNaN: true }).map((e) => 10 ** e)

describe('powerIntegral', () => {
  it('gives the textbook integrals', () => {
    expect(powerIntegral(1, 3, 2)).toBeCloseTo(26 / 3, 13)
    expect(powerIntegral(2, 5, -1)).toBeCloseTo(Math.log(2.5), 14)
    expect(powerIntegral(2, 5, -2)).toBeCloseTo(0.3, 14)
    expect(powerIntegral(0, 4, 0.5)).toBeCloseTo(16 / 3, 13)
    expect(powerIntegral(0, 1, -1)).toBe(Number.POSITIVE_INFINITY)
    expect(powerIntegral(0, 1, -2.5)).toBe(Number.POSITIVE_INFINITY)
  })

  it('keeps full accuracy for a thin interval, where the difference of two powers has none', () => {
    const width = 2 ** -40
    // Taylor series about the lower end: width (1 + p width/2 + ...) with a = 1.
    for (const p of [-7, -1, 0, 2, 9])
      expect(powerIntegral(1, 1 + width, p) / (width * (1 + (p * width) / 2)) - 1).toBeCloseTo(0, 14)
  })

  it('adds up and scales over wide decades', () => {
    fc.assert(
      fc.property(decades(-8, 8), decades(-6, 3), decades(-6, 3), fc.double({ min: -6, max: 6, noNaN: true }), (a, u, v, p) => {
        const b = a * (1 + u)
        const c = b * (1 + v)
        const whole = powerIntegral(a, c, p)
        expect((powerIntegral(a, b, p) + powerIntegral(b, c, p)) / whole).toBeCloseTo(1, 8)
        expect(powerIntegral(2 * a, 2 * c, p) / (2 ** (p + 1) * whole)).toBeCloseTo(1, 8)
      }),
      { seed: 11, numRuns: 300 }
    )
  })
})
