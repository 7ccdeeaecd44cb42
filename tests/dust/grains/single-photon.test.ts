import { describe, expect, it } from 'vitest'
import { fluctuatingRadius, heatContent } from '../../../src/dust/grains/single-photon.js'

const electronvolt = 1.602176634e-12

describe('heatContent', () => {
  it('is the integral of the published heat capacity, and continuous', () => {
    // Draine & Anderson (1985, ApJ 292, 494), recalled: 1.4e3 T^2 erg/K/cm3 below 50 K, 3.41e7 above 500 K
    expect(heatContent(20)).toBeCloseTo((1.4e3 * 20 ** 3) / 3, 0)
    expect((heatContent(800) - heatContent(600)) / 200 / 3.41e7).toBeCloseTo(1, 10)
    for (const edge of [50, 150, 500]) expect(heatContent(edge * 1.000001) / heatContent(edge)).toBeCloseTo(1, 4)
  })

  it('is below the 3 k T an atom of Dulong & Petit (1819), and near it when hot', () => {
    // forsterite Mg2SiO4: 7 atoms of mean mass 20.1 u, 3.3 g/cm3 (handbook values, recalled): 3 k n = 4.1e7 erg/K/cm3
    const dulong = 3 * 1.380649e-16 * (3.3 / (20.1 * 1.66053907e-24))
    expect(heatContent(300)).toBeLessThan(dulong * 300)
    const capacity = heatContent(1001) - heatContent(1000)
    expect(capacity / dulong).toBeGreaterThan(0.75)
    expect(capacity / dulong).toBeLessThan(1)
  })
})

describe('fluctuatingRadius', () => {
  it('is about 10 nm for starlight in the cold interstellar medium, as the literature has it', () => {
    // Draine (2003, ARA&A 41, 241) puts the limit of steady temperatures near 10 to 20 nm at 18 K (recalled).
    const radius = fluctuatingRadius(18, 8 * electronvolt)
    expect(radius).toBeGreaterThan(7e-7)
    expect(radius).toBeLessThan(20e-7)
  })

  it('holds the energy of the photon in its volume', () => {
    const radius = fluctuatingRadius(70, 3 * electronvolt)
    expect(((4 * Math.PI) / 3) * radius ** 3 * heatContent(70)).toBeCloseTo(3 * electronvolt, 20)
  })
})
