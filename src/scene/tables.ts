import { LIGHT_SPEED } from '../units/constants.js'
import { dimensions } from '../units/dimension.js'
import { fluxUnit, fluxUnits } from '../units/flux.js'
import { intensityUnit } from '../units/intensity.js'
import { type Column, type CsvTable, parseCsvTable } from './csv-table.js'
import { SceneError } from './error.js'
import { scaled } from './scaled-units.js'
import type { ConstantsTable, IntensityTable, OpacityTable, SpectrumTable } from './types.js'

/** A column of wavelengths or frequencies. */
export const wavelengthColumn: Column = {
  name: 'wavelength',
  units: {
    ...scaled(dimensions.wavelength.units),
    ...Object.fromEntries(
      Object.entries(dimensions.frequency.units).map(([unit, size]) => [unit, (value: number) => LIGHT_SPEED / (value * size)])
    )
  },
  refuse: (value) => {
    const [least, most] = dimensions.wavelength.range
    return value >= least && value <= most ? undefined : 'a wavelength greater than 0 and of sensible size is expected'
  }
}

/** Stands for the wavelength where the header says so. */
const wavenumber: Column = {
  name: 'wavenumber',
  units: Object.fromEntries(
    Object.entries(dimensions.wavenumber.units).map(([unit, size]) => [unit, (value: number) => 1 / (value * size)])
  ),
  refuse: (value) => wavelengthColumn.refuse(value) && 'a wavenumber greater than 0 and of sensible size is expected'
}

const notNegative = (value: number) => (value >= 0 ? undefined : 'must not be negative')
const opacityUnits = scaled(dimensions.opacity.units)

const opacityColumns: Column[] = [
  wavelengthColumn,
  { name: 'absorption', units: opacityUnits, refuse: notNegative },
  { name: 'scattering', units: opacityUnits, refuse: notNegative },
  {
    name: 'asymmetry',
    optional: true,
    refuse: (value) => (Math.abs(value) < 1 ? undefined : 'must be greater than -1 and less than 1')
  }
]

/** Reads optical properties: wavelength, absorption, scattering, asymmetry (default 0). `shownAs` names the file in errors. */
export function parseOpacityTable(text: string, file: string, shownAs: string): OpacityTable {
  const table = parseCsvTable(text, shownAs, opacityColumns)
  const order = increasing(table, shownAs)
  const [absorption, scattering] = ['absorption', 'scattering'].map((name) => inOrder(table, name, order))
  if (absorption.every((value, i) => value + scattering[i] === 0)) throw allZero(shownAs)
  const asymmetry = table.columns.has('asymmetry') ? inOrder(table, 'asymmetry', order) : new Float64Array(order.length)
  return { file, wavelength: inOrder(table, 'wavelength', order), absorption, scattering, asymmetry }
}

const intensityNuUnits = Object.fromEntries(
  ['erg/s/cm2/Hz/sr', 'W/m2/Hz/sr', 'MJy/sr', 'Jy/sr'].map((unit) => [
    unit,
    (value: number) => intensityUnit(unit).toCgs(value, { frequencyHz: 1, pixelSr: 1 })
  ])
)
/** Per centimetre of wavelength. */
const intensityLambdaUnits = scaled({ 'W/m2/um/sr': 1e7, 'erg/s/cm2/um/sr': 1e4, 'erg/s/cm2/angstrom/sr': 1e8 })

/** Only the shape of a spectrum counts, so intensities and fluxes serve alike. */
const fluxNuUnits = {
  ...Object.fromEntries(
    fluxUnits
      .filter((unit) => unit.endsWith('Jy') || unit.endsWith('/Hz'))
      .map((unit) => [unit, (value: number) => fluxUnit(unit).toCgs(value, { frequencyHz: 1 })])
  ),
  ...intensityNuUnits
}
/** Per centimetre of wavelength. */
const fluxLambdaUnits = scaled({ 'W/m2/um': 1e7, 'erg/s/cm2/angstrom': 1e8 })

/** Reads the shape of a stellar spectrum: wavelength and one of flux-nu and flux-lambda. `shownAs` names the file in errors. */
export function parseSpectrumTable(text: string, file: string, shownAs: string): SpectrumTable {
  const { wavelength, perHz } = parseSpectral(text, shownAs, 'flux', fluxNuUnits, fluxLambdaUnits)
  return { file, wavelength, fluxNu: perHz }
}

/** Reads an intensity: wavelength and one of intensity-nu and intensity-lambda. `shownAs` names the file in errors. */
export function parseIntensityTable(text: string, file: string, shownAs: string): IntensityTable {
  const { wavelength, perHz } = parseSpectral(text, shownAs, 'intensity', intensityNuUnits, intensityLambdaUnits)
  return { file, wavelength, intensityNu: perHz }
}

/** A column `<name>-nu`, or `<name>-lambda` turned into values per Hz, by increasing wavelength. */
function parseSpectral(text: string, shownAs: string, name: string, nuUnits: Column['units'], lambdaUnits: Column['units']) {
  const perWavelength = new RegExp(`^[^#\\n]*\\b${name}-lambda\\b`, 'm').test(text)
  const key = perWavelength ? `${name}-lambda` : `${name}-nu`
  const units = perWavelength ? lambdaUnits : nuUnits
  const table = parseCsvTable(text, shownAs, [wavelengthColumn, { name: key, units: units!, refuse: notNegative }])
  const order = increasing(table, shownAs)
  const sorted = inOrder(table, 'wavelength', order)
  const values = inOrder(table, key, order)
  if (values.every((value) => value === 0)) throw allZero(shownAs)
  return { wavelength: sorted, perHz: perWavelength ? values.map((value, i) => (value * sorted[i] ** 2) / LIGHT_SPEED) : values }
}

/** Reads optical constants: wavelength or wavenumber, n and k, rising or falling throughout. `shownAs` names the file in errors. */
export function parseConstantsTable(text: string, file: string, shownAs: string): ConstantsTable {
  const place = /^[^#\n]*\bwavenumber\b/m.test(text) ? wavenumber : wavelengthColumn
  const table = parseCsvTable(text, shownAs, [place, { name: 'n', refuse: notNegative }, { name: 'k', refuse: notNegative }])
  const order = inTurn(table, place.name, shownAs)
  const [n, k] = ['n', 'k'].map((name) => inOrder(table, name, order))
  const nothing = order.find((row) => table.columns.get('n')![row] === 0 && table.columns.get('k')![row] === 0)
  if (nothing !== undefined) throw atLine(shownAs, table.lines[nothing], 'n', 'n and k cannot both be 0')
  return { file, wavelength: inOrder(table, place.name, order), n, k }
}

/** Reads a size distribution: radius, and grains per unit of radius. `shownAs` names the file in errors. */
export function parseSizesTable(text: string, file: string, shownAs: string) {
  const table = parseCsvTable(text, shownAs, [
    {
      name: 'radius',
      units: scaled(dimensions.wavelength.units),
      refuse: (value) => (value > 0 ? undefined : 'must be greater than 0')
    },
    { name: 'number', refuse: notNegative }
  ])
  const order = inTurn(table, 'radius', shownAs)
  const number = inOrder(table, 'number', order)
  if (number.every((value) => value === 0)) throw allZero(shownAs)
  return { file, radius: inOrder(table, 'radius', order), number }
}

/** Row numbers in increasing order of a column that rises or falls throughout, as it must. */
function inTurn({ columns, lines }: CsvTable, name: string, file: string): number[] {
  const values = columns.get(name)!
  const rising = values[1] > values[0]
  for (let i = 1; i < values.length; i++) {
    if (values[i] === values[i - 1]) throw atLine(file, lines[i], name, `the ${name} of line ${lines[i - 1]} is given again`)
    if (values[i] > values[i - 1] !== rising)
      throw atLine(file, lines[i], name, `the rows must be in order of ${name}; this one turns back`)
  }
  const rows = lines.map((_, i) => i)
  return rising ? rows : rows.reverse()
}

/** Row numbers in the order of increasing wavelength. */
export function increasing({ columns, lines }: CsvTable, file: string): number[] {
  const wavelengths = columns.get('wavelength')!
  const order = lines.map((_, i) => i).sort((a, b) => wavelengths[a] - wavelengths[b])
  for (let i = 1; i < order.length; i++) {
    if (wavelengths[order[i]] > wavelengths[order[i - 1]]) continue
    const [first, second] = [lines[order[i - 1]], lines[order[i]]].sort((a, b) => a - b)
    throw atLine(file, second, 'wavelength', `the wavelength of line ${first} is given again`)
  }
  return order
}

/** The values of a column, in that order of rows. */
export function inOrder({ columns }: CsvTable, name: string, order: number[]): Float64Array {
  const values = columns.get(name)!
  return Float64Array.from(order, (row) => values[row])
}

function allZero(file: string): SceneError {
  return atLine(file, 1, '', 'every value of the table is 0')
}

function atLine(file: string, line: number, key: string, message: string): SceneError {
  return new SceneError([{ location: { file, line, column: 1 }, key, message }])
}
