import { basename, extname, resolve } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { observationRecordName } from '../observe/observation-record.js'
import { observeRun } from '../observe/observe-run.js'
import { readInstrument } from '../observe/read-instrument.js'
import { openRunFolder } from '../run/run-folder.js'
import { observeText } from './observe-text.js'
import { startSteps } from './steps.js'

const options = {
  out: {
    describe: 'Folder for the results',
    type: 'string',
    requiresArg: true,
    defaultDescription: '<run>-<name of the instrument file>'
  },
  force: { describe: 'Replace what the folder holds', type: 'boolean', default: false },
  seed: { describe: 'Seed of the noise, instead of that of the instrument file', type: 'string', requiresArg: true },
  json: { describe: 'Write one JSON document to standard output, and nothing else', type: 'boolean', default: false },
  quiet: { describe: 'Show no progress', type: 'boolean', default: false }
} as const

type Arguments = InferredOptionTypes<typeof options> & { run: string; instrument: string }

/** `motelight observe RUN INSTRUMENT`: what an instrument would have recorded of a run. */
export const observe: CommandModule<object, Arguments> = {
  command: 'observe <run> <instrument>',
  describe: 'Make pictures, fluxes and visibilities of a run as an instrument would record them',
  builder: (yargs: Argv) =>
    yargs
      .positional('run', { describe: 'Folder of a run', type: 'string', demandOption: true })
      .positional('instrument', { describe: 'Instrument file (YAML)', type: 'string', demandOption: true })
      .options(options) as Argv<Arguments>,
  handler: async ({ run, instrument: file, out, force, seed, json, quiet }) => {
    const instrument = readInstrument(file, { seed })
    const path = out ?? `${resolve(run)}-${basename(file, extname(file))}`
    const steps = startSteps(process.stderr, quiet)
    const folder = await openRunFolder(path, force ? 'replace' : 'begin', instrument.inputs, observationRecordName)
    try {
      const observed = observeRun(run, instrument, (name, done) =>
        steps.show(`${name}: ${done + 1} of ${instrument.observations.length}`)
      )
      // Drawing needs large packages; other commands start faster without them.
      const { writeObservation } = await import('../observe/observation-files.js')
      const record = await writeObservation(observed, folder)
      process.stdout.write(json ? `${JSON.stringify({ folder: path, ...record }, null, 2)}\n` : observeText(record, path))
    } catch (error) {
      await folder.abandon()
      throw error
    }
  }
}
