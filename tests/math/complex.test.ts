import { describe, expect, it } from 'vitest'
import { complex, divide, multiply, squareRoot } from '../../src/math/complex.js'

describe('complex numbers', () => {
  it('divide as they multiply', () => {
    const quotient = divide(complex(-3, 7), complex(2, -5))
    const back = multiply(quotient, complex(2, -5))
    expect(back.re).toBeCloseTo(-3, 14)
    expect(back.im).toBeCloseTo(7, 14)
    // (-3 + 7i)(2 + 5i) / 29
    expect(quotient.re).toBeCloseTo(-41 / 29, 14)
    expect(quotient.im).toBeCloseTo(-1 / 29, 14)
  })

  it('have square roots of positive real part in every quadrant, exact to rounding beside the axes', () => {
    for (const [re, im] of [
      [3, 4],
      [-3, 4],
      [-3, -4],
      [3, -4],
      [-2, 1e-12],
      [2, 1e-12],
      [1e-200, 1e-200],
      [0, 2]
    ]) {
      const root = squareRoot(complex(re, im))
      expect(root.re).toBeGreaterThan(0)
      const square = multiply(root, root)
      expect(square.re === 0 && re === 0 ? 1 : square.re / re).toBeCloseTo(1, 11)
      expect(square.im / im).toBeCloseTo(1, 11)
    }
    expect(squareRoot(complex(3, 4))).toEqual({ re: 2, im: 1 })
    expect(squareRoot(complex(-4))).toEqual({ re: 0, im: 2 })
    expect(squareRoot(complex(0))).toEqual({ re: 0, im: 0 })
  })
})
