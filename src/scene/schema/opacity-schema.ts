import { z } from 'zod'
import { dataFile, notYet, real, section } from './fields.js'
import { quantity } from './quantity-field.js'

const rayleigh = notYet(z.literal('rayleigh'), '`rayleigh` scattering')
const computed = notYet(z.literal('computed'), '`computed` scattering')
const available = z.enum(['isotropic', 'henyey-greenstein'])
const phaseError = { error: () => 'accepted: isotropic, henyey-greenstein, rayleigh (and computed for grains)' }
const phase = z.union([available, rayleigh], phaseError).prefault('henyey-greenstein').describe('Scattering law')
const grainPhase = z.union([available, rayleigh, computed], phaseError).prefault('henyey-greenstein').describe('Scattering law')

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

const grains = section({
  law: z.literal('grains').describe('Mie theory over a size distribution'),
  constants: z
    .union([dataFile, section({ oscillators: z.looseObject({}) })], {
      error: () => 'the name of a file with columns wavelength, n, k, or {oscillators: {...}} is expected'
    })
    .describe('Optical constants'),
  sizes: section({ smallest: quantity('length'), largest: quantity('length'), slope: steepness })
    .refine(({ smallest, largest }) => smallest < largest, {
      path: ['smallest'],
      error: () => 'must be less than `largest`'
    })
    .describe('Radii and power of their distribution'),
  'grain-density': quantity('density').describe('Density of the material'),
  phase: grainPhase
})

const extinctionCurve = section({
  law: z.literal('extinction-curve').describe('A published formula'),
  curve: z
    .string()
    .regex(/^[a-z]+(-[a-z]+)*-\d{4}$/, { error: () => 'author and year are expected, such as `cardelli-1989`' })
    .describe('Author and year, such as `cardelli-1989`'),
  rv: real({ from: 1, to: 10 }).prefault(3.1).describe('A_V / E(B-V), default 3.1'),
  reference: section({ wavelength: quantity('wavelength'), extinction: quantity('opacity') }),
  scattering: section({ albedo: albedo.prefault(0), asymmetry: asymmetry.prefault(0) }).prefault({}),
  phase
})

/** One entry of `opacities`. */
export const opacitySchema = z.discriminatedUnion('law', [
  power,
  table,
  notYet(grains, '`law: grains`', 'law'),
  notYet(extinctionCurve, '`law: extinction-curve`', 'law')
])
