import type { TableColumn } from './table-column.js'

/** A column; `unit` in a notation that astropy reads (`um`, `Jy`, `W m-2 Hz-1`). */
export interface EcsvColumn {
  name: string
  unit?: string
  description?: string
  /** Default: `text` for texts, otherwise `number`. */
  kind?: TableColumn['kind']
  values: ArrayLike<number | string | number[]>
}

/**
 * A table in Enhanced Character-Separated Values 1.0 (Astropy Proposal for Enhancement 6): a YAML header in comment
 * lines, the column names, one row a line. Columns have the same length. Numbers read back as the same doubles, lists as arrays.
 */
export function ecsv(columns: EcsvColumn[], meta: Record<string, string | number>): string {
  return [...ecsvPieces(columns, meta)].join('')
}

/** Rows of a piece. */
const PIECE = 1000

/** The same in pieces, for tables longer than one text can be. */
export function* ecsvPieces(columns: EcsvColumn[], meta: Record<string, string | number>): Generator<string> {
  const quote = (text: string): string => JSON.stringify(text)
  const header = [
    '%ECSV 1.0',
    '---',
    'datatype:',
    ...columns.map(({ name, unit, description, values, kind = typeof values[0] === 'string' ? 'text' : 'number' }) => {
      const parts = [`name: ${quote(name)}`, `datatype: ${datatypes[kind]}`]
      if (kind === 'list') parts.push(`subtype: 'float64[${commonLength(values as ArrayLike<number[]>)}]'`)
      if (unit) parts.splice(1, 0, `unit: ${quote(unit)}`)
      if (description) parts.push(`description: ${quote(description)}`)
      return `- {${parts.join(', ')}}`
    }),
    `meta: {${Object.entries(meta)
      .map(([key, value]) => `${quote(key)}: ${typeof value === 'string' ? quote(value) : value}`)
      .join(', ')}}`,
    'schema: astropy-2.0'
  ]
  yield `${[...header.map((line) => `# ${line}`), columns.map(({ name }) => field(name)).join(' ')].join('\n')}\n`
  const count = columns[0].values.length
  for (let first = 0; first < count; first += PIECE) {
    let piece = ''
    for (let row = first; row < Math.min(count, first + PIECE); row++)
      piece += `${columns.map(({ values }) => cellText(values[row])).join(' ')}\n`
    yield piece
  }
}

const datatypes = { number: 'float64', integer: 'int64', text: 'string', list: 'string' } as const

/** Length that all lists have, or `null`, as the format writes lists of several lengths. */
function commonLength(lists: ArrayLike<number[]>): string {
  const length = lists[0]?.length
  return length > 0 && Array.from(lists).every((list) => list.length === length) ? String(length) : 'null'
}

function cellText(value: number | string | number[]): string {
  if (typeof value === 'number') return numberText(value)
  if (typeof value === 'string') return field(value.replace(/\s+/g, ' '))
  // Lists are JSON, with the words of JavaScript for what JSON has no number for, as astropy reads them.
  return `[${value.map((number) => (Number.isNaN(number) ? 'NaN' : String(number))).join(',')}]`
}

function numberText(value: number): string {
  if (Number.isNaN(value)) return 'nan'
  return Number.isFinite(value) ? String(value) : value > 0 ? 'inf' : '-inf'
}

function field(name: string): string {
  return name === '' || /[\s"]/.test(name) ? `"${name.replaceAll('"', '""')}"` : name
}
