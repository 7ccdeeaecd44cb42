import { shortNumber, superscript } from './numbers.js'

/** Marks of an axis: labelled ones, unlabelled ones, and the power of ten taken out of the labels. */
export interface Ticks {
  major: { value: number; label: string }[]
  minor: number[]
  /** Labels times 10^exponent are values; 0 where labels are values. */
  exponent: number
}

/** Marks of a linear axis from `low` to `high` (low < high), about `count` labelled ones at 1, 2 or 5 times a power of ten. */
export function linearTicks(low: number, high: number, count: number): Ticks {
  const step = niceStep((high - low) / count)
  const largest = Math.max(Math.abs(low), Math.abs(high))
  const exponent = largest >= 1e5 || largest < 1e-2 ? Math.floor(Math.log10(largest)) : 0
  const decimals = Math.max(0, exponent - Math.floor(Math.log10(step) + 1e-9))
  const major = multiples(low, high, step).map((value) => ({
    value,
    label: (value / 10 ** exponent)
      .toFixed(decimals)
      .replace(/^-(?=0(\.0*)?$)/, '')
      .replace('-', '−')
  }))
  return { major, minor: multiples(low, high, step / 5), exponent }
}

/** Fewest labels of a logarithmic axis that stand at decades or at fixed parts of them, and labels aimed at otherwise. */
const fewest = 3
const linearCount = 7

/** Marks of a logarithmic axis between two positive values: decades, their parts where decades are few, or equal steps. */
export function logTicks(low: number, high: number, most = 8): Ticks {
  const first = Math.floor(Math.log10(low) + 1e-9)
  const last = Math.ceil(Math.log10(high) - 1e-9)
  const inside = (value: number): boolean => value >= low * (1 - 1e-9) && value <= high * (1 + 1e-9)
  const of = (mantissas: number[]): number[] => {
    const values: number[] = []
    for (let decade = first; decade <= last; decade++) {
      for (const mantissa of mantissas) values.push(Number(`${mantissa}e${decade}`))
    }
    return values.filter(inside)
  }
  const minor = of([1, 2, 3, 4, 5, 6, 7, 8, 9])
  const decades = of([1])
  const step = Math.ceil(decades.length / most)
  const choices = [decades.filter((_, i) => i % step === 0), of([1, 3]), of([1, 2, 5])]
  const parts = choices.find((values) => values.length >= fewest)
  const values = parts ?? multiples(low, high, niceStep((high - low) / linearCount))
  return {
    major: values.map((value) => ({ value, label: shortNumber(value) })),
    minor: last - first > 12 ? [] : minor,
    exponent: 0
  }
}

/** The unit of an axis together with the power of ten that its labels leave out. */
export function scaledUnit(unit: string, exponent: number): string {
  return exponent === 0 ? unit : `10${superscript(exponent)} ${unit}`
}

/** The largest of 1, 2, 5 times a power of ten that is not above `value`. */
export function niceBelow(value: number): number {
  const power = 10 ** Math.floor(Math.log10(value) + 1e-9)
  const mantissa = [5, 2, 1].find((m) => m * power <= value * (1 + 1e-9)) ?? 1
  return mantissa * power
}

function niceStep(value: number): number {
  const below = niceBelow(value)
  return below >= value * (1 - 1e-9) ? below : niceBelow(below * 2.5)
}

/** More marks than this are no use; where values differ by rounding alone, there would be no end of them. */
const mostMarks = 1000

function multiples(low: number, high: number, step: number): number[] {
  const first = Math.ceil(low / step - 1e-9)
  const count = Math.floor(high / step + 1e-9) - first + 1
  return count >= 0 && count <= mostMarks ? Array.from({ length: count }, (_, i) => (first + i) * step) : []
}
