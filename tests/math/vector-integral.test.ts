import { describe, expect, it } from 'vitest'
import { gaussWeights, kronrodNodes, kronrodWeights } from '../../src/math/kronrod.js'
import { gaussLegendre } from '../../src/math/quadrature.js'
import { integrateVector } from '../../src/math/vector-integral.js'

describe('nested rules', () => {
  const moment = (weights: Float64Array, degree: number) =>
    weights.reduce((sum, weight, i) => sum + weight * kronrodNodes[i] ** degree, 0) * (degree + 1) * 0.5

  it('are exact to degree 22 and 13, as Gauss-Kronrod and Gauss-Legendre rules must be, and no further', () => {
    for (let degree = 0; degree <= 22; degree += 2) expect(moment(kronrodWeights, degree)).toBeCloseTo(1, 14)
    expect(Math.abs(moment(kronrodWeights, 24) - 1)).toBeGreaterThan(1e-8)
    for (let degree = 0; degree <= 12; degree += 2) expect(moment(gaussWeights, degree)).toBeCloseTo(1, 14)
    expect(Math.abs(moment(gaussWeights, 14) - 1)).toBeGreaterThan(1e-4)
  })

  it('contain the seven-point Gauss-Legendre rule', () => {
    const inner = [...kronrodNodes].filter((_, i) => gaussWeights[i] > 0)
    gaussLegendre(7).nodes.forEach((node, i) => {
      expect(inner[i]).toBeCloseTo(node, 14)
    })
  })
})

describe('integrateVector', () => {
  const integrand = {
    length: 3,
    judged: 2,
    write: (x: number, values: Float64Array) => {
      values[0] = Math.sqrt(x)
      values[1] = 1 / (1e-6 + (x - 0.3) ** 2)
      values[2] = x
    },
    setScales: () => {}
  }
  const exact = [2 / 3, 1e3 * (Math.atan(700) + Math.atan(300)), 0.5]

  it('meets closed forms together, a narrow peak among them, within the error it estimates', () => {
    for (const tolerance of [1e-3, 1e-6, 1e-9]) {
      const { values, error } = integrateVector(integrand, [0, 1], 1, tolerance, 1e5)
      expect(error).toBeLessThanOrEqual(tolerance)
      exact.forEach((value, q) => {
        expect(Math.abs(values[q] / value - 1)).toBeLessThan(error)
      })
    }
  })

  it('stops at the evaluations allowed and says what error is left', () => {
    const { error, evaluations } = integrateVector(integrand, [0, 1], 1, 1e-12, 100)
    expect(error).toBeGreaterThan(1e-12)
    expect(evaluations).toBeLessThan(200)
  })

  it('judges by the scales it is given', () => {
    const setScales = (scales: Float64Array) => scales.fill(1e12)
    expect(integrateVector({ ...integrand, setScales }, [0, 1], 1, 1e-6, 1e5).evaluations).toBe(15)
  })
})
