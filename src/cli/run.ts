import { basename, extname, join } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { inputFiles } from '../run/input-files.js'
import { writeProducts } from '../run/products.js'
import { openRunFolder } from '../run/run-folder.js'
import { runScene } from '../run/run-scene.js'
import { readScene } from '../scene/read.js'
import { exitCode } from './exit-code.js'
import { sceneArgument, sceneOptions } from './options.js'
import { startProgress } from './progress.js'
import { runText } from './run-text.js'
import { stopSignal } from './stop-signal.js'

const options = {
  out: {
    describe: 'Folder for the results',
    type: 'string',
    requiresArg: true,
    defaultDescription: 'out/<name of the scene file>'
  },
  estimator: {
    describe: 'How scattered light is estimated; peel and exit are slow cross-checks',
    choices: ['emissivity', 'peel', 'exit'],
    default: 'emissivity'
  },
  force: { describe: 'Replace what the folder holds', type: 'boolean', default: false },
  ...sceneOptions
} as const

type Arguments = InferredOptionTypes<typeof options> & { scene: string }

/** `motelight run SCENE`: makes temperatures, images and spectra. */
export const run: CommandModule<object, Arguments> = {
  command: 'run <scene>',
  describe: 'Make dust temperatures, images and spectra',
  builder: (yargs: Argv) => yargs.positional('scene', sceneArgument).options(options) as Argv<Arguments>,
  handler: async ({ scene: file, out, seed, workers, estimator, force, json, quiet }) => {
    const started = new Date().toISOString()
    const scene = readScene(file, { seed })
    const inputs = inputFiles(scene)
    const folder = await openRunFolder(out ?? join('out', basename(file, extname(file))), force, inputs)
    const signal = stopSignal()
    const progress = startProgress(process.stderr, scene.effort, quiet)
    try {
      const result = await runScene(scene, { workers, estimator, stop: signal.stop, onProgress: progress.show })
      progress.clear()
      const record = await writeProducts(result, folder, { started, workers, estimator, inputs })
      process.stdout.write(
        json ? `${JSON.stringify({ folder: folder.path, ...record }, null, 2)}\n` : runText(record, folder.path)
      )
      if (!record.precision.reached) process.exitCode = exitCode.imprecise
    } catch (error) {
      await folder.abandon()
      throw error
    } finally {
      progress.clear()
      signal.release()
    }
  }
}
