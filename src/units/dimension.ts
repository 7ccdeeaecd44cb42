import { ARCMINUTE, ARCSECOND, DEGREE, MILLIARCSECOND } from './angles.js'
import * as constants from './constants.js'

interface DimensionSpec {
  /** With its article, for messages. */
  called: string
  example: string
  /** Size of each unit in cgs (rad for angles). */
  units: Record<string, number>
  /** Magnitudes (cgs) outside this range, zero aside, can only be slips of the pen. */
  range: [number, number]
}

const wavelengthUnits = { um: 1e-4, nm: 1e-7, mm: 0.1, cm: 1, m: 100, angstrom: 1e-8 }

/** The kinds of quantity a scene file holds, with every unit it accepts. */
export const dimensions = {
  length: {
    called: 'a length',
    example: '5 au',
    units: {
      au: constants.AU,
      Rsun: constants.SOLAR_RADIUS,
      Rearth: constants.EARTH_RADIUS,
      pc: constants.PARSEC,
      kpc: 1e3 * constants.PARSEC,
      km: 1e5,
      ...wavelengthUnits
    },
    range: [1e-9, 1e30]
  },
  wavelength: { called: 'a wavelength', example: '2.2 um', units: wavelengthUnits, range: [1e-9, 1e5] },
  frequency: {
    called: 'a frequency',
    example: '230 GHz',
    units: { Hz: 1, kHz: 1e3, MHz: 1e6, GHz: 1e9, THz: 1e12 },
    range: [3e5, 3e19]
  },
  wavenumber: {
    called: 'a wavenumber',
    example: '930 cm-1',
    units: { 'cm-1': 1, 'um-1': 1e4, 'm-1': 0.01 },
    range: [1e-5, 1e9]
  },
  angle: {
    called: 'an angle',
    example: '35 deg',
    units: { deg: DEGREE, arcmin: ARCMINUTE, arcsec: ARCSECOND, mas: MILLIARCSECOND, rad: 1 },
    range: [1e-20, 100]
  },
  mass: {
    called: 'a mass',
    example: '1e-4 Msun',
    units: { Msun: constants.SOLAR_MASS, Mjup: constants.JUPITER_MASS, Mearth: constants.EARTH_MASS, g: 1, kg: 1e3 },
    range: [1e-20, 1e60]
  },
  luminosity: {
    called: 'a luminosity',
    example: '6000 Lsun',
    units: { Lsun: constants.SOLAR_LUMINOSITY, 'erg/s': 1, W: 1e7 },
    range: [1, 1e60]
  },
  time: { called: 'a time', example: '300 s', units: { s: 1, min: 60, h: 3600 }, range: [1e-12, 1e12] },
  temperature: { called: 'a temperature', example: '2800 K', units: { K: 1 }, range: [1e-3, 1e9] },
  density: {
    called: 'a mass density',
    example: '1e-18 g/cm3',
    units: { 'g/cm3': 1, 'kg/m3': 1e-3 },
    range: [1e-60, 1e3]
  },
  opacity: {
    called: 'an opacity',
    example: '2.3 cm2/g',
    units: { 'cm2/g': 1, 'm2/kg': 10 },
    range: [1e-30, 1e20]
  }
} satisfies Record<string, DimensionSpec>

export type Dimension = keyof typeof dimensions

/** A unit as written, in the spelling of the tables here: `micron` and `µm` become `um`, `Å` becomes `angstrom`. */
export function canonicalUnit(unit: string): string {
  return unit
    .normalize('NFKC') // one code point each for micro (U+03BC) and angstrom (U+00C5)
    .replace('\u03bc', 'u')
    .replace('\u00c5', 'angstrom')
    .replace(/\bmicron\b/, 'um')
}

/** All spellings of a unit of the tables here. */
export function spellings(unit: string): string[] {
  if (unit === 'um') return ['um', 'micron', '\u00b5m', '\u03bcm']
  return unit === 'angstrom' ? ['angstrom', '\u00c5', '\u212b'] : [unit]
}
