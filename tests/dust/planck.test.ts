import { describe, expect, it } from 'vitest'
import { planckNu, planckNuDerivative } from '../../src/dust/planck.js'
import { integrate } from '../../src/math/quadrature.js'
import { BOLTZMANN, LIGHT_SPEED, PLANCK, STEFAN_BOLTZMANN } from '../../src/units/constants.js'

/** Wien's constants: roots of x = 3 (1 - e^-x) and 5 (1 - e^-x); OEIS A133838 gives the inverse of the second. */
const NU_PEAK = 2.82143937212208
const LAMBDA_PEAK = 1 / 0.2014052352726422

describe('planckNu', () => {
  it('gives the values of a general library', () => {
    // wavelength (um), T (K), B_nu (cgs): evaluated with CODATA 2018 constants in high precision; rows marked * also by
    // astropy.modeling.physical_models.BlackBody 5.2.1
    const rows = [
      [0.55, 5772, 2.59673374822e-5], // *
      [0.55, 10000, 0.000188316601294],
      [1, 2500, 1.26203877334e-6], // *
      [2.2, 800, 1.05114029789e-8],
      [10, 300, 3.31030119846e-9], // *
      [10, 100, 2.24170462158e-13],
      [100, 30, 3.31030119846e-12], // *
      [850, 20, 4.86004137724e-13],
      [1300, 10, 8.93213381054e-14],
      [1900, 2.72548, 3.83757581014e-15]
    ]
    for (const [wavelengthUm, temperature, value] of rows) {
      expect(planckNu(LIGHT_SPEED / (wavelengthUm * 1e-4), temperature) / value).toBeCloseTo(1, 11)
    }
  })

  it('peaks where Wien says, as high as its maximum', () => {
    for (const temperature of [2.7, 300, 5772]) {
      const peak = (NU_PEAK * BOLTZMANN * temperature) / PLANCK
      expect(peak / temperature / 5.87892575764682e10).toBeCloseTo(1, 12)
      expect(planckNu(peak, temperature) / temperature ** 3 / 1.89606633925e-16).toBeCloseTo(1, 10)
      expect(planckNu(peak * 0.999, temperature)).toBeLessThan(planckNu(peak, temperature))
      expect(planckNu(peak * 1.001, temperature)).toBeLessThan(planckNu(peak, temperature))
    }
  })

  it('has its maximum per unit wavelength at lambda T = 0.2898 cm K', () => {
    const perWavelength = (cm: number) => planckNu(LIGHT_SPEED / cm, 1000) / cm ** 2
    const peak = (PLANCK * LIGHT_SPEED) / (LAMBDA_PEAK * BOLTZMANN * 1000)
    expect((peak * 1000) / 0.289777195518517).toBeCloseTo(1, 12)
    expect(perWavelength(peak * 0.999)).toBeLessThan(perWavelength(peak))
    expect(perWavelength(peak * 1.001)).toBeLessThan(perWavelength(peak))
  })

  it('is safe at both ends', () => {
    expect(planckNu(1e20, 10)).toBe(0)
    expect(planckNu(0, 10)).toBe(0)
    expect(planckNu(1e12, 0)).toBe(0)
    // Rayleigh-Jeans 2 nu^2 k T / c^2; the next term is x / 2 = 2.4e-12
    const rayleighJeans = (2 * 1e4 * BOLTZMANN * 1e5) / LIGHT_SPEED ** 2
    expect(planckNu(100, 1e5) / rayleighJeans).toBeCloseTo(1, 12)
    // x / (e^x - 1) at x = 0.01, from its Bernoulli series 1 - x/2 + x^2/12 - x^4/720
    const nu = (0.01 * BOLTZMANN * 300) / PLANCK
    expect(planckNu(nu, 300) / ((2 * nu * nu * BOLTZMANN * 300) / LIGHT_SPEED ** 2)).toBeCloseTo(0.995008333319, 12)
  })

  it('integrates to sigma T^4 / pi, its derivative to 4 sigma T^3 / pi', () => {
    // sigma T^4 at 5772 K, CODATA 2018: 6.29385924703e10 erg/s/cm2
    const scale = (BOLTZMANN * 5772) / PLANCK
    const total = integrate((nu) => planckNu(nu, 5772), 0, 90 * scale)
    expect((Math.PI * total) / 6.29385924703e10).toBeCloseTo(1, 9)
    const derivative = integrate((nu) => planckNuDerivative(nu, 5772), 0, 90 * scale)
    expect((Math.PI * derivative) / (4 * STEFAN_BOLTZMANN * 5772 ** 3)).toBeCloseTo(1, 9)
  })
})

describe('planckNuDerivative', () => {
  it('is the slope of planckNu in temperature', () => {
    for (const [nu, temperature] of [
      [1e10, 300],
      [1e13, 100],
      [3e14, 1500],
      [3e14, 300]
    ]) {
      const step = 1e-5 * temperature
      const slope = (planckNu(nu, temperature + step) - planckNu(nu, temperature - step)) / (2 * step)
      expect(planckNuDerivative(nu, temperature) / slope).toBeCloseTo(1, 6)
    }
    expect(planckNuDerivative(1e20, 10)).toBe(0)
  })
})
