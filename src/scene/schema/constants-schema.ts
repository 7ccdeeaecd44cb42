import { z } from 'zod'
import { type HandbookName, handbookNames } from '../types.js'
import { dataFile, real, section } from './fields.js'
import { quantity, quantityOf } from './quantity-field.js'

/** Optical constants as written: names of files are still to be read. */
export type WrittenConstants =
  | { kind: 'table'; file: string }
  | { kind: 'oscillators'; infinity: number; terms: { at: number; strength: number; damping: number }[] }
  | { kind: 'handbook'; name: HandbookName }
  | { kind: 'constant'; n: number; k: number }
  | { kind: 'bruggeman'; parts: WrittenPart[] }
  | { kind: 'maxwell-garnett'; matrix: WrittenConstants; inclusions: WrittenPart[] }

export interface WrittenPart {
  constants: WrittenConstants
  volumeFraction: number
}

/** Fractions that are written with few digits, such as 0.333, may miss their sum by this. */
const ROUNDING = 1e-3

/** Whether fractions sum to 1 within the rounding of a careful writer. */
export const sumToOne = (fractions: number[]) => Math.abs(total(fractions) - 1) <= ROUNDING
const total = (fractions: number[]) => fractions.reduce((sum, fraction) => sum + fraction, 0)

/** What is wrong with fractions that should sum to 1. */
export const sumMessage = (what: string, fractions: number[]) =>
  `the ${what} sum to ${Number(total(fractions).toPrecision(6))}; they must sum to 1`

/** Wavenumber, cm-1, of a resonance. */
const resonance = quantityOf(['wavelength', 'wavenumber']).transform(({ dimension, value }) =>
  dimension === 'wavelength' ? 1 / value : value
)

const damping = z.union(
  [
    quantity('wavenumber').transform((width) => ({ width, ratio: undefined })),
    real({ above: 0, below: 1000 }).transform((ratio) => ({ width: undefined, ratio }))
  ],
  { error: () => 'a full width such as `40 cm-1`, or its ratio to the wavenumber of the resonance, such as 0.05, is expected' }
)

const oscillators = section({
  infinity: real({ from: 1, below: 1000 }).describe('Permittivity at wavelengths far below the resonances'),
  terms: z
    .array(
      section({
        at: resonance.describe('Resonance: a wavelength such as `9.7 um`, or a wavenumber such as `930 cm-1`'),
        strength: real({ above: 0, below: 1e6 }).describe('Its part of the static permittivity'),
        damping: damping.describe('Full width as a wavenumber, or its ratio to that of the resonance')
      }).transform(({ at, strength, damping: { width, ratio } }) => ({ at, strength, damping: width ?? ratio * at }))
    )
    .min(1)
    .describe('Lorentz oscillators: strength at^2 / (at^2 - w^2 - i damping w) each, w the wavenumber')
})

const forms =
  'a file with columns wavelength, n, k, or one of {oscillators: {infinity: 3, terms: [...]}}, {handbook: silicon-carbide}, {n: 1.5, k: 0.01}, {bruggeman: [...]}, {maxwell-garnett: {matrix: ..., inclusions: [...]}} is expected'

const part: z.ZodType<WrittenPart> = z.lazy(() =>
  section({
    constants: constantsSchema.describe('Optical constants'),
    'volume-fraction': real({ above: 0, to: 1 }).describe('Share of the volume')
  }).transform((written) => ({ constants: written.constants, volumeFraction: written['volume-fraction'] }))
)

const fractionsOf = (parts: WrittenPart[]) => parts.map(({ volumeFraction }) => volumeFraction)

const bruggeman = z
  .array(part)
  .min(2)
  .superRefine((parts, context) => {
    const fractions = fractionsOf(parts)
    if (!sumToOne(fractions)) context.addIssue({ code: 'custom', message: sumMessage('volume fractions', fractions) })
  })
  .describe('Effective medium by the rule of Bruggeman (1935): materials whose volume fractions sum to 1')

const maxwellGarnett: z.ZodType<{ matrix: WrittenConstants; inclusions: WrittenPart[] }> = z.lazy(() =>
  section({
    matrix: constantsSchema.describe('Optical constants of the matrix, which has the rest of the volume'),
    inclusions: z
      .array(part)
      .min(1)
      .refine((parts) => total(fractionsOf(parts)) < 1, {
        error: () => 'the volume fractions of the inclusions must sum to less than 1; the matrix has the rest'
      })
      .describe('Small spheres of other materials')
  }).describe('Effective medium by the rule of Maxwell Garnett (1904)')
)

/** Where the refractive index n + i k of a grain comes from. */
export const constantsSchema: z.ZodType<WrittenConstants> = z.lazy(() =>
  z.union(
    [
      dataFile.transform((file) => ({ kind: 'table' as const, file })),
      section({ oscillators }).transform((written) => ({ kind: 'oscillators' as const, ...written.oscillators })),
      section({ handbook: z.enum(handbookNames).describe('Crystal with published Lorentz oscillators') }).transform(
        ({ handbook: name }) => ({ kind: 'handbook' as const, name })
      ),
      section({ n: real({ above: 0, below: 1e4 }), k: real({ from: 0, below: 1e4 }).prefault(0) }).transform((index) => ({
        kind: 'constant' as const,
        ...index
      })),
      section({ bruggeman }).transform((written) => ({ kind: 'bruggeman' as const, parts: written.bruggeman })),
      section({ 'maxwell-garnett': maxwellGarnett }).transform((written) => ({
        kind: 'maxwell-garnett' as const,
        ...written['maxwell-garnett']
      }))
    ],
    { error: () => forms }
  )
)
