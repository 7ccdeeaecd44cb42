import { z } from 'zod'
import type { AmountSpec, CarveSpec, DustSpec } from '../types.js'
import { count, name, real, section, text } from './fields.js'
import { quantity } from './quantity-field.js'
import { shapeSchema, type WrittenShape } from './shape-schema.js'

const mass = section({ mass: quantity('mass').describe('Mass of dust') }).transform(
  (written): AmountSpec => ({ kind: 'mass', mass: written.mass })
)

const opticalDepth = section({
  'optical-depth': real({ above: 0, below: 1e9 }).describe("Extinction along the shape's defining line"),
  at: quantity('wavelength').describe('Wavelength of the optical depth')
}).transform((written): AmountSpec => ({ kind: 'optical-depth', opticalDepth: written['optical-depth'], at: written.at }))

const density = section({
  density: quantity('density').describe('Midplane density of dust'),
  at: quantity('length').describe('Radius of that density')
}).transform((written): AmountSpec => ({ kind: 'density', density: written.density, at: written.at }))

const amount = z
  .union([mass, opticalDepth, density], {
    error: () =>
      'exactly one of {mass: 1e-4 Msun}, {optical-depth: 1.5, at: 0.55 um} and {density: 1e-18 g/cm3, at: 10 au} is expected'
  })
  .describe('Exactly one of mass, optical depth at a wavelength, density at a radius')

const remaining = real({ from: 0, to: 1 }).describe('Fraction of the density that remains')
const gap = section({
  from: quantity('length', 'not negative').describe(
    'Distance from the axis of a disk, ring, slab or field, from the centre of other shapes'
  ),
  to: quantity('length'),
  remaining
}).refine(({ from, to }) => from < to, { path: ['from'], error: () => 'must be less than `to`' })
const cavity = section({
  'half-angle': quantity('angle')
    .refine((angle) => angle < Math.PI / 2, { error: () => 'an angle below 90 deg is expected' })
    .describe("Of a double cone about the shape's axis"),
  remaining
})
const carve = z
  .array(
    z
      .union([section({ gap }), section({ cavity })], {
        error: () =>
          '{gap: {from: 20 au, to: 30 au, remaining: 0.01}} or {cavity: {half-angle: 25 deg, remaining: 0}} is expected'
      })
      .transform(
        (written): CarveSpec =>
          'gap' in written
            ? { kind: 'gap', ...written.gap }
            : { kind: 'cavity', halfAngle: written.cavity['half-angle'], remaining: written.cavity.remaining }
      )
  )
  .min(1)
const clumps = section({
  count: count(1, 1e6).describe('Number of clumps, placed at random as the mass is'),
  radius: quantity('length'),
  contrast: real({ from: 1, to: 1e9 }).describe('Density in clumps over that between them'),
  seed: text.prefault('1').describe('Free text; another seed, other places')
})

/** One entry of `dust`. */
export const dustSchema = section({
  name: name.describe('Name of the component'),
  opacity: name.describe('Name of an entry of `opacities`'),
  shape: shapeSchema.describe('Density as a function of position'),
  amount,
  temperature: z
    .union([z.enum(['solve', 'none']), quantity('temperature')], {
      error: () => '`solve`, `none` or a temperature such as `40 K` is expected'
    })
    .prefault('solve')
    .describe('`solve` (default: radiative equilibrium), `none`, or a value such as `40 K`'),
  sublimation: quantity('temperature')
    .optional()
    .describe('Dust that would be hotter is removed, such as `1500 K`; `amount` counts it in'),
  carve: carve.optional().describe('Gaps and cavities, taken from the shape after `amount` has fixed its density'),
  clumps: clumps.optional().describe('Clumps; the total mass is kept')
}).transform(
  ({ carve, clumps, sublimation, ...dust }): WrittenDust => ({
    ...dust,
    ...(sublimation !== undefined && { sublimation }),
    ...(carve && { carve }),
    ...(clumps && { clumps })
  })
)

/** A component whose data file, if it has one, is not read yet. */
export interface WrittenDust extends Omit<DustSpec, 'shape'> {
  shape: WrittenShape
}
