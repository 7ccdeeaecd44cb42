import { canonicalUnit } from '../units/dimension.js'
import { numeral } from '../units/numeral.js'
import { SceneError, type SceneProblem } from './error.js'

/** A column that a table may hold. */
export interface Column {
  name: string
  /** Accepted units and how a value in each is turned into cgs; absent for a dimensionless column. */
  units?: Record<string, (value: number) => number>
  optional?: true
  /** What is wrong with a value (cgs), if anything. */
  refuse: (value: number) => string | undefined
}

/** Columns read, in cgs, and the line of the file each row stands on. */
export interface CsvTable {
  columns: Map<string, Float64Array>
  lines: number[]
}

interface Cell {
  text: string
  line: number
  column: number
}

const wholeNumeral = new RegExp(`^${numeral}$`)
const heading = /^([^[\]]*?)\s*(?:\[([^[\]]*)\])?$/

/**
 * Reads comma-separated values with one header line of `name [unit]` in any order; `#` begins a comment. Throws a SceneError
 * that lists every problem (the first thirty) by line and column of `file`.
 */
export function parseCsvTable(text: string, file: string, accepted: readonly Column[]): CsvTable {
  const problems: SceneProblem[] = []
  const report = (cell: Cell, key: string, message: string) => {
    const location = { file, line: cell.line, column: cell.column }
    problems.push({ location, key, ...(cell.text && { given: cell.text }), message })
  }
  const rows = splitRows(text)
  const header = rows.shift()
  if (!header) throw new SceneError([{ location: { file, line: 1, column: 1 }, key: '', message: 'the table is empty' }])
  const found = header.map((cell) => readHeading(cell, accepted, report))
  const names = found.map((column) => column?.name)
  header.forEach((cell, i) => {
    if (names[i] !== undefined && names.indexOf(names[i]) < i) report(cell, names[i], 'the column is given twice')
  })
  for (const { name, optional, units } of accepted)
    if (!optional && !header.some((cell) => heading.exec(cell.text)?.[1] === name))
      report(
        { ...header[0], text: '' },
        name,
        `the column is missing from the header${units ? `; write it as ${headingOf(name, units)}` : ''}`
      )

  const columns = new Map(
    accepted.filter(({ name }) => names.includes(name)).map(({ name }) => [name, new Float64Array(rows.length)])
  )
  rows.forEach((row, r) => {
    if (row.length !== header.length)
      report({ ...row[0], text: '' }, 'row', `${header.length} values are expected, as in the header; there are ${row.length}`)
    else
      row.forEach((cell, i) => {
        const column = found[i]
        if (!column) return
        const value = wholeNumeral.test(cell.text) ? column.toCgs(Number(cell.text)) : Number.NaN
        const message = Number.isFinite(value) ? column.refuse(value) : 'a number is expected'
        if (message) report(cell, column.name, message)
        columns.get(column.name)![r] = value
      })
  })
  if (rows.length < 2) report({ ...header[0], text: '' }, 'rows', `at least 2 rows are expected; there are ${rows.length}`)
  if (problems.length > 0) throw new SceneError(problems.slice(0, 30))
  return { columns, lines: rows.map((row) => row[0].line) }
}

/** `name [first unit]`, as a hint. */
function headingOf(name: string, units: Record<string, unknown>): string {
  return `\`${name} [${Object.keys(units)[0]}]\``
}

function splitRows(text: string): Cell[][] {
  const rows: Cell[][] = []
  text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\n|\r/)
    .forEach((whole, i) => {
      const content = whole.replace(/#.*/, '')
      if (content.trim() === '') return
      let offset = 0
      rows.push(
        content.split(',').map((part) => {
          const cell = { text: part.trim(), line: i + 1, column: offset + 1 + part.length - part.trimStart().length }
          offset += part.length + 1
          return cell
        })
      )
    })
  return rows
}

function readHeading(cell: Cell, accepted: readonly Column[], report: (cell: Cell, key: string, message: string) => void) {
  const [, name = cell.text, written] = heading.exec(cell.text) ?? []
  const column = accepted.find((candidate) => candidate.name === name)
  const key = name || 'header'
  if (!column) {
    const list = accepted.map((candidate) => candidate.name).join(', ')
    report(cell, key, `not a column of this table; accepted: ${list}`)
    return undefined
  }
  if (!column.units) {
    if (written?.trim()) report(cell, key, 'this column has no unit')
    return { name, refuse: column.refuse, toCgs: (value: number) => value }
  }
  const unit = canonicalUnit(written?.trim() ?? '')
  if (!Object.hasOwn(column.units, unit)) {
    const fault = unit === '' ? 'the unit is missing' : 'the unit is not accepted here'
    report(cell, key, `${fault}; write it as ${headingOf(name, column.units)}; units: ${Object.keys(column.units).join(', ')}`)
    return undefined
  }
  return { name, refuse: column.refuse, toCgs: column.units[unit] }
}
