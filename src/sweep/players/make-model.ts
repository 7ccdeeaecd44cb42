import { existsSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { dustPiece } from '../../run/dust-stage.js'
import { stateName } from '../../run/run-folder.js'
import { runInFolder } from '../../run/run-in-folder.js'
import { runRecord } from '../../run/run-record.js'
import { runScene } from '../../run/run-scene.js'
import { identityOf } from '../../run/state/identity.js'
import { pieceFile, StateFolder } from '../../run/state/state-folder.js'
import { warningsOf } from '../../run/warnings-of.js'
import type { RunOptions } from '../../run/with-crew.js'
import type { Scene } from '../../scene/types.js'
import { modelResult } from '../folder/model-result.js'
import { PackStore } from '../folder/pack-store.js'
import { isPacked } from '../folder/result-store.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { modelScene } from '../plan/model-scene.js'
import { hasDust, makeDust, takeDust } from './make-dust.js'

export type ModelOptions = Omit<RunOptions, 'ledger' | 'estimator' | 'dataOnly'>

/** The models that share the dust of a model, and the first of them; undefined for a model by itself. */
export type Group = { lead: number; members: number[] } | undefined

/**
 * Makes a model from the state that is there, and leaves its result in the folder of the sweep. Throws as `runInFolder` and
 * `runScene` do.
 */
export async function makeModel(folder: SweepFolder, model: number, group: Group, options: ModelOptions): Promise<void> {
  const { scene, path, all } = await prepareModel(folder, model, group, options)
  if (!isPacked(folder.sweep)) {
    await runInFolder(scene, { ...all, path, force: false, resume: true })
    return
  }
  const started = new Date().toISOString()
  const state = new StateFolder(join(path, stateName), identityOf(scene, all.estimator))
  const result = await runScene(scene, { ...all, ledger: state })
  const none = { files: [], time: { wallSeconds: 0, cpuSeconds: 0 } }
  const record = runRecord(result, { started, workers: all.workers, estimator: all.estimator }, warningsOf(result), none)
  new PackStore(folder).add(modelResult(model, record))
  await rm(path, { recursive: true, force: true })
}

/** The scene of a model, its folder with the shared temperatures in it, and the options of its run. */
export async function prepareModel(folder: SweepFolder, model: number, group: Group, options: ModelOptions) {
  if (group && !hasDust(folder, group.lead)) await makeDust(folder, group.lead, group.members, options)
  const scene = modelScene(folder.sweep, model)
  const path = folder.model(model)
  if (group) await adoptDust(folder, group.lead, scene, join(path, stateName))
  return { scene, path, all: { ...options, estimator: 'emissivity', dataOnly: true } as const }
}

/** Puts shared temperatures where the run of the model looks for its own. */
async function adoptDust(folder: SweepFolder, lead: number, scene: Scene, state: string): Promise<void> {
  if (existsSync(pieceFile(state, dustPiece))) return
  const ledger = new StateFolder(state, identityOf(scene))
  ledger.keep(dustPiece, takeDust(folder, lead))
  await ledger.settle()
}
