import { existsSync } from 'node:fs'
import { dustPiece } from '../../run/dust-stage.js'
import { runDust } from '../../run/run-scene.js'
import { identityOf } from '../../run/state/identity.js'
import { openPiece, pieceFile, StateFolder } from '../../run/state/state-folder.js'
import type { RunOptions } from '../../run/with-crew.js'
import type { Scene } from '../../scene/types.js'
import type { Piece } from '../../workers/ledger.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { modelScene } from '../plan/model-scene.js'

/** Views of a group that decide how well its temperatures must be known; of more, some evenly spread. */
const MOST_VIEWS = 16

/** Whether the temperatures that a model leads are found. */
export function hasDust(folder: SweepFolder, lead: number): boolean {
  return existsSync(pieceFile(folder.dust(lead), dustPiece))
}

/** Finds the dust temperatures that a group of models shares, good enough for all its views, and leaves them in its folder. */
export async function makeDust(
  folder: SweepFolder,
  lead: number,
  members: number[],
  options: Omit<RunOptions, 'ledger' | 'estimator'>
): Promise<void> {
  const scene = modelScene(folder.sweep, lead)
  const step = Math.max(1, members.length / MOST_VIEWS)
  const looked = members
    .filter((_, i) => Math.floor(i / step) > Math.floor((i - 1) / step))
    .map((member) => modelScene(folder.sweep, member))
  const all: Scene = {
    ...scene,
    cameras: looked.flatMap(({ cameras }) => cameras),
    spectra: looked.flatMap(({ spectra }) => spectra)
  }
  const ledger = new StateFolder(folder.dust(lead), identityOf(scene))
  await runDust(all, { ...options, estimator: 'emissivity', ledger })
}

/** The temperatures that a model leads, as they are kept. Throws StateError for those of another scene. */
export function takeDust(folder: SweepFolder, lead: number): Piece {
  return openPiece(pieceFile(folder.dust(lead), dustPiece), identityOf(modelScene(folder.sweep, lead)))
}
