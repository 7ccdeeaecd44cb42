import { closest } from './closest.js'
import { LIGHT_SPEED } from './constants.js'
import { canonicalUnit, type Dimension, dimensions, spellings } from './dimension.js'
import { numeral } from './numeral.js'

/** A number with a unit, read. */
export interface Quantity {
  dimension: Dimension
  /** In cgs; rad for angles. */
  value: number
  /** The number and unit as written (unit in its plain spelling). */
  number: number
  unit: string
}

/** Text that is not the quantity wanted; the message says what is accepted. */
export class QuantityError extends Error {
  constructor(
    message: string,
    /** False for text that does not even begin with a number. */
    readonly hasNumber = true
  ) {
    super(message)
  }
}

const pattern = new RegExp(String.raw`^(${numeral})\s*(.*)$`, 'su')

/**
 * Reads text such as `2.2 um`. Of several dimensions accepted, the unit decides; where a wavelength is accepted a frequency
 * is too, and is converted. Throws a QuantityError.
 */
export function parseQuantity(text: string, ...accepted: Dimension[]): Quantity {
  const match = pattern.exec(text.trim())
  if (!match) throw new QuantityError(`not a number with a unit; accepted: ${describeDimensions(accepted)}`, false)
  const number = Number(match[1])
  const unit = canonicalUnit(match[2])
  if (unit === '') throw new QuantityError(`the unit is missing; accepted: ${describeDimensions(accepted)}`)
  const dimension = withFrequency(accepted).find((candidate) => Object.hasOwn(dimensions[candidate].units, unit))
  if (!dimension) throw new QuantityError(wrongUnit(match[2], accepted))
  const size = sizeOf(dimension, unit)
  if (!isSensible(number * size, dimension)) throw new QuantityError(`the value is absurd for ${dimensions[dimension].called}`)
  if (dimension !== 'frequency' || accepted.includes('frequency')) return { dimension, value: number * size, number, unit }
  if (number <= 0) throw new QuantityError('a frequency must be positive')
  return { dimension: 'wavelength', value: LIGHT_SPEED / (number * size), number, unit }
}

/** Regular expression (JSON Schema dialect) of the texts that `parseQuantity` may accept. */
export function quantityPattern(accepted: readonly Dimension[]): string {
  const units = withFrequency(accepted).flatMap((dimension) => Object.keys(dimensions[dimension].units))
  return String.raw`^\s*${numeral}\s*(${units.flatMap(spellings).join('|')})\s*$`
}

/** What is accepted, for messages: "a length such as `5 au` (units: au, Rsun, ...)". */
export function describeDimensions(accepted: readonly Dimension[]): string {
  return accepted
    .map((dimension) => {
      const units = withFrequency([dimension]).flatMap((name) => Object.keys(dimensions[name].units))
      return `${dimensions[dimension].called} such as \`${dimensions[dimension].example}\` (units: ${units.join(', ')})`
    })
    .join(', or ')
}

/**
 * The text with the shortest number that `parseQuantity` reads back as exactly this value; of equally short ones, the unit
 * listed first. There always is one: every dimension has its cgs unit.
 */
export function formatQuantity(value: number, dimension: Dimension): string {
  let best: { number: string; unit: string } | undefined
  for (const unit of withFrequency([dimension]).flatMap((name) => Object.keys(dimensions[name].units))) {
    const number = exactNumber(value, dimension, unit)
    if (number && (!best || number.length < best.number.length)) best = { number, unit }
  }
  return `${best!.number} ${best!.unit}`
}

function exactNumber(value: number, dimension: Dimension, unit: string): string | undefined {
  const inFrequency = !Object.hasOwn(dimensions[dimension].units, unit)
  const size = sizeOf(inFrequency ? 'frequency' : dimension, unit)
  const number = inFrequency ? LIGHT_SPEED / value / size : value / size
  for (let digits = 1; digits <= 17; digits++) {
    const shortest = Number(number.toPrecision(digits))
    const back = inFrequency ? LIGHT_SPEED / (shortest * size) : shortest * size
    if (back === value) return String(shortest)
  }
  return undefined
}

function withFrequency(accepted: readonly Dimension[]): Dimension[] {
  return accepted.includes('wavelength') ? [...accepted, 'frequency'] : [...accepted]
}

function sizeOf(dimension: Dimension, unit: string): number {
  return (dimensions[dimension].units as Record<string, number>)[unit]
}

function isSensible(value: number, dimension: Dimension): boolean {
  const [least, most] = dimensions[dimension].range
  const size = Math.abs(value)
  return value === 0 || (size >= least && size <= most)
}

function wrongUnit(unit: string, accepted: Dimension[]): string {
  const owner = Object.values(dimensions).find((candidate) => Object.hasOwn(candidate.units, canonicalUnit(unit)))
  const known = withFrequency(accepted).flatMap((dimension) => Object.keys(dimensions[dimension].units))
  const meant = closest(unit, known)
  const hint = meant ? `; did you mean \`${meant}\`?` : ''
  const what = owner
    ? `\`${unit}\` is a unit of ${owner.called.replace(/^an? /, '')}`
    : `\`${unit}\` is not a unit known here${hint}`
  return `${what}; accepted: ${describeDimensions(accepted)}`
}
