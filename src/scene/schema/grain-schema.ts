import { z } from 'zod'
import type { SizesSpec } from '../types.js'
import { constantsSchema, sumMessage, sumToOne } from './constants-schema.js'
import { dataFile, real, section } from './fields.js'
import { quantity } from './quantity-field.js'

/** Largest radius, cm: larger spheres take very long, and are no dust. */
const LARGEST = 10

type WrittenSizes = Exclude<SizesSpec, { kind: 'table' }> | { kind: 'table'; file: string }

const distribution = section({
  smallest: quantity('length').describe('Smallest radius'),
  largest: quantity('length')
    .refine((radius) => radius <= LARGEST, { error: () => 'grains of at most 10 cm are accepted' })
    .describe('Largest radius'),
  slope: real({ from: -20, to: 20 }).optional().describe('Numbers per unit of radius ~ radius^slope, default -3.5'),
  median: quantity('length').optional().describe('Median radius by number of a lognormal distribution, instead of `slope`'),
  width: real({ above: 0, to: 10 }).optional().describe('Standard deviation of ln(radius) of a lognormal distribution')
}).transform(({ smallest, largest, slope, median, width }, context): WrittenSizes => {
  const refuse = (key: string, message: string) => context.issues.push({ code: 'custom', path: [key], message, input: smallest })
  if (smallest >= largest) refuse('smallest', 'must be less than `largest`')
  if (median === undefined && width === undefined) return { kind: 'power', smallest, largest, slope: slope ?? -3.5 }
  if (slope !== undefined) refuse('slope', 'belongs to a power law; `median` and `width` to a lognormal distribution')
  if (median === undefined) refuse('median', 'the key is missing; a lognormal distribution has a `median` and a `width`')
  if (width === undefined) refuse('width', 'the key is missing; a lognormal distribution has a `median` and a `width`')
  return { kind: 'lognormal', smallest, largest, median: median!, width: width! }
})

const sizes = z
  .union(
    [
      distribution,
      section({ file: dataFile.describe('CSV with columns radius [unit] and number (per unit of radius, any scale)') }).transform(
        ({ file }): WrittenSizes => ({ kind: 'table', file })
      )
    ],
    {
      error: () =>
        'one of {smallest: 5 nm, largest: 250 nm, slope: -3.5}, {smallest: 5 nm, largest: 2 um, median: 0.1 um, width: 0.5} and {file: sizes.csv} is expected'
    }
  )
  .describe('Radii and numbers of grains: a power law, a lognormal distribution or a table')

const coat = section({
  constants: constantsSchema.describe('Optical constants of the coat'),
  'volume-fraction': real({ above: 0, below: 1 }).describe(
    'Share of the coat in the volume of the grain, the same at every size'
  ),
  density: quantity('density').describe('Density of the coat')
})
  .transform(({ constants, density, ...written }) => ({ constants, volumeFraction: written['volume-fraction'], density }))
  .describe('Concentric coat; all else describes the core')

const grain = {
  constants: constantsSchema.describe('Optical constants'),
  sizes,
  'grain-density': quantity('density').describe('Density of the solid, without pores'),
  porosity: real({ from: 0, below: 1 }).prefault(0).describe('Share of vacuum in the volume, mixed in by the rule of Bruggeman'),
  coat: coat.optional()
}

const named = <Rest extends { 'grain-density': number }>({ 'grain-density': density, ...rest }: Rest) => ({ ...rest, density })

/** Grains of one kind, as they are written into `law: grains` itself. */
export const singleGrain = grain

/** Several kinds of grains with their shares of the mass. */
export const populations = z
  .array(
    section({ 'mass-fraction': real({ above: 0, to: 1 }).describe('Share of the mass of dust'), ...grain }).transform(
      ({ 'mass-fraction': massFraction, ...rest }) => ({ massFraction, ...named(rest) })
    )
  )
  .min(1)
  .superRefine((list, context) => {
    const fractions = list.map(({ massFraction }) => massFraction)
    if (!sumToOne(fractions)) context.addIssue({ code: 'custom', message: sumMessage('mass fractions', fractions) })
  })
  .describe('Several kinds of grains side by side, instead of the keys of one; their mass fractions sum to 1')
