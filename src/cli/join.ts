import type { Argv, CommandModule, InferredOptionTypes } from 'yargs'
import { joinInFolder } from '../run/run-in-folder.js'
import { readScene } from '../scene/read.js'
import { conduct } from './conduct.js'
import { runOptions, sceneArgument } from './options.js'
import { folderOf } from './run.js'

type Arguments = InferredOptionTypes<typeof runOptions> & { scene: string; folders: string[] }

/** `motelight join SCENE [FOLDER...]`: makes images and spectra of the parts of a run. */
export const join: CommandModule<object, Arguments> = {
  command: 'join <scene> [folders..]',
  describe: 'Make images and spectra of all parts that `run --part` left in the folder of the scene and in others',
  builder: (yargs: Argv) =>
    yargs
      .positional('scene', sceneArgument)
      .positional('folders', { describe: 'More folders with parts', type: 'string', array: true, default: [] })
      .options(runOptions) as unknown as Argv<Arguments>,
  handler: async (words) => {
    const scene = readScene(words.scene, { seed: words.seed })
    await conduct(scene, folderOf(words), words, (all) => joinInFolder(scene, { ...all, runFolders: words.folders }))
  }
}
