import { z } from 'zod'
import { closest } from '../../units/closest.js'
import { canonicalUnit } from '../../units/dimension.js'
import { parsePercentage, percentagePattern } from '../../units/fraction.js'

/** A section whose keys are all known; the message for an unknown key lists those accepted (see `issueProblems`). */
export function section<Shape extends z.ZodRawShape>(shape: Shape) {
  return z.strictObject(shape, {
    error: (issue) => (issue.code === 'unrecognized_keys' ? Object.keys(shape).join(', ') : undefined)
  })
}

interface Range {
  from?: number
  above?: number
  to?: number
  below?: number
}

/** A dimensionless number in a range, or a percentage. */
export function real(range: Range) {
  const { from = Number.NEGATIVE_INFINITY, above = Number.NEGATIVE_INFINITY } = range
  const { to = Number.POSITIVE_INFINITY, below = Number.POSITIVE_INFINITY } = range
  const limits = Object.entries(range).map(([word, limit]) => `${word} ${limit}`)
  const message = `a number ${limits.join(' ').replace(' below', ' and below')} is expected, without a unit`
  const percentage = z
    .string()
    .meta({ pattern: percentagePattern })
    .transform((text, context) => {
      const value = parsePercentage(text)
      if (value !== undefined) return value
      context.issues.push({ code: 'invalid_format', format: 'percentage', message, input: text })
      return z.NEVER
    })
  return z
    .union([z.number(), percentage], { error: () => message })
    .refine((value) => value >= from && value > above && value <= to && value < below, { error: () => message })
}

/** A whole number from `least` to `most`. */
export function count(least: number, most: number) {
  return z
    .int({ error: () => `a whole number from ${least} to ${most} is expected` })
    .min(least)
    .max(most)
}

/** Names become parts of file names. */
export const name = z
  .string()
  .max(64)
  .regex(/^[A-Za-z0-9][A-Za-z0-9._-]*$/, {
    error: () => 'a name holds letters, digits and . _ - and begins with a letter or digit (it becomes part of a file name)'
  })

/** Free text; a bare number is taken as its digits. */
export const text = z.union([z.string(), z.number().transform(String)], { error: () => 'text is expected' })

/** Name of a data file, relative to the folder of the scene file. */
export const dataFile = z.string().min(1).max(4096)

/** One of the units of a list, in any accepted spelling. */
export function unitName(accepted: readonly string[], refused: Record<string, string> = {}) {
  return z
    .string()
    .transform((written, context) => {
      const unit = canonicalUnit(written)
      if (accepted.includes(unit) && !refused[unit]) return unit
      const meant = closest(unit, accepted)
      const hint = meant ? `; did you mean \`${meant}\`?` : ''
      const usable = accepted.filter((candidate) => !refused[candidate]).join(', ')
      const message = refused[unit] ?? `not a unit accepted here${hint}`
      context.issues.push({ code: 'custom', message: `${message}; accepted: ${usable}`, input: written })
      return z.NEVER
    })
    .meta({ enum: accepted.filter((candidate) => !refused[candidate]) })
}
