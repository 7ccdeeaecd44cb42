import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { checkScene } from '../run/check-scene.js'
import { readScene } from '../scene/read.js'
import { checkText } from './check-text.js'
import { sceneArgument, sceneOptions } from './options.js'
import { startProgress } from './progress.js'

type Arguments = InferredOptionTypes<typeof sceneOptions> & { scene: string }

/** `motelight check SCENE`: tells what a scene means and what a run will take. */
export const check: CommandModule<object, Arguments> = {
  command: 'check <scene>',
  describe: 'Tell what a scene means, what is doubtful in it and how long it will take',
  builder: (yargs: Argv) => yargs.positional('scene', sceneArgument).options(sceneOptions) as Argv<Arguments>,
  handler: async ({ scene: file, seed, workers, json, quiet }) => {
    const scene = readScene(file, { seed })
    const progress = startProgress(process.stderr, scene.effort, quiet)
    const result = await checkScene(scene, { workers, onProgress: progress.show }).finally(progress.clear)
    process.stdout.write(json ? `${JSON.stringify(result, null, 2)}\n` : checkText(result))
  }
}
