import { z } from 'zod'
import { DEGREE } from '../../units/angles.js'
import { dustSchema } from './dust-schema.js'
import { effortSchema } from './effort-schema.js'
import { name, section, text } from './fields.js'
import { gridSchema } from './grid-schema.js'
import { cameraSchema, spectrumSchema } from './observer-schema.js'
import { opacitySchema } from './opacity-schema.js'
import { quantity, quantityOf } from './quantity-field.js'
import { sourceSchema } from './source-schema.js'

/** Degrees, without going through radians when written in degrees. */
const degrees = quantityOf(['angle'], 'any').transform(({ number, unit, value }) => (unit === 'deg' ? number : value / DEGREE))

const sky = section({
  ra: degrees
    .refine((ra) => ra >= 0 && ra <= 360, { error: () => 'an angle from 0 deg to 360 deg is expected' })
    .describe('Right ascension (ICRS)'),
  dec: degrees
    .refine((dec) => Math.abs(dec) <= 90, { error: () => 'an angle from -90 deg to 90 deg is expected' })
    .describe('Declination (ICRS)')
}).transform(({ ra, dec }) => ({ raDeg: ra, decDeg: dec }))

/** A whole scene file. */
export const sceneSchema = section({
  title: text.optional().describe('Free text'),
  distance: quantity('length').describe('Distance of the observer, such as `320 pc`'),
  sky: sky.optional().describe('Where the image centre lies, for the celestial coordinates of images'),
  seed: text.prefault('1').describe('Free text; the same seed gives the same result'),
  sources: z.array(sourceSchema).prefault([]).describe('Stars and other sources of light'),
  opacities: z.record(name, opacitySchema).prefault({}).describe('Named optical properties of dust'),
  dust: z.array(dustSchema).prefault([]).describe('Components of dust; they overlap freely'),
  grid: gridSchema.prefault({}).describe('Cells; chosen from the scene when absent'),
  effort: effortSchema.prefault({}).describe('Photon packets to spend and precision to reach'),
  cameras: z.array(cameraSchema).prefault([]).describe('Images'),
  spectra: z.array(spectrumSchema).prefault([]).describe('Fluxes in an aperture')
})
