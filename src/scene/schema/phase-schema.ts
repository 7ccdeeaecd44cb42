import { z } from 'zod'
import type { TwoTermPhase } from '../types.js'
import { dataFile, real, section } from './fields.js'

const asymmetry = () => real({ above: -1, below: 1 })

const twoTerm = section({
  'two-term': section({
    first: asymmetry().describe('Mean cosine of the first term'),
    second: asymmetry().describe('Mean cosine of the second term, often negative: backward'),
    share: real({ from: 0, to: 1 }).describe('Share of the first term in the scattered light')
  }).describe('Sum of two Henyey-Greenstein laws')
}).transform(({ 'two-term': terms }): TwoTermPhase => ({ kind: 'two-term', ...terms }))

const table = section({
  table: dataFile.describe(
    'CSV with columns angle [unit] from 0 to 180 deg and value (a phase function), or angle [unit], s11, s12, s33, s34 (a scattering matrix); for all wavelengths'
  )
}).transform(({ table: file }) => ({ kind: 'table', file }) as const)

const accepted = 'isotropic, henyey-greenstein, rayleigh, {two-term: {...}}, {table: ...}'
const named = ['isotropic', 'henyey-greenstein', 'rayleigh'] as const
const otherwise = (also: string) => ({ error: () => `accepted: ${accepted}${also}` })
const meaning = 'Scattering law; with polarisation: rayleigh, computed, a table of a scattering matrix'

/** `phase` of laws that are not grains. */
export const phase = z
  .union([z.enum(named), twoTerm, table], otherwise(' (and computed for grains)'))
  .prefault('henyey-greenstein')
  .describe(meaning)

/** `phase` of grains. */
export const grainPhase = z
  .union([z.enum([...named, 'computed']), twoTerm, table], otherwise(', computed'))
  .prefault('henyey-greenstein')
  .describe(meaning)
