import { basename, extname, join } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { observedWavelengths } from '../model/wavelengths.js'
import { opacityReports } from '../run/opacity-report.js'
import { readScene } from '../scene/read.js'
import { closest } from '../units/closest.js'
import { parseQuantity, QuantityError } from '../units/quantity.js'
import { UsageError } from './failure.js'
import { opacityText } from './opacity-text.js'
import { sceneArgument, sceneOptions } from './options.js'
import { startProgress } from './progress.js'
import { some } from './words.js'

const { workers, json, quiet } = sceneOptions
const options = {
  out: {
    describe: 'Folder for the results',
    type: 'string',
    requiresArg: true,
    defaultDescription: 'out/<name of the scene file>-opacity'
  },
  wavelengths: {
    describe: 'Wavelengths of the scattering law, such as "0.55 um, 2.2 um"',
    type: 'string',
    requiresArg: true,
    defaultDescription: 'some of those of the cameras and spectra',
    coerce: wavelengthsOf
  },
  workers,
  json,
  quiet
} as const

type Arguments = InferredOptionTypes<typeof options> & { scene: string; name?: string }

/** Wavelengths of the scattering law unless they are asked for. */
const FEW = 4

/** `motelight opacity SCENE [NAME]`: tables and plots of the optical properties of dust. */
export const opacity: CommandModule<object, Arguments> = {
  command: 'opacity <scene> [name]',
  describe: 'Make tables and plots of opacities, scattering laws and mean opacities',
  builder: (yargs: Argv) =>
    yargs
      .positional('scene', sceneArgument)
      .positional('name', { describe: 'An entry of `opacities`; default: all', type: 'string' })
      .options(options) as Argv<Arguments>,
  handler: async ({ scene: file, name, out, wavelengths, workers, json, quiet }) => {
    const scene = readScene(file)
    const known = Object.keys(scene.opacities)
    if (known.length === 0) throw new UsageError(`${file} has no opacities`)
    if (name !== undefined && !known.includes(name)) throw new UsageError(unknown(name, known))
    const progress = startProgress(process.stderr, scene.effort, quiet)
    const reports = await opacityReports(scene, {
      names: name === undefined ? known : [name],
      wavelengths: wavelengths ?? some(observedWavelengths(scene), FEW),
      workers,
      onProgress: progress.show
    }).finally(progress.clear)
    const folder = out ?? join('out', `${basename(file, extname(file))}-opacity`)
    // Drawing needs large packages; other commands start faster without them.
    const { writeOpacityFiles } = await import('../run/opacity-files.js')
    const files: string[] = []
    for (const report of reports) files.push(...(await writeOpacityFiles(report, folder)))
    const plain = (_: string, value: unknown) => (ArrayBuffer.isView(value) ? Array.from(value as Float64Array) : value)
    process.stdout.write(
      json ? `${JSON.stringify({ folder, files, opacities: reports }, plain)}\n` : opacityText(reports, folder)
    )
  }
}

function unknown(name: string, known: string[]): string {
  const meant = closest(name, known)
  return `The scene has no opacity ${name}; ${meant ? `did you mean ${meant}? ` : ''}there are: ${known.join(', ')}`
}

function wavelengthsOf(text: string): number[] {
  try {
    const values = text.split(',').map((part) => parseQuantity(part, 'wavelength').value)
    if (values.some((value) => !(value > 0))) throw new QuantityError('must be greater than 0')
    return [...new Set(values)].sort((a, b) => a - b)
  } catch (error) {
    if (!(error instanceof QuantityError)) throw error
    throw new UsageError(`--wavelengths: ${error.message}`)
  }
}
