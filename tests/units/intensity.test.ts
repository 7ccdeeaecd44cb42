import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { ARCSECOND, SQUARE_ARCSECOND } from '../../src/units/angles.js'
import { type IntensityContext, intensityUnit, intensityUnits } from '../../src/units/intensity.js'
import { askPython, astropy, itWith } from '../support/python.js'

const context: IntensityContext = { frequencyHz: 230e9, pixelSr: SQUARE_ARCSECOND / 100, beamSr: 2.66326360329e-11 }
const MJY = 1e-17

/** Solid angle of a Gaussian beam, pi/(4 ln 2) bmaj bmin (common practice). */
const beam = (major: number, minor: number) => (Math.PI / (4 * Math.LN2)) * major * minor * ARCSECOND ** 2

describe('intensity units', () => {
  test.each([
    // Jansky is 1e-26 W/m2/Hz by definition; the solid angle of a square arc second is (pi/648000)^2 sr.
    ['MJy/sr', 1, 1],
    ['Jy/sr', 1, 1e6],
    ['mJy/arcsec2', 1, 0.0235044305390979],
    ['W/m2/Hz/sr', 1, 1e-20],
    ['erg/s/cm2/Hz/sr', 1, 1e-17],
    // m = -2.5 lg f - 48.60 (Oke & Gunn 1983): 1 MJy/sr is 20.4721256659 mag/arcsec2.
    ['mag/arcsec2', 1, 20.4721256659]
  ])('%s of %d MJy/sr', (name, value, expected) => {
    expect(intensityUnit(name).fromCgs(value * MJY, context) / expected).toBeCloseTo(1, 11)
  })

  test('Jy/beam and brightness temperature of a 1 arcsec beam', () => {
    // Computed with astropy 5.2.1 (beam_angular_area, brightness_temperature), to the digits given.
    const one = { ...context, beamSr: beam(1, 1) }
    expect(one.beamSr).toBeCloseTo(2.66326360329e-11, 21)
    const intensity = intensityUnit('Jy/beam').toCgs(1, one)
    expect(intensity / MJY).toBeCloseTo(37547.9167276, 6)
    expect(intensityUnit('K').fromCgs(intensity, one)).toBeCloseTo(23.1024639651, 9)
    expect(intensityUnit('K').fromCgs(intensity, { ...one, frequencyHz: 345e9 })).toBeCloseTo(10.2677617623, 9)
    const wide = intensityUnit('Jy/beam').toCgs(1, { ...context, beamSr: beam(2, 1) })
    expect(wide / MJY).toBeCloseTo(18773.9583638, 6)
  })

  test('Jy/beam without a beam is refused', () => {
    expect(() => intensityUnit('Jy/beam').fromCgs(1, { frequencyHz: 1e12, pixelSr: 1 })).toThrow(RangeError)
  })

  test('magnitudes: nothing shines, sigma by its derivative', () => {
    const unit = intensityUnit('mag/arcsec2')
    expect(unit.fromCgs(0, context)).toBeNaN()
    expect(unit.fromCgs(-1, context)).toBeNaN()
    expect(unit.sigmaFromCgs(0, 1, context)).toBeNaN()
    const step = 1e-6
    const numerical = (unit.fromCgs(MJY * (1 - step), context) - unit.fromCgs(MJY * (1 + step), context)) / (2 * step)
    expect(unit.sigmaFromCgs(MJY, 0.01 * MJY, context)).toBeCloseTo(0.01 * numerical, 9)
  })

  test('to cgs and back, sigma like a small difference', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...intensityUnits),
        fc.double({ min: -25, max: -5, noNaN: true }),
        fc.double({ min: 9, max: 16, noNaN: true }),
        (name, lgIntensity, lgFrequency) => {
          const unit = intensityUnit(name)
          const at = { ...context, frequencyHz: 10 ** lgFrequency }
          const intensity = 10 ** lgIntensity
          expect(unit.toCgs(unit.fromCgs(intensity, at), at) / intensity).toBeCloseTo(1, 10)
          const difference = Math.abs(unit.fromCgs(intensity * 1.00001, at) - unit.fromCgs(intensity, at))
          expect(unit.sigmaFromCgs(intensity, intensity * 1e-5, at) / difference).toBeCloseTo(1, 4)
        }
      ),
      { seed: 3 }
    )
  })

  itWith(astropy, 'against astropy.units, and FITS unit strings it reads', () => {
    const cases = intensityUnits.map((name) => ({ name, fits: intensityUnit(name).fits }))
    const theirs = askPython<{ value: number; fits: string }[]>(
      `from astropy import units as u
import numpy as np
warnings.simplefilter('error')
I = 3e-15 * u.erg / u.s / u.cm**2 / u.Hz / u.sr
pix = data['pixelSr'] * u.sr; beam = data['beamSr'] * u.sr; nu = data['frequencyHz'] * u.Hz
answer = []
for case in data['cases']:
    unit = u.Unit(case['fits'], format='fits')
    if case['name'] == 'K': value = I.to(u.K, u.brightness_temperature(nu)).value
    elif case['name'] == 'mag/arcsec2': value = (I * u.arcsec**2).to(u.ABmag).value
    elif case['name'].endswith('/beam'): value = (I * beam / u.beam).to(unit).value
    elif case['name'].endswith('/pixel'): value = (I * pix / u.pix).to(unit).value
    else: value = I.to(unit).value
    answer.append({'value': value, 'fits': unit.to_string()})`,
      { ...context, cases }
    )
    expect(theirs).toHaveLength(15)
    cases.forEach(({ name }, i) => {
      expect(intensityUnit(name).fromCgs(3e-15, context) / theirs[i].value, name).toBeCloseTo(1, 12)
    })
  })
})
