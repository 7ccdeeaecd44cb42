import { describe, expect, it } from 'vitest'
import { besselJ0, besselJ1, jinc } from '../../src/math/bessel.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'

describe('Bessel functions', () => {
  it('vanish at their zeros (Abramowitz & Stegun 1964, table 9.5), are odd and even', () => {
    for (const zero of [2.4048255577, 5.5200781103, 8.6537279129]) expect(besselJ0(zero)).toBeCloseTo(0, 10)
    for (const zero of [3.8317059702, 7.0155866698, 10.1734681351]) expect(besselJ1(zero)).toBeCloseTo(0, 10)
    expect([besselJ0(-3), besselJ1(-3), besselJ1(-40)]).toEqual([besselJ0(3), -besselJ1(3), -besselJ1(40)])
    expect([jinc(0), jinc(1e-6)]).toEqual([1, 1 - 1e-12 / 8])
  })

  itWith(scipy, 'agree with scipy from 0 to 10000', () => {
    const x = Array.from({ length: 400 }, (_, i) => (i < 300 ? i / 8 : 37.5 * 1.0576 ** (i - 299)))
    const theirs = askPython<number[][]>('from scipy.special import j0, j1\nanswer = [j0(data).tolist(), j1(data).tolist()]', x)
    x.forEach((value, i) => {
      expect(Math.abs(besselJ0(value) - theirs[0][i]), `J0(${value})`).toBeLessThan(2e-14 * Math.max(1, value / 10))
      expect(Math.abs(besselJ1(value) - theirs[1][i]), `J1(${value})`).toBeLessThan(2e-14 * Math.max(1, value / 10))
    })
  })
})
