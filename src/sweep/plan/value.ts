import { canonicalUnit } from '../../units/dimension.js'
import { numeral } from '../../units/numeral.js'

/** A value of a model as the table holds it: a number in the unit of its column, or text. */
export type Value = number | string

const pattern = new RegExp(String.raw`^\s*(${numeral})\s*(.*?)\s*$`, 'su')

/** A scalar of a plan or scene as a number and its unit (empty without); undefined for text that begins with no number. */
export function numberWithUnit(written: unknown): { number: number; unit: string } | undefined {
  if (typeof written === 'number') return { number: written, unit: '' }
  const match = typeof written === 'string' ? pattern.exec(written) : null
  return match ? { number: Number(match[1]), unit: canonicalUnit(match[2]) } : undefined
}

/** A value as a scene file has it. */
export function inScene(value: Value, unit: string): Value {
  return unit === '' || typeof value === 'string' ? value : `${value} ${unit}`
}

/** A computed number without the dust of rounding, so that tables read well; what is rounded is what is run. */
export function tidy(value: number): number {
  return Number(value.toPrecision(12))
}
