import { z } from 'zod'
import { type CurveSpec, galaxies } from '../types.js'
import { dataFile, real, section } from './fields.js'
import { populations, singleGrain } from './grain-schema.js'
import { grainPhase, phase } from './phase-schema.js'
import { quantity } from './quantity-field.js'

const albedo = real({ from: 0, below: 1 }).describe('Scattering over extinction, default 0')
const asymmetry = real({ above: -1, below: 1 }).describe('Mean cosine of the scattering angle, default 0')
const steepness = real({ from: -20, to: 20 })

const power = section({
  law: z.literal('power').describe('Absorption is a power law of wavelength'),
  reference: section({ wavelength: quantity('wavelength'), absorption: quantity('opacity') }).describe(
    'Absorption opacity per gram of dust at one wavelength'
  ),
  slope: steepness.describe('absorption ~ wavelength^-slope'),
  scattering: section({
    albedo: albedo.prefault(0),
    asymmetry: asymmetry.prefault(0),
    slope: steepness.optional().describe('scattering ~ wavelength^-slope, instead of a constant albedo')
  })
    .prefault({})
    .describe('Constants of scattering'),
  phase
})

const table = section({
  law: z.literal('table').describe('Optical properties read from a file'),
  file: dataFile.describe('CSV with columns wavelength [unit], absorption [unit], scattering [unit] and asymmetry'),
  phase
})

const { constants, sizes, 'grain-density': grainDensity, porosity, coat } = singleGrain

const grains = section({
  law: z.literal('grains').describe('Mie theory over a size distribution'),
  constants: constants.optional(),
  sizes: sizes.optional(),
  'grain-density': grainDensity.optional(),
  porosity,
  coat,
  populations: populations.optional(),
  phase: grainPhase
}).transform(({ law, constants, sizes, 'grain-density': density, porosity, coat, populations, phase }, context) => {
  const refuse = (key: string, message: string): never => {
    context.issues.push({ code: 'custom', path: [key], message, input: populations })
    return z.NEVER
  }
  const single = { constants, sizes, 'grain-density': density }
  if (populations) {
    const given = Object.entries({ ...single, porosity: porosity || undefined, coat }).find(([, value]) => value !== undefined)
    if (given) return refuse(given[0], 'belongs into each of the `populations` when they are given')
    return { law, populations, inline: false, phase }
  }
  if (constants === undefined || sizes === undefined || density === undefined) {
    const [missing] = Object.entries(single).find(([, value]) => value === undefined)!
    return refuse(
      missing,
      'the key is missing; `constants`, `sizes` and `grain-density`, or a list of `populations`, are expected'
    )
  }
  const population = { massFraction: 1, constants, sizes, density, porosity, ...(coat && { coat }) }
  return { law, populations: [population], inline: true, phase }
})

const extinctionCurve = section({
  law: z.literal('extinction-curve').describe('A published formula for extinction'),
  curve: z
    .enum(['cardelli-1989', 'pei-1992'])
    .describe('Author and year: Cardelli, Clayton & Mathis (1989) or Pei (1992, three galaxies)'),
  rv: real({ from: 1, to: 10 }).optional().describe('A_V / E(B-V) of cardelli-1989, default 3.1'),
  galaxy: z.enum(galaxies).optional().describe('Galaxy of pei-1992, default milky-way'),
  reference: section({ wavelength: quantity('wavelength'), extinction: quantity('opacity') }).describe(
    'Extinction opacity per gram of dust at one wavelength'
  ),
  scattering: section({ albedo: albedo.prefault(0), asymmetry: asymmetry.prefault(0) })
    .prefault({})
    .describe('Constants of scattering'),
  phase
}).transform(({ curve: name, rv, galaxy, ...rest }, context) => {
  const foreign = name === 'cardelli-1989' ? 'galaxy' : 'rv'
  if ({ rv, galaxy }[foreign] !== undefined)
    context.issues.push({ code: 'custom', path: [foreign], message: `${name} has no \`${foreign}\``, input: rv ?? galaxy })
  const curve: CurveSpec = name === 'cardelli-1989' ? { name, rv: rv ?? 3.1 } : { name, galaxy: galaxy ?? 'milky-way' }
  return { ...rest, curve }
})

/** One entry of `opacities`. */
export const opacitySchema = z.discriminatedUnion('law', [power, table, grains, extinctionCurve])
