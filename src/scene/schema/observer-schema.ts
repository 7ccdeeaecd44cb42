import { z } from 'zod'
import { DEGREE } from '../../units/angles.js'
import { fluxUnits } from '../../units/flux.js'
import { intensityUnits } from '../../units/intensity.js'
import { mostPixels } from '../limits.js'
import { logRange } from '../log-range.js'
import { count, name, section, unitName } from './fields.js'
import { quantity, quantityOf, vector } from './quantity-field.js'

const turn = quantity('angle', 'any').refine((angle) => Math.abs(angle) <= 360.000001 * DEGREE, {
  error: () => 'an angle from -360 deg to 360 deg is expected'
})

const inclination = quantity('angle', 'any')
  .refine((angle) => angle >= 0 && angle <= 180.000001 * DEGREE, {
    error: () => 'an angle from 0 deg to 180 deg is expected'
  })
  .describe('Between the z axis and the line of sight; 0 deg looks down on the +z side; default 0 deg')
const azimuth = turn.describe('Turns the scene about z; default 0 deg')
const roll = turn.describe('Turns the projected +z axis from north to east; default 0 deg')

const view = section({
  inclination: inclination.prefault('0 deg'),
  azimuth: azimuth.prefault('0 deg'),
  roll: roll.prefault('0 deg')
})
  .prefault({})
  .describe('Direction of the observer; angles default to 0 deg')

/** Widest side of a perspective picture: its plane cannot hold half of the sky. */
const widestView = 170 * DEGREE
const viewAngle = quantity('angle').refine((angle) => angle <= widestView * 1.000001, {
  error: () => 'at most 170 deg a side are expected; `all-sky` shows everything'
})

const cameraView = section({
  inclination: inclination.optional(),
  azimuth: azimuth.optional(),
  roll: roll.optional(),
  from: vector().optional().describe('Place of an observer near or inside the dust, instead of one far away'),
  toward: vector().optional().describe('What he looks at; default the origin'),
  field: z
    .union([z.literal('all-sky'), viewAngle, z.tuple([viewAngle, viewAngle])], {
      error: () => 'an angle such as `90 deg`, [width, height], or `all-sky` is expected'
    })
    .optional()
    .describe('With `from`: full width of a perspective picture, [width, height], or `all-sky` for a map of all directions')
})
  .prefault({})
  .describe(
    'Direction of an observer far away (inclination, azimuth, roll), or `from`, `toward`, `field` of one at a place of the scene'
  )

const wavelength = quantity('wavelength')
const wavelengths = z
  .union(
    [
      z.array(wavelength).min(1).max(100000),
      section({ from: wavelength, to: wavelength, count: count(2, 100000) })
        .refine(({ from, to }) => from !== to, { path: ['to'], error: () => 'must differ from `from`' })
        .transform(({ from, to, count }) => logRange(from, to, count))
    ],
    { error: () => 'a list such as [0.55 um, 870 um], or {from: 1 um, to: 20 um, count: 40} is expected' }
  )
  .transform((list) => [...list].sort((a, b) => a - b))
  .refine((list) => list.every((value, i) => i === 0 || value > list[i - 1]), {
    error: () => 'the same wavelength is given twice'
  })
  .describe('A list, or {from, to, count} spaced evenly in the logarithm; used in increasing order')

const extent = quantityOf(['angle', 'length'])
const pixelCount = count(1, mostPixels)

const noBeam = Object.fromEntries(
  intensityUnits
    .filter((unit) => unit.endsWith('/beam'))
    .map((unit) => [unit, `a camera has no beam, so \`${unit}\` has no meaning`])
)

/** One entry of `cameras`; `field` is still an angle or a length. */
export const cameraSchema = section({
  name: name.describe('Name of the camera, used for its files'),
  view: cameraView,
  field: z
    .union([extent, z.tuple([extent, extent])], {
      error: () => 'an angle such as `12 arcsec`, a length such as `4000 au`, or [width, height] is expected'
    })
    .optional()
    .describe('Full width as an angle or a length; [width, height] for a rectangle; with `view.from` see `view.field`'),
  pixels: z
    .union([pixelCount, z.tuple([pixelCount, pixelCount])], {
      error: () => 'a whole number such as 256, or [width, height], is expected'
    })
    .prefault(128)
    .describe('Pixels across the width (the height follows from the field), or [width, height]; default 128'),
  wavelengths,
  unit: unitName(intensityUnits, noBeam).prefault('MJy/sr').describe('Unit of specific intensity, default MJy/sr')
})

/** One entry of `spectra`; `aperture` is still an angle or a length. */
export const spectrumSchema = section({
  name: name.describe('Name of the spectrum, used for its files'),
  view,
  aperture: z
    .union([z.literal('all'), extent], { error: () => '`all`, or a radius such as `6 arcsec` or `300 au`, is expected' })
    .prefault('all')
    .describe('Radius on the sky, or `all` (default)'),
  wavelengths,
  unit: unitName(fluxUnits).prefault('Jy').describe('Unit of flux density, default Jy')
})

export type CameraEntry = z.output<typeof cameraSchema>
export type SpectrumEntry = z.output<typeof spectrumSchema>
