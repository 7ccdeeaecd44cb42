import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { JANSKY, LIGHT_SPEED } from '../../src/units/constants.js'
import { fluxUnit, fluxUnits } from '../../src/units/flux.js'
import { askPython, astropy, itWith } from '../support/python.js'

const green = { frequencyHz: LIGHT_SPEED / 5500e-8 }

describe('flux units', () => {
  test('1 Jy at 5500 angstrom', () => {
    // synphot 1.1.1, units.convert_flux: 9.910494479e-13 erg/s/cm2/angstrom; m_AB = 8.9000.
    expect(fluxUnit('erg/s/cm2/angstrom').fromCgs(JANSKY, green) / 9.910494479e-13).toBeCloseTo(1, 9)
    expect(fluxUnit('mag').fromCgs(JANSKY, green)).toBeCloseTo(8.9, 10)
    // 1 erg/s/cm2/angstrom = 1e-7 J x 1e4 / 1e-4 um = 10 W/m2/um, by the prefixes alone.
    expect(fluxUnit('W/m2/um').fromCgs(JANSKY, green) / 9.910494479e-12).toBeCloseTo(1, 9)
  })

  test('nu F_nu of 1 Jy at 100 um', () => {
    // nu I_nu of 1 MJy/sr at 100 um is 2.99792458e-8 W/m2/sr by definition, so a millionth of it for 1 Jy.
    const context = { frequencyHz: LIGHT_SPEED / 1e-2 }
    expect(fluxUnit('W/m2').fromCgs(JANSKY, context) / 2.99792458e-14).toBeCloseTo(1, 12)
    expect(fluxUnit('erg/s/cm2').fromCgs(JANSKY, context) / 2.99792458e-11).toBeCloseTo(1, 12)
  })

  test('to cgs and back', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...fluxUnits),
        fc.double({ min: -40, max: -10, noNaN: true }),
        fc.double({ min: 9, max: 16, noNaN: true }),
        (name, lgFlux, lgFrequency) => {
          const context = { frequencyHz: 10 ** lgFrequency }
          const unit = fluxUnit(name)
          expect(unit.toCgs(unit.fromCgs(10 ** lgFlux, context), context) / 10 ** lgFlux).toBeCloseTo(1, 10)
          if (name !== 'mag') expect(unit.sigmaFromCgs(1, 10 ** lgFlux, context)).toBe(unit.fromCgs(10 ** lgFlux, context))
          const sigma = 0.1 * 10 ** lgFlux
          expect(unit.sigmaToCgs(10 ** lgFlux, unit.sigmaFromCgs(10 ** lgFlux, sigma, context), context) / sigma).toBeCloseTo(
            1,
            12
          )
        }
      ),
      { seed: 4 }
    )
  })

  test('sigma of a magnitude', () => {
    expect(fluxUnit('mag').sigmaFromCgs(1e-23, 1e-24, green)).toBeCloseTo(0.10857362047581294, 14) // 0.25/ln 10, by hand
    expect(fluxUnit('mag').sigmaFromCgs(0, 1e-24, green)).toBeNaN()
  })

  test('an unknown name', () => {
    expect(() => fluxUnit('Jy/beam')).toThrow(RangeError)
  })

  itWith(astropy, 'against astropy.units, and FITS unit strings it reads', () => {
    const cases = fluxUnits.map((name) => ({ name, fits: fluxUnit(name).fits }))
    const theirs = askPython<number[]>(
      `from astropy import units as u
warnings.simplefilter('error')
nu = data['frequencyHz'] * u.Hz
F = 3e-25 * u.erg / u.s / u.cm**2 / u.Hz
answer = []
for case in data['cases']:
    unit = u.Unit(case['fits'], format='fits')
    if case['name'] == 'mag': answer.append(F.to(u.ABmag).value)
    elif case['name'] in ('W/m2', 'erg/s/cm2'): answer.append((nu * F).to(unit).value)
    else: answer.append(F.to(unit, u.spectral_density(nu)).value)`,
      { ...green, cases }
    )
    cases.forEach(({ name }, i) => {
      expect(fluxUnit(name).fromCgs(3e-25, green) / theirs[i], name).toBeCloseTo(1, 12)
    })
    expect(theirs).toHaveLength(10)
  })
})
