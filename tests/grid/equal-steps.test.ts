import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { equalSteps, shareOut } from '../../src/grid/equal-steps.js'

describe('equalSteps', () => {
  it('cuts a piecewise linear sum into equal shares', () => {
    expect([...equalSteps([0, 1, 3], [0, 2, 4], 4)]).toEqual([0, 0.5, 1, 2, 3])
  })

  it('steps over stretches where nothing is', () => {
    expect([...equalSteps([0, 1, 9, 10], [0, 1, 1, 2], 4)]).toEqual([0, 0.5, 9, 9.5, 10])
  })

  it('makes equal lengths of nothing at all', () => {
    expect([...equalSteps([2, 5], [7, 7], 3)]).toEqual([2, 3, 4, 5])
  })
})

describe('shareOut', () => {
  it('gives at least one each and exactly the number asked for when that suffices', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: 0, max: 1e6, noNaN: true }), { minLength: 1, maxLength: 8 }),
        fc.integer({ min: 1, max: 300 }),
        (weights, count) => {
          const shares = shareOut(weights, count)
          expect(Math.min(...shares)).toBeGreaterThanOrEqual(1)
          expect(shares.reduce((a, b) => a + b, 0)).toBe(Math.max(count, weights.length))
        }
      ),
      { seed: 12 }
    )
  })

  it('follows the weights', () => {
    expect(shareOut([0, 1, 3], 43)).toEqual([1, 11, 31])
  })
})
