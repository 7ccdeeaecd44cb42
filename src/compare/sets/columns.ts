import type { EcsvTable } from '../../data/ecsv.js'
import { numbersIn } from '../../data/table.js'
import type { Refuse } from '../../observe/observe-run.js'
import { wavelengthColumn } from '../../scene/tables.js'
import { canonicalUnit, dimensions } from '../../units/dimension.js'
import { fluxUnit, fluxUnits } from '../../units/flux.js'
import { intensityUnit, intensityUnits } from '../../units/intensity.js'
import type { SpectralUnit } from '../../units/spectral-unit.js'
import { unitLike } from '../measured-picture.js'

const astropyNames: Record<string, string> = { Angstrom: 'angstrom', AA: 'angstrom', micron: 'um' }

/** A column in cgs by a table of units. */
export function columnIn(
  table: EcsvTable,
  name: string,
  units: Record<string, (value: number) => number>,
  refuse: Refuse
): Float64Array {
  const { values, unit } = numbersIn(table, name)
  const known = units[astropyNames[unit] ?? canonicalUnit(unit)]
  if (known) return values.map(known)
  return refuse('file', wrongUnit(table, name, unit, Object.keys(units)))
}

function wrongUnit({ file }: EcsvTable, name: string, unit: string, accepted: string[]): string {
  const fault = unit === '' ? `the column ${name} has no unit` : `the unit of the column ${name} is ${unit}`
  return `${file}: ${fault}; accepted: ${accepted.join(', ')}`
}

/** Wavelengths of the rows, cm, from wavelengths or frequencies. */
export function wavelengthsIn(table: EcsvTable, refuse: Refuse): Float64Array {
  const wavelengths = columnIn(table, 'wavelength', wavelengthColumn.units!, refuse)
  wavelengths.forEach((wavelength, row) => {
    if (!(wavelength > 0)) refuse('file', `${table.file}: row ${row + 1}: a wavelength greater than 0 is expected`)
  })
  return wavelengths
}

const scaled = (units: Record<string, number>) =>
  Object.fromEntries(Object.entries(units).map(([unit, size]) => [unit, (value: number) => value * size]))

export const lengthUnits = scaled(dimensions.length.units)
export const angleUnits = scaled(dimensions.angle.units)

/** The unit of a column of flux densities, or of intensities. */
export function fluxUnitOf(table: EcsvTable, name: string, refuse: Refuse): SpectralUnit<{ frequencyHz: number }> {
  return unitOf(table, name, fluxUnits.map(fluxUnit), refuse)
}

export function intensityUnitOf(table: EcsvTable, name: string, refuse: Refuse) {
  return unitOf(table, name, intensityUnits.map(intensityUnit), refuse)
}

function unitOf<Context>(table: EcsvTable, name: string, units: SpectralUnit<Context>[], refuse: Refuse) {
  const { unit } = numbersIn(table, name)
  const known = unitLike(unit, units)
  if (known) return known
  const names = units.map((one) => one.name)
  return refuse('file', wrongUnit(table, name, unit, names))
}

/** 1 sigma of the rows, none negative or 0, in their own unit. */
export function errorsOf(table: EcsvTable, name: string, refuse: Refuse): Float64Array {
  const { values } = numbersIn(table, name)
  const wrong = values.findIndex((value) => value <= 0)
  if (wrong >= 0) refuse('file', `${table.file}: row ${wrong + 1}: ${name} is ${values[wrong]}; it must be greater than 0`)
  return values
}

/** Rows that say they are upper limits: a column `limit` of 0 and 1, or of true and false. */
export function limitsOf({ columns, file }: EcsvTable, rows: number, refuse: Refuse): Uint8Array {
  const values = columns.get('limit')?.values
  return Uint8Array.from({ length: rows }, (_, row) => {
    const cell = String(values?.[row] ?? '').toLowerCase()
    if (['', '0', 'nan', 'false'].includes(cell)) return 0
    if (['1', 'true'].includes(cell)) return 1
    return refuse('file', `${file}: row ${row + 1}: limit is \`${cell}\`; 1 (an upper limit) or 0 is expected`)
  })
}

/** Texts of a column; none where there is no such column. */
export function textsOf({ columns }: EcsvTable, name: string): string[] | undefined {
  const values = columns.get(name)?.values
  return values && Array.from<number | string, string>(values, String)
}
