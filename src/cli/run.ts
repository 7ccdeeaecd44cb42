import { basename, extname, join } from 'node:path'
import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { runInFolder } from '../run/run-in-folder.js'
import { readScene } from '../scene/read.js'
import { conduct } from './conduct.js'
import { UsageError } from './failure.js'
import { partOf, runOptions, sceneArgument } from './options.js'

const options = {
  ...runOptions,
  resume: { describe: 'Go on with the unfinished run in the folder, if there is one', type: 'boolean', default: false },
  force: { describe: 'Replace what the folder holds', type: 'boolean', default: false },
  stage: {
    describe: 'Only dust temperatures, or only images and spectra with the temperatures that are in the folder',
    choices: ['dust', 'cameras'],
    requiresArg: true
  },
  part: {
    describe: 'Only this part of the packets of the cameras, such as 3/16; `motelight join` makes the images of all parts',
    type: 'string',
    requiresArg: true,
    coerce: partOf
  }
} as const

type Arguments = InferredOptionTypes<typeof options> & { scene: string }

/** `motelight run SCENE`: makes temperatures, images and spectra. */
export const run: CommandModule<object, Arguments> = {
  command: 'run <scene>',
  describe: 'Make dust temperatures, images and spectra',
  builder: (yargs: Argv) => yargs.positional('scene', sceneArgument).options(options) as Argv<Arguments>,
  handler: async (words) => {
    const { resume, force, stage, part } = words
    if (force && (resume || part || stage === 'cameras'))
      throw new UsageError('--force replaces a run; --resume, --part and --stage cameras go on with one')
    if (part && stage === 'dust')
      throw new UsageError('--part divides the packets of the cameras; --stage dust comes before them')
    const scene = readScene(words.scene, { seed: words.seed })
    const request = { force, resume, ...(stage && { stage: stage as 'dust' | 'cameras' }), ...(part && { part }) }
    await conduct(scene, folderOf(words), words, (all) => runInFolder(scene, { ...all, ...request }))
  }
}

/** Where the results of a scene go unless the user says otherwise. */
export function folderOf({ out, scene }: { out?: string | undefined; scene: string }): string {
  return out ?? join('out', basename(scene, extname(scene)))
}
