import { describe, expect, it } from 'vitest'
import { exponential } from '../../src/math/exponential.js'
import { stream } from '../../src/math/random.js'

describe('exponential', () => {
  const ofWhole = (k: number) => (k + 0.5) / 2 ** 32

  it('is -ln(u) of the library for numbers of the stream', () => {
    const uniform = stream('exponential')
    let worst = 0
    for (let i = 0; i < 100_000; i++) {
      const u = uniform()
      worst = Math.max(worst, Math.abs(exponential(u) + Math.log(u)))
    }
    expect(worst).toBeLessThan(4e-12)
  })

  it('is -ln(u) at the ends and about every power of two', () => {
    for (let power = 0; power <= 32; power++)
      for (const k of [2 ** power - 2, 2 ** power - 1, 2 ** power].filter((k) => k >= 0 && k < 2 ** 32))
        expect(Math.abs(exponential(ofWhole(k)) + Math.log(ofWhole(k))), `k = ${k}`).toBeLessThan(4e-12)
  })
})
