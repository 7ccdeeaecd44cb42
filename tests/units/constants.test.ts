import { describe, expect, test } from 'vitest'
import { ARCSECOND, SQUARE_ARCSECOND } from '../../src/units/angles.js'
import * as constants from '../../src/units/constants.js'
import { askPython, astropy, itWith } from '../support/python.js'

describe('constants', () => {
  test('derived values', () => {
    // CODATA 2018 prints 5.670374419e-8 W/m2/K4 (exact digits, cut short); recalled from memory.
    expect(constants.STEFAN_BOLTZMANN / 5.670374419e-5).toBeCloseTo(1, 9)
    // IAU 2015 B2: 648000/pi au = 3.0856775814913673e16 m.
    expect(constants.PARSEC / 3.085677581491367e18).toBeCloseTo(1, 14)
    // IAU 2015 B3 nominal GM over CODATA 2018 G: 1.9884098707e30 kg.
    expect(constants.SOLAR_MASS / 1.9884098707e33).toBeCloseTo(1, 10)
    // Effective temperature of the nominal Sun, 5772 K to the digits IAU 2015 B3 gives; 5772.003429 K from L and R.
    const { SOLAR_LUMINOSITY, SOLAR_RADIUS, STEFAN_BOLTZMANN } = constants
    expect((SOLAR_LUMINOSITY / (4 * Math.PI * SOLAR_RADIUS ** 2 * STEFAN_BOLTZMANN)) ** 0.25).toBeCloseTo(5772.003429, 6)
    // Nominal total solar irradiance (IAU 2015 B3): 1361 W/m2; 1361.166465 from L and au.
    expect((SOLAR_LUMINOSITY / (4 * Math.PI * constants.AU ** 2)) * 1e-3).toBeCloseTo(1361.166465, 6)
  })

  test('arc seconds', () => {
    // Common practice: pi/648000 rad; the square is 2.35044305390979e-11 sr.
    expect(ARCSECOND).toBeCloseTo(4.84813681109536e-6, 18)
    expect(SQUARE_ARCSECOND).toBeCloseTo(2.35044305390979e-11, 24)
  })

  itWith(astropy, 'against astropy.constants', () => {
    const theirs = askPython<Record<string, number>>(
      `from astropy import constants as c, units as u
answer = {
  'LIGHT_SPEED': c.c.cgs.value, 'PLANCK': c.h.cgs.value, 'BOLTZMANN': c.k_B.cgs.value, 'STEFAN_BOLTZMANN': c.sigma_sb.cgs.value,
  'AU': c.au.cgs.value, 'PARSEC': c.pc.cgs.value, 'SOLAR_RADIUS': c.R_sun.cgs.value, 'SOLAR_LUMINOSITY': c.L_sun.cgs.value,
  'SOLAR_MASS': c.M_sun.cgs.value, 'JUPITER_MASS': c.M_jup.cgs.value, 'EARTH_MASS': c.M_earth.cgs.value,
  'EARTH_RADIUS': c.R_earth.cgs.value, 'JANSKY': u.Jy.to('erg / (s cm2 Hz)'), 'AB_ZERO_FLUX': (1 * u.AB).to('erg / (s cm2 Hz)').value }`,
      null
    )
    for (const [name, value] of Object.entries(theirs)) {
      const ours = (constants as Record<string, number>)[name]
      // sigma is printed to ten digits in astropy's tables; all others agree to rounding.
      expect(ours / value, name).toBeCloseTo(1, name === 'STEFAN_BOLTZMANN' ? 9 : 13)
    }
  })
})
