import { z } from 'zod'
import { closest } from '../../units/closest.js'
import { canonicalUnit } from '../../units/dimension.js'
import { numeral } from '../../units/numeral.js'
import type { Amount } from '../types.js'

const pattern = new RegExp(`^\\s*(${numeral})\\s*(.*?)\\s*$`, 'su')

/** A number with one of the units of a list, such as `25 uJy/beam`; what it is in cgs depends on wavelength, beam and pixel. */
function amount(units: readonly string[], example: string) {
  const accepted = `a number with its unit, such as \`${example}\`, is expected; units: ${units.join(', ')}`
  return z
    .string({ error: () => accepted })
    .meta({ pattern: String.raw`^\s*${numeral}\s*\S+\s*$` })
    .transform((text, context): Amount => {
      const [, number, written = ''] = pattern.exec(text) ?? []
      const unit = canonicalUnit(written)
      if (number !== undefined && units.includes(unit)) return { number: Number(number), unit }
      const meant = number === undefined || unit === '' ? undefined : closest(unit, units)
      const message = meant ? `did you mean \`${meant}\`? ${accepted}` : accepted
      context.issues.push({ code: 'custom', message, input: text })
      return z.NEVER
    })
}

/** An amount that is greater than 0 (or not less, where `zero`), or a magnitude. */
export function positiveAmount(units: readonly string[], example: string, zero = false) {
  return amount(units, example).refine(({ number, unit }) => unit.startsWith('mag') || number > 0 || (zero && number === 0), {
    error: () => (zero ? 'must not be negative' : 'must be greater than 0')
  })
}
