import type { WrittenValues } from './plan-schema.js'
import { numberWithUnit, tidy, type Value } from './value.js'

/** The values that one path takes. */
export type Axis = { unit: string } & (
  | { kind: 'list'; values: Value[] }
  | { kind: 'range'; from: number; to: number; count?: number; log: boolean }
)

interface Refusal {
  /** Below the entry of `vary`. */
  path: (string | number)[]
  problem: string
}

/** The axis that an entry of `vary` describes. */
export function readAxis(written: WrittenValues): Axis | Refusal {
  if (Array.isArray(written)) return listAxis(written)
  const [from, to] = [numberWithUnit(written.from), numberWithUnit(written.to)]
  if (!from) return { path: ['from'], problem: 'a number, with its unit if it has one, is expected' }
  if (!to) return { path: ['to'], problem: 'a number, with its unit if it has one, is expected' }
  if (from.unit !== to.unit)
    return { path: ['to'], problem: `write both ends in the same unit; \`from\` is in ${unitWord(from.unit)}` }
  if (from.number === to.number) return { path: ['to'], problem: 'must differ from `from`' }
  const log = written.spacing === 'log'
  if (log && !(from.number > 0 && to.number > 0))
    return { path: ['spacing'], problem: 'logarithmic spacing needs both ends above 0' }
  const { count } = written
  return { kind: 'range', unit: from.unit, from: from.number, to: to.number, ...(count !== undefined && { count }), log }
}

function listAxis(written: Value[]): Axis | Refusal {
  const read = written.map(numberWithUnit)
  const numeric = read.filter((value) => value !== undefined)
  const repeated = written.findIndex((value, i) => written.indexOf(value) < i)
  if (repeated >= 0) return { path: [repeated], problem: 'the same value is given twice' }
  if (numeric.length === 0) return { kind: 'list', unit: '', values: written }
  const text = read.indexOf(undefined)
  if (text >= 0) return { path: [text], problem: 'a list holds numbers or text, not both' }
  const other = numeric.findIndex(({ unit }) => unit !== numeric[0].unit)
  if (other >= 0)
    return { path: [other], problem: `write all values in the same unit; the first is in ${unitWord(numeric[0].unit)}` }
  return { kind: 'list', unit: numeric[0].unit, values: numeric.map(({ number }) => number) }
}

function unitWord(unit: string): string {
  return unit === '' ? 'no unit' : unit
}

/** The values of an axis on a grid; a range has its `count`. */
export function gridValues(axis: Axis): Value[] {
  if (axis.kind === 'list') return axis.values
  const count = axis.count!
  return Array.from({ length: count }, (_, i) => valueAt(axis, i / (count - 1)))
}

/** The value at a share (0 to 1) of an axis; a list is cut into equal pieces. */
export function valueAt(axis: Axis, share: number): Value {
  if (axis.kind === 'list') return axis.values[Math.min(axis.values.length - 1, Math.floor(share * axis.values.length))]
  const { from, to, log } = axis
  if (share === 0 || share === 1) return share === 0 ? from : to
  return tidy(log ? from * (to / from) ** share : from + (to - from) * share)
}
