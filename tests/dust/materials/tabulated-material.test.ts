import { describe, expect, it } from 'vitest'
import { tabulatedMaterial } from '../../../src/dust/materials/tabulated-material.js'

const um = 1e-4
const { index, range } = tabulatedMaterial({
  wavelength: Float64Array.of(1 * um, 10 * um, 100 * um),
  n: Float64Array.of(1.5, 1.7, 2.5),
  k: Float64Array.of(0, 0.1, 0.4)
})

describe('tabulated material', () => {
  it('interpolates n in the logarithm of wavelength, k as a power law, or linearly from a zero', () => {
    expect(index(10 * um)).toEqual({ re: 1.7, im: 0.1 })
    expect(index(Math.sqrt(10) * um).re).toBeCloseTo(1.6, 12)
    expect(index(5.5 * um).im).toBeCloseTo(0.05, 12)
    expect(index(Math.sqrt(1000) * um).im).toBeCloseTo(0.2, 12)
  })

  it('holds the short end and goes on with the last power law of k at the long end', () => {
    expect(index(0.1 * um)).toEqual({ re: 1.5, im: 0 })
    expect(index(1000 * um).re).toBe(2.5)
    expect(index(1000 * um).im).toBeCloseTo(1.6, 12)
    expect(range).toEqual([1 * um, 100 * um])
  })

  it('stays transparent beyond a last zero', () => {
    const clear = tabulatedMaterial({
      wavelength: Float64Array.of(1, 2),
      n: Float64Array.of(1.5, 1.4),
      k: Float64Array.of(0.1, 0)
    })
    expect(clear.index(3)).toEqual({ re: 1.4, im: 0 })
  })
})
