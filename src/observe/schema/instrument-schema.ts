import { z } from 'zod'
import { dataFile, name, real, section, text, unitName } from '../../scene/schema/fields.js'
import { quantity } from '../../scene/schema/quantity-field.js'
import { fluxUnits } from '../../units/flux.js'
import { intensityUnits } from '../../units/intensity.js'
import { COUNTS } from '../unit.js'
import { positiveAmount } from './amount-field.js'

export const linear = (units: string[]) => units.filter((unit) => !unit.startsWith('mag'))
const perHertz = linear(fluxUnits).filter((unit) => unit.endsWith('Jy') || unit.endsWith('/Hz'))
const orderedEnds = { path: ['to'], error: () => 'must be greater than `from`' }

export const band = z
  .union(
    [
      section({
        from: quantity('wavelength'),
        to: quantity('wavelength'),
        weighting: z.enum(['photon', 'energy']).prefault('photon')
      })
        .refine(({ from, to }) => to > from, orderedEnds)
        .transform(({ from, to, weighting }) => ({ ends: [from, to] as [number, number], weighting })),
      section({ response: dataFile, weighting: z.enum(['photon', 'energy']).prefault('photon') })
    ],
    { error: () => 'a top hat such as {from: 1.5 um, to: 1.8 um}, or {response: table.csv}, is expected' }
  )
  .describe(
    'A top hat {from, to}, or {response: FILE} with columns wavelength and response; weighting: photon (default) or energy'
  )

/** Keys that say in which light something is seen. */
export const lightKeys = {
  wavelength: quantity('wavelength').optional().describe('One of the wavelengths of the camera or spectrum; or a `band`'),
  band: band.optional(),
  'zero-magnitude': positiveAmount(perHertz, '640 Jy')
    .optional()
    .describe('Flux density of magnitude 0 in this observation; AB when absent')
}

const common = { name: name.describe('Name of the observation, used for its files'), ...lightKeys }

const axis = quantity('angle')
export const beam = z
  .discriminatedUnion('kind', [
    section({
      kind: z.literal('gaussian'),
      major: axis.describe('Full width at half maximum of the major axis'),
      minor: axis.optional().describe('Of the minor axis; default: as the major axis'),
      'position-angle': quantity('angle', 'any').prefault('0 deg').describe('Major axis from north towards east')
    }),
    section({
      kind: z.literal('airy'),
      diameter: quantity('length').describe('Of the mirror'),
      obstruction: real({ from: 0, below: 1 })
        .prefault(0)
        .describe('Diameter of the central obstruction, as a part of that of the mirror')
    }),
    section({ kind: z.literal('kernel'), file: dataFile.describe('FITS image of the beam with its pixel scale in the header') })
  ])
  .describe('gaussian, airy (pattern of a round mirror at each wavelength) or kernel (a FITS image)')

export const core = section({
  radius: axis.describe('Pixels nearer to the centre are masked'),
  starlight: real({ from: 0, to: 1 })
    .prefault(1)
    .describe('Part of the direct starlight that a coronagraph lets through; default 1')
}).describe('A coronagraph or a saturated core')

const pictureNoise = z
  .discriminatedUnion('kind', [
    section({
      kind: z.literal('rms'),
      level: positiveAmount(linear(intensityUnits), '25 uJy/beam'),
      per: z
        .enum(['beam', 'pixel'])
        .describe('beam: correlated over the beam, as in a map of an interferometer; pixel: independent in each')
    }),
    section({
      kind: z.literal('exposure'),
      time: quantity('time'),
      'zero-point': positiveAmount([...perHertz, 'mag'], '25 mag').describe('Flux density that gives one count a second'),
      'read-noise': real({ from: 0 }).prefault(0).describe('Counts a pixel, 1 sigma')
    })
  ])
  .describe('rms: normal noise of that level; exposure: Poisson counts of source and background, and read noise')

const picture = section({
  kind: z.literal('picture'),
  ...common,
  camera: name.describe('A camera of the run'),
  beam: beam.optional(),
  pixel: z
    .union([axis, z.tuple([axis, axis])], { error: () => 'an angle such as `50 mas`, or [width, height], is expected' })
    .optional()
    .describe('Side of a pixel, or [width, height]; default: those of the camera'),
  core: core.optional(),
  background: section({
    level: positiveAmount(intensityUnits, '21.5 mag/arcsec2', true),
    subtracted: z.boolean().prefault(false).describe('Only its noise is left')
  })
    .optional()
    .describe('Light of the sky, the same everywhere'),
  noise: pictureNoise.optional(),
  unit: unitName([...intensityUnits, COUNTS])
    .prefault('MJy/sr')
    .describe('Unit of the picture, default MJy/sr; `counts` a pixel where noise comes from an exposure')
})

const rms = (units: string[], example: string) => section({ kind: z.literal('rms'), level: positiveAmount(units, example) })

const photometry = section({
  kind: z.literal('photometry'),
  ...common,
  spectrum: name.describe('A spectrum of the run'),
  noise: z
    .discriminatedUnion('kind', [
      rms(linear(fluxUnits), '2 mJy'),
      section({
        kind: z.literal('relative'),
        level: real({ above: 0, below: 10 }).describe('1 sigma as a part of the flux, such as 3 %')
      })
    ])
    .optional(),
  unit: unitName(fluxUnits).prefault('Jy').describe('Unit of flux density, default Jy')
})

const length = quantity('length', 'any')
const visibilities = section({
  kind: z.literal('visibilities'),
  ...common,
  camera: name.describe('A camera of the run'),
  baselines: z
    .union(
      [
        z
          .array(z.tuple([length, length]))
          .min(1)
          .max(100000),
        dataFile
      ],
      {
        error: () =>
          'a list such as [[30 m, 12 m], [0 m, 45 m]] (east, north), or a table with columns east and north, is expected'
      }
    )
    .describe('Projected baselines (east, north): a list, or a CSV file with columns east and north'),
  noise: rms(linear(fluxUnits), '2 mJy').optional().describe('1 sigma of the real and of the imaginary part of each visibility'),
  unit: unitName(linear(fluxUnits)).prefault('Jy').describe('Unit of the amplitudes, default Jy')
})

export const oneLight = 'exactly one of `wavelength` and `band` is expected'
export const hasOneLight = ({ wavelength, band }: { wavelength?: unknown; band?: unknown }) =>
  (wavelength === undefined) !== (band === undefined)

const observation = z.discriminatedUnion('kind', [picture, photometry, visibilities]).superRefine((entry, context) => {
  const refuse = (path: string[], message: string) => context.addIssue({ code: 'custom', path, message })
  if (!hasOneLight(entry)) refuse([], oneLight)
  if (entry.kind !== 'picture') return
  const { beam, background, noise, unit } = entry
  const needsBeam = (name: string, path: string[]) => {
    if (!beam && name.endsWith('/beam')) refuse(path, `\`${name}\` has no meaning without a \`beam\``)
  }
  needsBeam(unit, ['unit'])
  if (background) needsBeam(background.level.unit, ['background', 'level'])
  if (noise?.kind === 'rms') {
    needsBeam(noise.level.unit, ['noise', 'level'])
    if (noise.per === 'beam' && !beam) refuse(['noise', 'per'], 'noise correlated over the beam needs a `beam`')
  }
  if (unit === COUNTS && noise?.kind !== 'exposure') refuse(['unit'], '`counts` are defined only by noise of the kind `exposure`')
})

/** A whole instrument file. */
export const instrumentSchema = section({
  title: text.optional().describe('Free text'),
  seed: text.prefault('1').describe('Of the noise; the same seed gives the same result'),
  observations: z
    .array(observation)
    .min(1)
    .max(10000)
    .describe('What is observed, one entry a picture, flux or set of visibilities')
})

export type ObservationEntry = z.output<typeof observation>
