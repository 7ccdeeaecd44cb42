import { type Column, parseCsvTable } from '../../scene/csv-table.js'
import { canonicalUnit } from '../../units/dimension.js'

/** Models of a table of the user's. */
export interface DesignTable {
  /** One a column: its path into the scene, and unit. */
  columns: { path: string; unit: string }[]
  rows: number[][]
  /** Line of the file on which each row stands. */
  lines: number[]
}

/** Reads comma-separated models: headings are `path [unit]`, values numbers. Throws SceneError. */
export function parseDesignTable(text: string, file: string): DesignTable {
  const header = text.split(/\r\n|\n|\r/).find((line) => line.replace(/#.*/, '').trim() !== '') ?? ''
  const columns = header
    .replace(/^\ufeff/, '')
    .replace(/#.*/, '')
    .split(',')
    .map((cell) => {
      const [, path = '', unit = ''] = /^\s*([^[\]]*?)\s*(?:\[([^[\]]*)\])?\s*$/.exec(cell) ?? []
      return { path, unit: canonicalUnit(unit.trim()) }
    })
  const accepted = columns.map(
    ({ path, unit }): Column => ({
      name: path,
      ...(unit !== '' && { units: { [unit]: (value: number) => value } }),
      refuse: () => undefined
    })
  )
  const table = parseCsvTable(text, file, accepted)
  const values = columns.map(({ path }) => table.columns.get(path)!)
  return { columns, rows: table.lines.map((_, row) => values.map((column) => column[row])), lines: table.lines }
}
