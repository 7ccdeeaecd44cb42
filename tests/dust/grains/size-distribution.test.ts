import { describe, expect, it } from 'vitest'
import { lognormalSizes, powerSizes, type SizeDistribution, tabulatedSizes } from '../../../src/dust/grains/size-distribution.js'
import { integrate } from '../../../src/math/quadrature.js'

/** Mean of radius^power over the grains. */
function moment({ smallest, largest, density }: SizeDistribution, power: number): number {
  const sum = (exponent: number) =>
    integrate((u) => density(Math.exp(u)) * Math.exp(u * (exponent + 1)), Math.log(smallest), Math.log(largest))
  return sum(power) / sum(0)
}

describe('size distributions', () => {
  it('power law: has the closed moments, the slope of Mathis, Rumpl & Nordsieck 1977 by default', () => {
    const [a, b] = [1e-6, 1e-4]
    const closed = (power: number, slope: number) => (b ** (power + slope + 1) - a ** (power + slope + 1)) / (power + slope + 1)
    for (const slope of [-3.5, -2.6, 0.5]) {
      const sizes = powerSizes(a, b, slope)
      for (const power of [1, 3, 6]) expect(moment(sizes, power) / (closed(power, slope) / closed(0, slope))).toBeCloseTo(1, 8)
    }
    expect(moment(powerSizes(a, b), 3)).toBe(moment(powerSizes(a, b, -3.5), 3))
  })

  it('lognormal: has the moments median^p exp(p^2 width^2 / 2) (common practice)', () => {
    const [median, width] = [1e-5, 0.5]
    const sizes = lognormalSizes(median * Math.exp(-9), median * Math.exp(9), median, width)
    for (const power of [1, 2, 3, 6])
      expect(moment(sizes, power) / (median ** power * Math.exp(0.5 * (power * width) ** 2))).toBeCloseTo(1, 8)
    expect([sizes.smallest, sizes.largest]).toEqual([median * Math.exp(-9), median * Math.exp(9)])
  })

  it('table: a power law sampled at any radii is that power law again', () => {
    const radii = [1e-6, 3e-6, 2e-5, 1e-4]
    const sizes = tabulatedSizes(
      radii,
      radii.map((radius) => 7 * radius ** -3.5)
    )
    expect([sizes.smallest, sizes.largest]).toEqual([1e-6, 1e-4])
    expect(moment(sizes, 3) / moment(powerSizes(1e-6, 1e-4), 3)).toBeCloseTo(1, 8)
  })
})
