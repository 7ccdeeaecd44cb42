import { type EcsvTable, parseEcsv } from './ecsv.js'
import { DataError } from './error.js'

/**
 * The table in a text: ECSV where it begins as such, otherwise comma-separated values below a header of `name [unit]`, where `#`
 * begins a comment; a column is one of numbers when all its cells are, an empty cell is no number. Throws a DataError.
 */
export function parseTable(text: string, file: string): EcsvTable {
  if (text.startsWith('# %ECSV')) return parseEcsv(text, file)
  const rows = text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\n|\r/)
    .map((line) => line.replace(/#.*/, ''))
    .filter((line) => line.trim() !== '')
    .map((line) => line.split(',').map((cell) => cell.trim()))
  const head = rows.shift()
  if (!head || rows.length === 0) throw new DataError(file, 'holds no table: a header of `name [unit]` and rows are expected')
  const odd = rows.findIndex((row) => row.length !== head.length)
  if (odd >= 0) throw new DataError(file, `row ${odd + 1} has ${rows[odd].length} values; ${head.length} are expected`)
  const columns = head.map((title, i) => {
    const [, name = title, unit] = /^([^[\]]*?)\s*(?:\[\s*([^[\]]*?)\s*\])?$/.exec(title) ?? []
    const texts = rows.map((row) => row[i])
    const numbers = texts.map((cell) => (cell === '' ? Number.NaN : Number(cell)))
    const sound = numbers.every((number, row) => !Number.isNaN(number) || texts[row] === '' || /^nan$/i.test(texts[row]))
    return [name, { ...(unit && { unit }), values: sound ? Float64Array.from(numbers) : texts }] as const
  })
  return { file, columns: new Map(columns), meta: {} }
}

/** The values of a column with its unit. Throws a DataError where it is absent, or names the first cell that is no number. */
export function numbersIn({ file, columns }: EcsvTable, name: string): { values: Float64Array; unit: string } {
  const column = columns.get(name)
  if (!column) throw new DataError(file, `has no column ${name}; there are ${[...columns.keys()].join(', ')}`)
  const { values, unit = '' } = column
  if (values instanceof Float64Array) return { values, unit }
  const odd = values.findIndex((cell) => cell !== '' && Number.isNaN(Number(cell)))
  throw new DataError(file, `row ${odd + 1}: ${name} is \`${values[odd]}\`; a number is expected`)
}
