import { describe, expect, it, test } from 'vitest'
import { drawNormal, drawPoisson } from '../../src/math/draw.js'
import { stream } from '../../src/math/random.js'

const DRAWS = 100_000

describe('drawn numbers', () => {
  // Mean and variance within 5 of their own sigma: by chance once in 1.7 million.
  test.each([0.02, 0.7, 5, 9.99, 10, 40, 900, 3e7])(
    'Poisson counts of mean %d: mean, variance, whole and not negative',
    (mean) => {
      const random = stream(`poisson ${mean}`)
      let sum = 0
      let squares = 0
      for (let i = 0; i < DRAWS; i++) {
        const count = drawPoisson(mean, random)
        if (!Number.isInteger(count) || count < 0) throw new Error(`count ${count}`)
        sum += count - mean
        squares += (count - mean) ** 2
      }
      expect(Math.abs(sum / DRAWS)).toBeLessThan(5 * Math.sqrt(mean / DRAWS))
      // Fourth central moment of a Poisson distribution: mean + 3 mean^2.
      expect(Math.abs(squares / DRAWS - mean)).toBeLessThan(5 * Math.sqrt((mean + 2 * mean * mean) / DRAWS))
    }
  )

  test.each([6, 23])('Poisson counts of mean %d follow the distribution (chi-squared of 20 or more counts)', (mean) => {
    const random = stream(`distribution ${mean}`)
    const seen = new Map<number, number>()
    for (let i = 0; i < DRAWS; i++) {
      const count = drawPoisson(mean, random)
      seen.set(count, (seen.get(count) ?? 0) + 1)
    }
    let probability = Math.exp(-mean)
    let chi = 0
    let cells = 0
    for (let count = 0; count < 4 * mean; probability *= mean / ++count) {
      const expected = DRAWS * probability
      if (expected < 20) continue
      chi += ((seen.get(count) ?? 0) - expected) ** 2 / expected
      cells++
    }
    // Five sigma of chi-squared: by chance about once in a million.
    expect(cells).toBeGreaterThan(12)
    expect(Math.abs(chi - cells)).toBeLessThan(5 * Math.sqrt(2 * cells))
  })

  it('Poisson counts of nothing are nothing', () => {
    expect(drawPoisson(0, () => 0.5)).toBe(0)
  })

  it('normal numbers have mean 0, variance 1 and kurtosis 3, within 5 sigma', () => {
    const random = stream('normal')
    const values = Array.from({ length: DRAWS }, () => drawNormal(random))
    const moment = (power: number) => values.reduce((sum, value) => sum + value ** power, 0) / DRAWS
    expect(Math.abs(moment(1))).toBeLessThan(5 / Math.sqrt(DRAWS))
    expect(Math.abs(moment(2) - 1)).toBeLessThan(5 * Math.sqrt(2 / DRAWS))
    expect(Math.abs(moment(4) - 3)).toBeLessThan(5 * Math.sqrt(96 / DRAWS))
  })
})
