import { z } from 'zod'
import type { Dimension } from '../../units/dimension.js'
import { describeDimensions, parseQuantity, type Quantity, QuantityError, quantityPattern } from '../../units/quantity.js'

type Sign = 'positive' | 'not negative' | 'any'

/** A value in cgs written with its unit. */
export function quantity(dimension: Dimension, sign: Sign = 'positive') {
  return quantityOf([dimension], sign).transform(({ value }) => value)
}

/** A value written with its unit, which decides between several dimensions. */
export function quantityOf(accepted: Dimension[], sign: Sign = 'positive') {
  return z
    .string({ error: () => `a number with its unit is expected; accepted: ${describeDimensions(accepted)}` })
    .meta({ pattern: quantityPattern(accepted) })
    .transform((text, context): Quantity => {
      const refuse = (message: string): never => {
        context.issues.push({ code: 'custom', message, input: text })
        return z.NEVER
      }
      try {
        const read = parseQuantity(text, ...accepted)
        if (sign === 'positive' && !(read.value > 0)) return refuse('must be greater than 0')
        if (sign === 'not negative' && read.value < 0) return refuse('must not be negative')
        return read
      } catch (error) {
        if (!(error instanceof QuantityError)) throw error
        if (error.hasNumber) return refuse(error.message)
        context.issues.push({ code: 'invalid_format', format: 'quantity', message: error.message, input: text })
        return z.NEVER
      }
    })
}

/** A place as three lengths, cm. */
export function vector() {
  const component = quantity('length', 'any')
  return z.tuple([component, component, component], {
    error: () => 'three lengths with their units, such as [1 au, 0 au, 0 au], are expected'
  })
}
