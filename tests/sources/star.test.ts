import { describe, expect, it } from 'vitest'
import { planckNu } from '../../src/dust/planck.js'
import { integrate } from '../../src/math/quadrature.js'
import type { StarSpec } from '../../src/scene/types.js'
import { starSpectrum } from '../../src/sources/star.js'
import { LIGHT_SPEED, SOLAR_LUMINOSITY, SOLAR_RADIUS, STEFAN_BOLTZMANN } from '../../src/units/constants.js'

const radius = 300 * SOLAR_RADIUS
const giant: StarSpec = {
  name: 'giant',
  kind: 'star',
  temperature: 2800,
  luminosity: 4 * Math.PI * radius ** 2 * STEFAN_BOLTZMANN * 2800 ** 4,
  radius,
  at: [0, 0, 0],
  extent: 'sphere',
  limbDarkening: 0,
  spectrum: { kind: 'blackbody' }
}

function tabulated(wavelengthUm: number[], fluxNu: number[]): StarSpec {
  const wavelength = Float64Array.from(wavelengthUm, (um) => um * 1e-4)
  return { ...giant, spectrum: { kind: 'table', table: { file: 'made-up.csv', wavelength, fluxNu: Float64Array.from(fluxNu) } } }
}

/** Integral of L_nu over ln(nu) between two wavelengths (cm). */
function luminosityBetween(spec: StarSpec, shortest: number, longest: number): number {
  const { luminosityNu } = starSpectrum(spec)
  return integrate(
    (x) => Math.exp(x) * luminosityNu(Math.exp(x)),
    Math.log(LIGHT_SPEED / longest),
    Math.log(LIGHT_SPEED / shortest)
  )
}

describe('blackbody star', () => {
  it('shines with 4 pi R^2 pi B_nu, its luminosity in all', () => {
    const star = starSpectrum(giant)
    for (const nu of [1e12, 1e14, 5e14]) {
      expect(star.luminosityNu(nu) / (4 * Math.PI ** 2 * radius ** 2 * planckNu(nu, 2800))).toBeCloseTo(1, 12)
    }
    expect(luminosityBetween(giant, ...star.range) / giant.luminosity).toBeCloseTo(1, 8)
  })

  it('of solar radius and luminosity has the solar irradiance of 1361 W/m2 at 1 au', () => {
    // IAU 2015 Resolution B3 nominal values (Prsa et al. 2016, AJ 152, 41); 1361.166 W/m2 from L / 4 pi au^2
    const temperature = (SOLAR_LUMINOSITY / (4 * Math.PI * SOLAR_RADIUS ** 2 * STEFAN_BOLTZMANN)) ** 0.25
    expect(temperature).toBeCloseTo(5772.003, 3)
    const sun = { ...giant, temperature, luminosity: SOLAR_LUMINOSITY, radius: SOLAR_RADIUS }
    const flux = luminosityBetween(sun, ...starSpectrum(sun).range) / (4 * Math.PI * 1.495978707e13 ** 2)
    expect(flux / 1e3).toBeCloseTo(1361.166465, 4)
  })
})

describe('surface of a star', () => {
  it('without limb darkening has the intensity of the blackbody at every angle', () => {
    const star = starSpectrum(giant)
    for (const mu of [0.01, 0.5, 1]) expect(star.intensityNu(2e14, mu) / planckNu(2e14, 2800)).toBeCloseTo(1, 12)
  })

  it('with limb darkening u falls to 1 - u at the limb and keeps the flux', () => {
    for (const u of [0.3, 0.6, 1]) {
      const star = starSpectrum({ ...giant, limbDarkening: u })
      const flux = 2 * Math.PI * integrate((mu) => mu * star.intensityNu(2e14, mu), 0, 1)
      expect((flux * 4 * Math.PI * radius ** 2) / star.luminosityNu(2e14)).toBeCloseTo(1, 12)
      expect(star.intensityNu(2e14, 0) / star.intensityNu(2e14, 1)).toBeCloseTo(1 - u, 12)
    }
  })
})

describe('tabulated star', () => {
  it('of a flat spectrum has L / (nu2 - nu1) between its ends and nothing beyond', () => {
    const star = starSpectrum(tabulated([0.5, 0.9, 2], [7, 7, 7]))
    const width = LIGHT_SPEED / 0.5e-4 - LIGHT_SPEED / 2e-4
    expect((star.luminosityNu(LIGHT_SPEED / 1e-4) * width) / giant.luminosity).toBeCloseTo(1, 9)
    expect(star.luminosityNu(LIGHT_SPEED / 0.49e-4)).toBe(0)
    expect(star.luminosityNu(LIGHT_SPEED / 2.01e-4)).toBe(0)
  })

  it('of two rows far apart follows the power law between them', () => {
    // L_nu ~ wavelength^-2 ~ nu^2: L = C (nu2^3 - nu1^3) / 3
    const star = starSpectrum(tabulated([0.1, 1000], [1e8, 1]))
    const [nu1, nu2] = [LIGHT_SPEED / 0.1, LIGHT_SPEED / 1e-5]
    const scale = (3 * giant.luminosity) / (nu2 ** 3 - nu1 ** 3)
    for (const nu of [1e12, 1e14, 1e15]) expect(star.luminosityNu(nu) / (scale * nu * nu)).toBeCloseTo(1, 8)
  })

  it('sampled from a blackbody is that blackbody', () => {
    const wavelengthUm = Array.from({ length: 600 }, (_, i) => 0.15 * 2e4 ** (i / 599))
    const star = starSpectrum(
      tabulated(
        wavelengthUm,
        wavelengthUm.map((um) => planckNu(LIGHT_SPEED / (um * 1e-4), 2800))
      )
    )
    // rows 1.7 % apart: log-log chords lie below the curve by at most (0.0167)^2 x / 8
    for (const um of [0.4, 1.13, 10.1]) {
      const nu = LIGHT_SPEED / (um * 1e-4)
      expect(star.luminosityNu(nu) / starSpectrum(giant).luminosityNu(nu)).toBeCloseTo(1, 3)
    }
  })
})
