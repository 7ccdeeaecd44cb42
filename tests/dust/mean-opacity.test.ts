import { describe, expect, it } from 'vitest'
import { meanOpacities } from '../../src/dust/mean-opacity.js'
import type { OpacityCurves } from '../../src/dust/opacity-curves.js'
import { BOLTZMANN, LIGHT_SPEED, PLANCK } from '../../src/units/constants.js'

const curves = (slope: number, albedo: number, g: number): OpacityCurves => {
  const extinction = (wavelength: number) => (0.01 / wavelength) ** slope
  return {
    absorption: (wavelength) => (1 - albedo) * extinction(wavelength),
    scattering: (wavelength) => albedo * extinction(wavelength),
    asymmetry: () => g,
    range: [0, Number.POSITIVE_INFINITY],
    kinks: []
  }
}

describe('meanOpacities', () => {
  // With kappa ~ nu^2, x = h nu / k T: Planck int x^5 / (e^x - 1) over int x^3 / (e^x - 1) = 5! zeta(6) / (3! zeta(4)); Rosseland
  // int x^4 e^x / (e^x - 1)^2 over int x^2 e^x / (e^x - 1)^2 = 4! zeta(4) / (2! zeta(2)) (Abramowitz & Stegun 1964, 27.1.3 and 23.2.24).
  const zeta = { 2: Math.PI ** 2 / 6, 4: Math.PI ** 4 / 90, 6: Math.PI ** 6 / 945 }

  it('meets the closed forms of power laws at any temperature', () => {
    const temperatures = [5, 40, 300, 5000]
    const { planck, rosseland } = meanOpacities(curves(2, 0, 0), temperatures)
    temperatures.forEach((temperature, t) => {
      const unit = ((BOLTZMANN * temperature * 0.01) / (PLANCK * LIGHT_SPEED)) ** 2
      expect(planck[t] / (unit * ((120 * zeta[6]) / (6 * zeta[4])))).toBeCloseTo(1, 6)
      expect(rosseland[t] / (unit * ((24 * zeta[4]) / (2 * zeta[2])))).toBeCloseTo(1, 6)
    })
  })

  it('leaves scattering out of the Planck mean, and counts it in the Rosseland mean as far as it turns light round', () => {
    const { planck, rosseland } = meanOpacities(curves(0, 0.6, 0.5), [100])
    expect(planck[0]).toBeCloseTo(0.4, 6)
    expect(rosseland[0]).toBeCloseTo(0.4 + 0.5 * 0.6, 6)
  })
})
