import { z } from 'zod'
import { completeStar } from '../complete-star.js'
import { dataFile, name, real, section } from './fields.js'
import { quantity, vector } from './quantity-field.js'

const star = section({
  name: name.describe('Name of the source'),
  kind: z.literal('star').prefault('star').describe('A star (default) or an ambient field'),
  temperature: quantity('temperature').optional().describe('Effective temperature, such as `2800 K`'),
  luminosity: quantity('luminosity').optional().describe('Luminosity, such as `6000 Lsun`'),
  radius: quantity('length').optional().describe('Radius, such as `320 Rsun`'),
  at: vector().prefault(['0 au', '0 au', '0 au']).describe('Place; default the origin'),
  extent: z
    .enum(['point', 'sphere'])
    .prefault('point')
    .describe('`sphere`: light leaves the stellar surface, and dust near it sees a disk; default `point`'),
  'limb-darkening': real({ from: 0, to: 1 }).prefault(0).describe('Linear coefficient u of a resolved star, default 0'),
  spectrum: section({ table: dataFile.describe('CSV with columns wavelength [unit] and flux-nu [unit] or flux-lambda [unit]') })
    .optional()
    .describe('Spectrum read from a table instead of a blackbody: shape only, scaled to `luminosity`')
}).transform((written, context) => {
  const completed = completeStar(written)
  if ('problem' in completed) {
    context.issues.push({ code: 'custom', message: completed.problem, input: written })
    return z.NEVER
  }
  return {
    name: written.name,
    kind: written.kind,
    ...completed,
    at: written.at,
    extent: written.extent,
    limbDarkening: written['limb-darkening'],
    spectrumFile: written.spectrum?.table
  }
})

const diluted = section({
  blackbody: quantity('temperature').describe('Temperature of the blackbody'),
  dilution: real({ above: 0, to: 1 }).prefault(1).describe('Factor on the intensity, default 1')
})

const ambient = section({
  name: name.describe('Name of the source'),
  kind: z.literal('ambient'),
  spectrum: z
    .union(
      [
        z.literal('interstellar'),
        diluted,
        section({
          table: dataFile.describe('CSV with columns wavelength [unit] and intensity-nu [unit] or intensity-lambda [unit]')
        }),
        z.array(diluted).min(1)
      ],
      {
        error: () => '`interstellar`, {blackbody: 2.7255 K, dilution: 1}, a list of such terms, or {table: file.csv} is expected'
      }
    )
    .describe('Diluted blackbodies, a table of intensities, or `interstellar` (starlight of Mathis, Mezger & Panagia 1983)'),
  strength: real({ above: 0, to: 1e12 }).prefault(1).describe('Factor on the intensity, default 1')
})

/** One entry of `sources`. */
export const sourceSchema = z.discriminatedUnion('kind', [star, ambient])
