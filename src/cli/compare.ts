import { basename, extname, resolve } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { compareRun } from '../compare/compare-run.js'
import { comparisonRecordName } from '../compare/comparison-record.js'
import { readData } from '../compare/read-data.js'
import { openRunFolder } from '../run/run-folder.js'
import { compareText } from './compare-text.js'
import { startSteps } from './steps.js'

const options = {
  out: {
    describe: 'Folder for the results',
    type: 'string',
    requiresArg: true,
    defaultDescription: '<run>-<name of the file of data>'
  },
  force: { describe: 'Replace what the folder holds', type: 'boolean', default: false },
  json: { describe: 'Write one JSON document to standard output, and nothing else', type: 'boolean', default: false },
  quiet: { describe: 'Show no progress', type: 'boolean', default: false }
} as const

type Arguments = InferredOptionTypes<typeof options> & { run: string; data: string }

/** `motelight compare RUN DATA`: how well a run agrees with data. */
export const compare: CommandModule<object, Arguments> = {
  command: 'compare <run> <data>',
  describe: 'Tell how well a run agrees with pictures, fluxes, visibilities and profiles, and where it does not',
  builder: (yargs: Argv) =>
    yargs
      .positional('run', { describe: 'Folder of a run', type: 'string', demandOption: true })
      .positional('data', { describe: 'File of data (YAML)', type: 'string', demandOption: true })
      .options(options) as Argv<Arguments>,
  handler: async ({ run, data: file, out, force, json, quiet }) => {
    const data = readData(file)
    const path = out ?? `${resolve(run)}-${basename(file, extname(file))}`
    const steps = startSteps(process.stderr, quiet)
    const folder = await openRunFolder(path, force ? 'replace' : 'begin', data.inputs, comparisonRecordName)
    try {
      const compared = compareRun(run, data, (step) => steps.show(step))
      // Drawing needs large packages; other commands start faster without them.
      const { writeComparison } = await import('../compare/comparison-files.js')
      const record = await writeComparison(compared, folder)
      process.stdout.write(json ? `${JSON.stringify({ folder: path, ...record }, null, 2)}\n` : compareText(record, path))
    } catch (error) {
      await folder.abandon()
      throw error
    }
  }
}
