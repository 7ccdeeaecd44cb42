import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { LIGHT_SPEED } from '../units/constants.js'
import { ConversionError, convert as convertText } from '../units/convert.js'
import { numeral } from '../units/numeral.js'
import { parseQuantity, QuantityError } from '../units/quantity.js'
import { gaussianBeamSr } from '../units/solid-angle.js'
import { UsageError } from './failure.js'

const options = {
  to: { describe: 'Unit wanted', type: 'string', requiresArg: true, demandOption: true },
  wavelength: { describe: 'Wavelength or frequency, such as 870um or 345GHz', type: 'string', requiresArg: true },
  beam: {
    describe: 'Gaussian beam: full widths at half maximum, such as "0.3x0.2 arcsec"',
    type: 'string',
    requiresArg: true
  },
  pixel: { describe: 'Pixel: its side or sides, such as "0.05 arcsec"', type: 'string', requiresArg: true },
  json: { describe: 'Write one JSON document', type: 'boolean', default: false }
} as const

type Arguments = InferredOptionTypes<typeof options> & { value: string }

/** `motelight convert VALUE --to UNIT`: one value of intensity, flux density or solid angle in another unit. */
export const convert: CommandModule<object, Arguments> = {
  command: 'convert <value>',
  describe: 'Convert an intensity, flux density or solid angle, such as "3.2 mJy/beam", to another unit',
  builder: (yargs: Argv) =>
    yargs
      .positional('value', { describe: 'Number with its unit', type: 'string', demandOption: true })
      .options(options) as Argv<Arguments>,
  handler: ({ value: text, to, wavelength, beam, pixel, json }) => {
    const centimetres = wavelength === undefined ? undefined : quantityOf('--wavelength', wavelength, 'wavelength')
    const beamSides = beam === undefined ? undefined : sidesOf('--beam', beam)
    const pixelSides = pixel === undefined ? undefined : sidesOf('--pixel', pixel)
    try {
      const {
        value,
        number,
        from,
        to: into
      } = convertText(text, to, {
        ...(centimetres && { wavelength: { frequencyHz: LIGHT_SPEED / centimetres } }),
        ...(beamSides && { beam: { sr: gaussianBeamSr(...beamSides) } }),
        ...(pixelSides && { pixel: { sr: pixelSides[0] * pixelSides[1] } })
      })
      const shown = Number(value.toPrecision(10))
      process.stdout.write(json ? `${JSON.stringify({ value, unit: into })}\n` : `${number} ${from} = ${shown} ${into}\n`)
    } catch (error) {
      throw error instanceof ConversionError ? new UsageError(error.message) : error
    }
  }
}

/** One or two angles with a common unit, `0.3x0.2 arcsec`, rad. */
function sidesOf(option: string, text: string): [number, number] {
  const [, first, second, unit] = new RegExp(`^\\s*(${numeral})\\s*(?:[x\u00d7]\\s*(${numeral}))?\\s*(.*)$`, 'u').exec(text) ?? []
  if (first === undefined) throw new UsageError(`${option}: one or two angles such as "0.3x0.2 arcsec" are expected`)
  const side = (number: string) => quantityOf(option, `${number} ${unit}`, 'angle')
  return [side(first), side(second ?? first)]
}

function quantityOf(option: string, text: string, dimension: 'wavelength' | 'angle'): number {
  try {
    const { value } = parseQuantity(text, dimension)
    if (value > 0) return value
  } catch (error) {
    if (error instanceof QuantityError) throw new UsageError(`${option} ${text}: ${error.message}`)
    throw error
  }
  throw new UsageError(`${option} ${text}: must be greater than 0`)
}
