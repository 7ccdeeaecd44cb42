import { describe, expect, it } from 'vitest'
import { latinHypercube } from '../../src/math/latin-hypercube.js'
import { stream } from '../../src/math/random.js'

describe('Latin hypercube', () => {
  it.each([1, 7, 200])('%d points: one in each interval of each dimension', (count) => {
    const points = latinHypercube(count, 4, stream('hypercube'))
    for (let d = 0; d < 4; d++) {
      const intervals = points.map((point) => Math.floor(count * point[d])).sort((a, b) => a - b)
      expect(intervals).toEqual(Array.from({ length: count }, (_, i) => i))
    }
  })

  // The rank correlation of 400 independent pairs has a 1 sigma of 1 / sqrt(399) = 0.05: 4 sigma fail once in 16000 draws.
  it('dimensions are independent', () => {
    const points = latinHypercube(400, 2, stream('pairs'))
    const correlation = points.reduce((sum, [x, y]) => sum + 12 * (x - 0.5) * (y - 0.5), 0) / 400
    expect(Math.abs(correlation)).toBeLessThan(0.2)
  })
})
