import { z } from 'zod'
import { positiveAmount } from '../../observe/schema/amount-field.js'
import { band, beam, core, hasOneLight, lightKeys, linear, oneLight } from '../../observe/schema/instrument-schema.js'
import { dataFile, name, section, text } from '../../scene/schema/fields.js'
import { quantity } from '../../scene/schema/quantity-field.js'
import { intensityUnits } from '../../units/intensity.js'

function scalings<const Names extends [string, ...string[]]>(names: Names) {
  return z
    .array(z.enum(names))
    .describe(`What is fitted: ${names.join(', ')}; with its own value for this entry, instead of that of the whole file`)
    .optional()
}

const common = { name: name.describe('Name of the data set, used for its files') }
const camera = name.describe('A camera of the run')
const placed = scalings(['flux', 'centre', 'rotation'])
const table = dataFile.describe('Table (ECSV, or CSV with a header of `name [unit]`)')
const errors = z.string().min(1).prefault('sigma').describe('Column of the 1 sigma, default sigma')
const per = z
  .enum(['beam', 'pixel'])
  .prefault('pixel')
  .describe('beam: errors are correlated over the beam, as in a map of an interferometer; pixel (default): independent in each')

const pictureErrors = z
  .union(
    [
      section({ extension: z.string().min(1), per }),
      section({ file: dataFile, per }),
      section({ level: positiveAmount(linear(intensityUnits), '25 uJy/beam'), per })
    ],
    {
      error: () => 'one of {extension: NAME}, {file: sigma.fits} and {level: 25 uJy/beam} is expected, each with `per` if need be'
    }
  )
  .describe('1 sigma of each pixel: an extension of the same file, another file, or one level for all')

const picture = section({
  kind: z.literal('picture'),
  ...common,
  ...lightKeys,
  file: dataFile.describe('FITS image with celestial coordinates and BUNIT'),
  camera,
  beam: beam.optional().describe('As in instrument files; default: the Gaussian beam of BMAJ, BMIN and BPA, if there is one'),
  core: core.optional(),
  errors: pictureErrors,
  mask: dataFile.optional().describe('FITS image of the same size; pixels that are not 0 are left out'),
  centre: section({
    ra: quantity('angle', 'any'),
    dec: quantity('angle', 'any')
  })
    .optional()
    .describe('Where the source is (ICRS); default: `sky` of the scene'),
  free: placed
})

const photometry = section({
  kind: z.literal('photometry'),
  ...common,
  file: table,
  spectrum: name.describe('A spectrum of the run'),
  errors,
  bands: z
    .record(z.string(), band)
    .optional()
    .describe('Bands of the rows with these names (column `name`); other rows are at their wavelength'),
  'zero-magnitude': lightKeys['zero-magnitude'],
  free: scalings(['flux'])
})

const visibilities = section({
  kind: z.literal('visibilities'),
  ...common,
  ...lightKeys,
  file: table,
  camera,
  errors,
  free: placed
})

const profile = section({
  kind: z.literal('profile'),
  ...common,
  ...lightKeys,
  file: table,
  camera,
  beam: beam.optional().describe('As in instrument files'),
  core: core.optional(),
  errors,
  along: z.enum(['radius', 'angle']).describe('radius: mean over rings; angle: mean over sectors of the ring `between`'),
  between: z
    .tuple([quantity('angle', 'any'), quantity('angle')])
    .optional()
    .describe('Inner and outer radius of the ring of a profile along the angle'),
  free: scalings(['flux'])
})

const entry = z.discriminatedUnion('kind', [picture, photometry, visibilities, profile]).superRefine((set, context) => {
  const refuse = (path: string[], message: string) => context.addIssue({ code: 'custom', path, message })
  if (set.kind !== 'photometry' && !hasOneLight(set)) refuse([], oneLight)
  if (set.kind !== 'profile') return
  if ((set.along === 'angle') !== (set.between !== undefined)) refuse(['along'], '`between` belongs to a profile along the angle')
  if (set.between && !(set.between[0] >= 0 && set.between[1] > set.between[0]))
    refuse(['between'], 'two radii are expected, the second greater than the first')
})

/** A whole file of data. */
export const dataSchema = section({
  title: text.optional().describe('Free text'),
  free: z
    .array(z.enum(['flux', 'centre', 'rotation']))
    .prefault([])
    .describe('What is fitted with one value for all data sets without a `free` of their own'),
  data: z.array(entry).min(1).max(1000).describe('What the run is compared with, one entry a data set')
})

export type DataEntry = z.output<typeof entry>
