import { type Column, parseCsvTable } from '../scene/csv-table.js'
import { SceneError } from '../scene/error.js'
import { increasing, inOrder, wavelengthColumn } from '../scene/tables.js'
import { dimensions } from '../units/dimension.js'

/** A response at increasing wavelengths (cm). */
export interface ResponseTable {
  wavelength: Float64Array
  response: Float64Array
}

/** Reads the response of a band: columns wavelength and response, in any scale. `shownAs` names the file in errors. */
export function parseResponse(text: string, _file: string, shownAs: string): ResponseTable {
  const response: Column = { name: 'response', refuse: (value) => (value >= 0 ? undefined : 'must not be negative') }
  const table = parseCsvTable(text, shownAs, [wavelengthColumn, response])
  const order = increasing(table, shownAs)
  const values = inOrder(table, 'response', order)
  if (values.every((value) => value === 0))
    throw new SceneError([{ location: { file: shownAs, line: 1, column: 1 }, key: '', message: 'every value of the table is 0' }])
  return { wavelength: inOrder(table, 'wavelength', order), response: values }
}

/** Reads baselines: columns east and north, lengths. */
export function parseBaselines(text: string, _file: string, shownAs: string): [number, number][] {
  const units = Object.fromEntries(
    ['m', 'km', 'cm'].map((unit) => [unit, (value: number) => value * (dimensions.length.units as Record<string, number>)[unit]])
  )
  const column = (name: string): Column => ({ name, units, refuse: () => undefined })
  const { columns } = parseCsvTable(text, shownAs, [column('east'), column('north')])
  const north = columns.get('north')!
  return Array.from(columns.get('east')!, (east, i) => [east, north[i]])
}
