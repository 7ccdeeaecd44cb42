import { expect } from 'vitest'
import { chiSquareTail } from '../../src/math/chi-square.js'
import { logNormalBelow } from '../../src/math/normal.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

// Source: scipy.stats.chi2.sf.
itWith(scipy, 'the tail of chi-squared is that of SciPy, for few and many, whole and broken degrees of freedom', () => {
  const cases = [1, 2, 7.3, 50, 999.5, 1e5].flatMap((degrees) =>
    [-3, -1, 0, 1, 3, 8].map((sigmas) => [Math.max(0.01, degrees + sigmas * Math.sqrt(2 * degrees)), degrees])
  )
  const expected = askPython<number[]>('from scipy.stats import chi2\nanswer = [float(chi2.sf(x, k)) for x, k in data]', cases)
  cases.forEach(([value, degrees], i) => {
    expect(chiSquareTail(value, degrees) / expected[i]).toBeCloseTo(1, 8)
  })
})

// Source: scipy.stats.norm.logcdf.
itWith(scipy, 'the logarithm of the normal distribution is that of SciPy', () => {
  const values = [-200, -38, -12, -6.001, -5.999, -3, -1, 0, 0.7, 2, 5, 8]
  const expected = askPython<number[]>('from scipy.stats import norm\nanswer = [float(norm.logcdf(x)) for x in data]', values)
  values.forEach((value, i) => {
    // Digits are lost where the probability of a value above 5 is nearly 1.
    expect(Math.abs(logNormalBelow(value) - expected[i])).toBeLessThan(1e-15 + 1e-7 * Math.abs(expected[i]))
  })
})
