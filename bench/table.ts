import { median } from '../src/math/stats.js'
import type { Measure } from './case.js'

/** A measure with its statistics, as it goes into the table and the file. */
export interface Row extends Measure {
  case: string
  median: number
  lowest: number
  highest: number
  /** Absent without a target. */
  met?: boolean
}

export function rowOf(name: string, measure: Measure): Row {
  const { values, target } = measure
  const middle = median(values)
  return {
    case: name,
    ...measure,
    median: middle,
    lowest: Math.min(...values),
    highest: Math.max(...values),
    ...(target && { met: 'atLeast' in target ? middle >= target.atLeast : middle <= target.atMost })
  }
}

const number = (value: number) =>
  value !== 0 && (Math.abs(value) >= 1e5 || Math.abs(value) < 1e-3)
    ? value.toExponential(2)
    : String(Number(value.toPrecision(4)))

/** Lines of text: quantity, median with lowest and highest, and the target with a word on it. */
export function tableLines(rows: Row[]): string[] {
  const cells = rows.map(({ quantity, unit, median: middle, lowest, highest, target, met }) => [
    quantity,
    number(middle),
    unit,
    `${number(lowest)} to ${number(highest)}`,
    target
      ? `${'atLeast' in target ? `>= ${number(target.atLeast)}` : `<= ${number(target.atMost)}`} ${met ? 'met' : 'missed'}`
      : ''
  ])
  const widths = [0, 1, 2, 3].map((k) => Math.max(...cells.map((row) => row[k].length)))
  return cells.map((row) =>
    `  ${row.map((cell, k) => (k === 1 ? cell.padStart(widths[k]) : cell.padEnd(widths[k] ?? 0))).join('  ')}`.trimEnd()
  )
}
