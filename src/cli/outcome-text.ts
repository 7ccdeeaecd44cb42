import type { FolderOutcome } from '../run/run-in-folder.js'
import { runText } from './run-text.js'
import { shown } from './words.js'

/** What `run` and `join` say at their end. */
export function outcomeText(outcome: FolderOutcome, folder: string): string {
  switch (outcome.kind) {
    case 'products':
      return `${outcome.already ? 'This run is complete already.\n' : ''}${runText(outcome.record, folder)}`
    case 'part':
      return `Part ${outcome.part.index}/${outcome.part.of} is in ${folder}; motelight join makes the images when all parts are there.\n`
    case 'dust': {
      const { equilibrium } = outcome.stage
      const made = equilibrium ? `found with ${shown(equilibrium.packets)} packets` : 'given by the scene'
      return `Dust temperatures, ${made}, are in ${folder}; --stage cameras and --part go on with them.\n`
    }
  }
}
