import { LIGHT_SPEED } from '../units/constants.js'
import { dimensions } from '../units/dimension.js'
import { fluxUnit, fluxUnits } from '../units/flux.js'
import { intensityUnit } from '../units/intensity.js'
import { type Column, type CsvTable, parseCsvTable } from './csv-table.js'
import { SceneError } from './error.js'
import type { OpacityTable, SpectrumTable } from './types.js'

const scaled = (units: Record<string, number>): Column['units'] =>
  Object.fromEntries(Object.entries(units).map(([unit, size]) => [unit, (value: number) => value * size]))

const wavelength: Column = {
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

const notNegative = (value: number) => (value >= 0 ? undefined : 'must not be negative')
const opacityUnits = scaled(dimensions.opacity.units)

const opacityColumns: Column[] = [
  wavelength,
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

/** Only the shape of a spectrum counts, so intensities and fluxes serve alike. */
const fluxNuUnits = {
  ...Object.fromEntries(
    fluxUnits
      .filter((unit) => unit.endsWith('Jy') || unit.endsWith('/Hz'))
      .map((unit) => [unit, (value: number) => fluxUnit(unit).toCgs(value, { frequencyHz: 1 })])
  ),
  ...Object.fromEntries(
    ['erg/s/cm2/Hz/sr', 'W/m2/Hz/sr', 'MJy/sr', 'Jy/sr'].map((unit) => [
      unit,
      (value: number) => intensityUnit(unit).toCgs(value, { frequencyHz: 1, pixelSr: 1 })
    ])
  )
}
/** Per centimetre of wavelength. */
const fluxLambdaUnits = scaled({ 'W/m2/um': 1e7, 'erg/s/cm2/angstrom': 1e8 })

/** Reads the shape of a stellar spectrum: wavelength and one of flux-nu and flux-lambda. `shownAs` names the file in errors. */
export function parseSpectrumTable(text: string, file: string, shownAs: string): SpectrumTable {
  const perWavelength = /^[^#\n]*\bflux-lambda\b/m.test(text)
  const flux = perWavelength ? 'flux-lambda' : 'flux-nu'
  const units = perWavelength ? fluxLambdaUnits : fluxNuUnits
  const table = parseCsvTable(text, shownAs, [wavelength, { name: flux, units, refuse: notNegative }])
  const order = increasing(table, shownAs)
  const sorted = inOrder(table, 'wavelength', order)
  const values = inOrder(table, flux, order)
  if (values.every((value) => value === 0)) throw allZero(shownAs)
  const fluxNu = perWavelength ? values.map((value, i) => (value * sorted[i] ** 2) / LIGHT_SPEED) : values
  return { file, wavelength: sorted, fluxNu }
}

/** Row numbers in the order of increasing wavelength. */
function increasing({ columns, lines }: CsvTable, file: string): number[] {
  const wavelengths = columns.get('wavelength')!
  const order = lines.map((_, i) => i).sort((a, b) => wavelengths[a] - wavelengths[b])
  for (let i = 1; i < order.length; i++) {
    if (wavelengths[order[i]] > wavelengths[order[i - 1]]) continue
    const [first, second] = [lines[order[i - 1]], lines[order[i]]].sort((a, b) => a - b)
    const message = `the wavelength of line ${first} is given again`
    throw new SceneError([{ location: { file, line: second, column: 1 }, key: 'wavelength', message }])
  }
  return order
}

function inOrder({ columns }: CsvTable, name: string, order: number[]): Float64Array {
  const values = columns.get(name)!
  return Float64Array.from(order, (row) => values[row])
}

function allZero(file: string): SceneError {
  return new SceneError([{ location: { file, line: 1, column: 1 }, key: '', message: 'every value of the table is 0' }])
}
