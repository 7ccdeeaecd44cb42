import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { LIGHT_SPEED } from '../../src/units/constants.js'
import { type Dimension, dimensions } from '../../src/units/dimension.js'
import { parsePercentage } from '../../src/units/fraction.js'
import { formatQuantity, parseQuantity, QuantityError, quantityPattern } from '../../src/units/quantity.js'
import { askPython, astropy, itWith } from '../support/python.js'

const names = Object.keys(dimensions) as Dimension[]

describe('parseQuantity', () => {
  test.each([
    ['2.2 um', 'wavelength', 2.2e-4],
    ['2.2um', 'wavelength', 2.2e-4],
    ['2.2 micron', 'wavelength', 2.2e-4],
    ['2.2 \u00b5m', 'wavelength', 2.2e-4],
    ['2.2 \u03bcm', 'wavelength', 2.2e-4],
    ['5500 \u00c5', 'wavelength', 5.5e-5],
    ['5500 \u212b', 'wavelength', 5.5e-5],
    ['5500 A\u030a', 'wavelength', 5.5e-5],
    ['5500 angstrom', 'wavelength', 5.5e-5],
    ['  +.5 au ', 'length', 0.5 * 1.495978707e13],
    ['-3e2 km', 'length', -3e7],
    ['300 GHz', 'wavelength', LIGHT_SPEED / 3e11],
    ['180 deg', 'angle', Math.PI],
    ['1 m2/kg', 'opacity', 10],
    ['1 kg/m3', 'density', 1e-3],
    ['1 W', 'luminosity', 1e7]
  ] as const)('%s', (text, dimension, value) => {
    expect(parseQuantity(text, dimension).value / value).toBeCloseTo(1, 14)
  })

  test('the unit decides between dimensions', () => {
    expect(parseQuantity('12 arcsec', 'angle', 'length').dimension).toBe('angle')
    expect(parseQuantity('12 au', 'angle', 'length').dimension).toBe('length')
    expect(parseQuantity('230 GHz', 'wavelength').dimension).toBe('wavelength')
    expect(parseQuantity('230 GHz', 'frequency').value).toBe(2.3e11)
  })

  test.each([
    ['5', /the unit is missing; accepted: a length such as `5 au` \(units: au, Rsun/],
    ['5 Lsun', /`Lsun` is a unit of luminosity; accepted: a length/],
    ['5 AU', /`AU` is not a unit known here; did you mean `au`\?/],
    ['5 parsec', /`parsec` is not a unit known here; accepted/],
    ['au', /not a number with a unit/],
    ['', /not a number with a unit/],
    ['1_000 au', /`_000 au` is not a unit/],
    ['1,5 au', /not a unit/],
    ['0x10 au', /not a unit/],
    ['NaN au', /not a number/],
    ['1e400 au', /absurd/],
    ['1e40 pc', /absurd/],
    ['5 toString', /not a unit/],
    ['5 au\n au', /not a unit/]
  ])('refuses %j', (text, message) => {
    expect(() => parseQuantity(text, 'length')).toThrow(QuantityError)
    expect(() => parseQuantity(text, 'length')).toThrow(message)
  })

  test('a frequency of 0 or less is no wavelength', () => {
    expect(() => parseQuantity('0 GHz', 'wavelength')).toThrow(/positive/)
    expect(() => parseQuantity('-230 GHz', 'wavelength')).toThrow(/positive/)
  })

  itWith(astropy, 'every unit against astropy.units', () => {
    const cgs: Record<string, string> = {
      length: 'cm',
      wavelength: 'cm',
      frequency: 'Hz',
      angle: 'rad',
      mass: 'g',
      luminosity: 'erg/s',
      temperature: 'K',
      density: 'g/cm3',
      opacity: 'cm2/g',
      wavenumber: 'cm-1',
      time: 's'
    }
    const pairs = names.flatMap((name) => Object.keys(dimensions[name].units).map((unit) => [name, unit, cgs[name]]))
    const theirs = askPython<number[]>(
      `from astropy import units as u
u.set_enabled_aliases({'Mjup': u.M_jup, 'Mearth': u.M_earth, 'Rearth': u.R_earth})
answer = [u.Unit(unit).to(u.Unit(cgs)) for _, unit, cgs in data]`,
      pairs
    )
    expect(theirs).toHaveLength(pairs.length)
    pairs.forEach(([name, unit], i) => {
      const number = name === 'frequency' ? 3e12 / theirs[i] : 3
      expect(parseQuantity(`${number} ${unit}`, name as Dimension).value / (number * theirs[i]), unit).toBeCloseTo(1, 13)
    })
  })
})

const positive = fc.double({ min: 1e-3, max: 1e6, noNaN: true })
const dimensionAndUnit = fc
  .constantFrom(...names)
  .chain((name) => fc.constantFrom(...Object.keys(dimensions[name].units)).map((unit) => [name, unit] as const))

describe('formatQuantity', () => {
  test.each([
    [1.3 * 0.1, 'wavelength', '1.3 mm'],
    [LIGHT_SPEED / 230e9, 'wavelength', '230 GHz'],
    [0, 'length', '0 au'],
    [Math.PI, 'angle', '180 deg'],
    [1.5e-18, 'density', '1.5e-18 g/cm3']
  ] as const)('%d as %s', (value, dimension, text) => {
    expect(formatQuantity(value, dimension)).toBe(text)
  })

  test('is read back as exactly the same value, and matches the pattern for editors', () => {
    fc.assert(
      fc.property(dimensionAndUnit, positive, ([name, unit], number) => {
        const size = (dimensions[name].units as Record<string, number>)[unit]
        const [least, most] = dimensions[name].range
        fc.pre(number * size >= least && number * size <= most)
        const { value } = parseQuantity(`${number} ${unit}`, name)
        const text = formatQuantity(value, name)
        expect(parseQuantity(text, name).value).toBe(value)
        expect(text).toMatch(new RegExp(quantityPattern([name])))
      }),
      { seed: 1, numRuns: 1000 }
    )
  })

  test('is never longer than what the user wrote', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 9999 }), fc.constantFrom('um', 'mm', 'nm'), (number, unit) => {
        const text = formatQuantity(parseQuantity(`${number} ${unit}`, 'wavelength').value, 'wavelength')
        expect(text.split(' ')[0].length).toBeLessThanOrEqual(String(number).length)
      }),
      { seed: 2 }
    )
  })
})

describe('parsePercentage', () => {
  test('reads percentages and nothing else', () => {
    expect(parsePercentage('2 %')).toBe(0.02)
    expect(parsePercentage('2%')).toBe(0.02)
    expect(parsePercentage('-1.5e1 %')).toBe(-0.15)
    for (const text of ['2', '%', '2 % %', 'x %', '']) expect(parsePercentage(text)).toBeUndefined()
  })
})
