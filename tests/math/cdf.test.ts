import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { allocateShared } from '../../src/math/allocate.js'
import { makeSamplingTable, sampleBin } from '../../src/math/cdf.js'
import { stream } from '../../src/math/random.js'
import { chiSquareSigmas } from '../support/chi-square.js'

describe('sampleBin', () => {
  it('finds the bin that a plain search of the cumulative sums finds, in every row', () => {
    const weight = fc.oneof(fc.constant(0), fc.double({ min: 1e-30, max: 1e30, noNaN: true }))
    const row = fc.array(weight, { minLength: 7, maxLength: 7 }).filter((weights) => weights.some((w) => w > 0))
    fc.assert(
      fc.property(row, row, fc.double({ min: 0, max: 1, maxExcluded: true, noNaN: true }), (first, second, u) => {
        const table = makeSamplingTable(Float64Array.from([...first, ...second]), 2, 7)
        for (const [index, weights] of [first, second].entries()) {
          const start = index * 7
          const slow = table.cumulative.subarray(start, start + 7).findIndex((value) => value > u)
          const bin = sampleBin(table, index, u)
          expect(bin).toBe(slow)
          expect(weights[bin]).toBeGreaterThan(0)
        }
      })
    )
  })

  it('keeps to bins with weight at both ends of the uniform, for any number of bins', () => {
    for (let bins = 2; bins < 1100; bins += 7) {
      const weights = Float64Array.from({ length: bins }, (_, k) => (k === 0 || k === bins - 1 ? 0 : 1))
      if (bins === 2) weights[1] = 1
      const table = makeSamplingTable(weights, 1, bins)
      expect(sampleBin(table, 0, 0)).toBe(1)
      expect(sampleBin(table, 0, 1 - 2 ** -53)).toBe(bins === 2 ? 1 : bins - 2)
    }
  })

  it('draws bins as often as their weights say', () => {
    const uniform = stream('cdf/chi-square')
    const weights = Float64Array.from({ length: 60 }, (_, k) => (k % 7 === 3 ? 0 : Math.exp(-k / 20) * (1 + uniform())))
    const table = makeSamplingTable(weights, 1, 60, allocateShared)
    const counts = new Float64Array(60)
    const draws = 400_000
    for (let i = 0; i < draws; i++) counts[sampleBin(table, 0, uniform())]++
    const total = weights.reduce((sum, w) => sum + w, 0)
    // fixed seed; 4 sigma: a chance of 3e-5 each side
    const sigmas = chiSquareSigmas(
      counts,
      weights.map((w) => (draws * w) / total)
    )
    expect(Math.abs(sigmas)).toBeLessThan(4)
  })

  it('gives the last bin of a row without weight', () => {
    expect(sampleBin(makeSamplingTable(new Float64Array(5), 1, 5), 0, 0.3)).toBe(4)
  })
})
