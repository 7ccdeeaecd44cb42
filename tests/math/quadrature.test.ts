import { describe, expect, it } from 'vitest'
import { applyRule, gaussLegendre, integrate } from '../../src/math/quadrature.js'

describe('gaussLegendre', () => {
  it('agrees with the printed table', () => {
    // Abramowitz & Stegun 1964, table 25.4 (recalled), n = 5 and n = 10
    const five = gaussLegendre(5)
    expect(five.nodes[4]).toBeCloseTo(0.906179845938664, 14)
    expect(five.weights[4]).toBeCloseTo(0.236926885056189, 14)
    expect(five.nodes[2]).toBeCloseTo(0, 14)
    expect(five.weights[2]).toBeCloseTo(128 / 225, 14)
    const ten = gaussLegendre(10)
    expect(ten.nodes[9]).toBeCloseTo(0.973906528517172, 14)
    expect(ten.weights[9]).toBeCloseTo(0.066671344308688, 14)
  })

  it('is exact to degree 2n - 1 and not beyond', () => {
    for (const n of [1, 2, 4, 8, 33]) {
      const rule = gaussLegendre(n)
      const moment = (degree: number) => applyRule(rule, (x) => x ** degree, 0, 1) * (degree + 1)
      expect(moment(2 * n - 1)).toBeCloseTo(1, 12)
      if (n <= 8) expect(Math.abs(moment(2 * n) - 1)).toBeGreaterThan(1e-12)
    }
  })
})

describe('integrate', () => {
  it('meets closed forms, smooth or not', () => {
    expect(integrate(Math.sin, 0, Math.PI)).toBeCloseTo(2, 12)
    expect(integrate(Math.sqrt, 0, 1)).toBeCloseTo(2 / 3, 9)
    expect(integrate((x) => (x < 1 / 3 ? 1 : 0), 0, 1)).toBeCloseTo(1 / 3, 9)
    expect(integrate((x) => Math.exp(-(((x - 0.3) / 1e-3) ** 2)), 0, 1) / (1e-3 * Math.sqrt(Math.PI))).toBeCloseTo(1, 9)
  })

  it('turns sign with the direction', () => {
    expect(integrate(Math.exp, 1, 0)).toBeCloseTo(1 - Math.E, 12)
  })

  it('gives the integral of x^3 / (e^x - 1), pi^4 / 15', () => {
    // Abramowitz & Stegun 1964, 23.2.7: Gamma(4) zeta(4)
    expect(integrate((x) => x ** 3 / Math.expm1(x), 0, 100)).toBeCloseTo(Math.PI ** 4 / 15, 9)
  })
})
