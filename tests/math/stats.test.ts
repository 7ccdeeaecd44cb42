import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { mean, median, medianOverBulk, medianOverCountedBulk, standardError } from '../../src/math/stats.js'

describe('mean and standard error', () => {
  it('are those of the definition', () => {
    const groups = [2, 4, 4, 4, 5, 5, 7, 9]
    expect(mean(groups)).toBe(5)
    expect(standardError(groups)).toBeCloseTo(Math.sqrt(32 / (8 * 7)), 14)
    expect(standardError([3])).toBeNaN()
  })

  it('give an honest sigma: 68.3 % of means lie within one t-corrected sigma', () => {
    // 4000 means of 20 uniforms. Share within 1 sigma for Student's t with 19 degrees of freedom: 0.6701 (recalled, scipy.stats.t).
    const uniform = stream('stats/coverage')
    let inside = 0
    for (let trial = 0; trial < 4000; trial++) {
      const groups = Float64Array.from({ length: 20 }, uniform)
      if (Math.abs(mean(groups) - 0.5) < standardError(groups)) inside++
    }
    // 4 sigma of a binomial count: a chance of 6e-5
    expect(Math.abs(inside / 4000 - 0.6701)).toBeLessThan(4 * Math.sqrt((0.67 * 0.33) / 4000))
  })
})

describe('median', () => {
  it('takes the middle, or the mean of the two middles', () => {
    expect(median([9, 1, 5])).toBe(5)
    expect(median([9, 1, 5, 7])).toBe(6)
    expect(median([])).toBeNaN()
  })
})

describe('medianOverBulk', () => {
  const values = [1, 2, 3, 100, 200]
  const weights = [50, 30, 15, 4, 1]

  it('counts only the heaviest elements that hold the fraction', () => {
    expect(medianOverBulk(values, weights, 0.95)).toBe(2)
    expect(medianOverBulk(values, weights, 0.96)).toBe(2.5)
    expect(medianOverBulk(values, weights, 1)).toBe(3)
  })

  it('does not depend on the order of equal elements', () => {
    expect(medianOverBulk([1, 2, 9], [5, 5, 5], 0.5)).toBe(2)
    expect(medianOverBulk([9, 2, 1], [5, 5, 5], 0.5)).toBe(2)
  })

  it('leaves out elements without weight, whatever their value', () => {
    expect(medianOverBulk([...values, Number.NaN], [...weights, 0], 1)).toBe(3)
    expect(medianOverBulk(values, [0, 0, 0, 0, 0], 0.95)).toBeNaN()
  })
})

describe('medianOverCountedBulk', () => {
  it('equals the plain median over the bulk when every element stands for one', () => {
    const values = [5, 1, 9, 3, 7]
    const weights = [10, 8, 6, 4, 0.1]
    expect(medianOverCountedBulk(values, weights, [1, 1, 1, 1, 1], 0.3)).toBe(5)
    expect(medianOverCountedBulk(values, weights, [1, 1, 1, 1, 1], 0.8)).toBe(5)
  })

  it('counts an element as often as it stands for', () => {
    // Written out: 9 nine times, 1 twice: the bulk's median is 9.
    expect(medianOverCountedBulk([9, 1], [1, 1], [9, 2], 1)).toBe(9)
    expect(medianOverCountedBulk([9, 1], [1, 1], [2, 9], 1)).toBe(1)
  })
})
