import { describe, expect, it } from 'vitest'
import { resample } from '../../../src/output/png/resample.js'
import { chooseStretch, stretched } from '../../../src/output/png/stretch.js'

describe('resample', () => {
  it('repeats pixels when enlarging by a whole factor', () => {
    expect([...resample(new Float64Array([1, 2]), 2, 1, 4, 2)]).toEqual([1, 1, 2, 2, 1, 1, 2, 2])
  })

  it('averages when reducing, and keeps the mean at any size', () => {
    expect([...resample(new Float64Array([1, 3, 5, 7]), 2, 2, 1, 1)]).toEqual([4])
    const values = Float64Array.from({ length: 35 }, (_, i) => (i * i) % 11)
    const mean = (array: Float64Array): number => array.reduce((a, b) => a + b, 0) / array.length
    for (const [w, h] of [
      [3, 2],
      [7, 5],
      [13, 17]
    ]) {
      expect(mean(resample(values, 7, 5, w, h))).toBeCloseTo(mean(values), 12)
    }
  })
})

describe('chooseStretch', () => {
  const ramp = (low: number, high: number, count = 10000): Float64Array =>
    Float64Array.from({ length: count }, (_, i) => low * (high / low) ** (i / (count - 1)))

  it('is linear from zero for a small range and logarithmic for a large one', () => {
    expect(chooseStretch(ramp(1, 10))).toMatchObject({ kind: 'linear', low: 0, high: 10, cut: false })
    expect(chooseStretch(ramp(1, 1000)).kind).toBe('logarithmic')
  })

  it('spans at most five decades', () => {
    const { low, high } = chooseStretch(ramp(1e-20, 1))
    expect(high / low).toBeCloseTo(1e5, 0)
  })

  it('does not let a star set the scale', () => {
    const values = ramp(1, 10)
    values[17] = 1e9
    expect(chooseStretch(values)).toMatchObject({ kind: 'linear', cut: true, brightest: 1e9 })
  })

  it('knows an image without light, and takes what is no number as dark', () => {
    const stretch = chooseStretch(new Float64Array([0, Number.NaN, 0]))
    expect(stretch.empty).toBe(true)
    expect(stretched(Number.NaN, stretch)).toBe(0)
  })

  it('puts values between its ends', () => {
    const stretch = { kind: 'logarithmic', low: 1, high: 100, brightest: 100, cut: false, empty: false } as const
    expect(stretched(10, stretch)).toBeCloseTo(0.5, 12)
    expect(stretched(1e5, stretch)).toBe(1)
    expect(stretched(1e-5, stretch)).toBe(0)
  })
})
