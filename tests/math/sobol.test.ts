import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { mostSobolDimensions, sobolPoints } from '../../src/math/sobol.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

describe('Sobol points', () => {
  // scipy.stats.qmc.Sobol has the direction numbers of Joe & Kuo 2008 (new-joe-kuo-6) and the order of the Gray code.
  itWith(scipy, 'unscrambled: those of scipy, in every dimension', () => {
    const theirs = askPython<number[][]>(
      'from scipy.stats import qmc\nanswer = qmc.Sobol(data["d"], scramble=False, bits=32).random(data["n"]).tolist()',
      { d: mostSobolDimensions, n: 256 }
    )
    expect(sobolPoints(256, mostSobolDimensions)).toEqual(theirs)
  })

  it.each([1, 2, 5, mostSobolDimensions])(
    'scrambled: one point in each of 128 intervals of each of %d dimensions',
    (dimensions) => {
      const points = sobolPoints(128, dimensions, stream('sobol'))
      for (let d = 0; d < dimensions; d++) {
        const intervals = points.map((point) => Math.floor(128 * point[d])).sort((a, b) => a - b)
        expect(intervals).toEqual(Array.from({ length: 128 }, (_, i) => i))
      }
    }
  )

  it('scrambled: the first two dimensions are a (0, 6, 2)-net, as unscrambled', () => {
    const points = sobolPoints(64, 2, stream('net'))
    for (let k = 0; k <= 6; k++) {
      const boxes = points.map(([x, y]) => Math.floor(2 ** k * x) * 2 ** (6 - k) + Math.floor(2 ** (6 - k) * y))
      expect(new Set(boxes).size, `boxes of 2^-${k} by 2^-${6 - k}`).toBe(64)
    }
  })

  it('scrambled: another seed, other points; within the cube, ends excluded', () => {
    const [a, b] = ['a', 'b'].map((seed) => sobolPoints(32, 3, stream(seed)))
    expect(a).not.toEqual(b)
    expect(a).toEqual(sobolPoints(32, 3, stream('a')))
    for (const value of a.flat()) expect(value > 0 && value < 1).toBe(true)
  })

  // The integral of prod(3/2 sqrt(x)) over the cube is 1. Plain random points leave an rms error of sqrt((9/8)^3 - 1) / 32 = 0.020.
  it('integrates better than random points', () => {
    const errors = Array.from({ length: 20 }, (_, seed) => {
      const points = sobolPoints(1024, 3, stream(`integral/${seed}`))
      const mean = points.reduce((sum, [x, y, z]) => sum + 3.375 * Math.sqrt(x * y * z), 0) / 1024
      return mean - 1
    })
    expect(Math.sqrt(errors.reduce((sum, error) => sum + error ** 2, 0) / 20)).toBeLessThan(0.002)
  })
})
