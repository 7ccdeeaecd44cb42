import { existsSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { observationRecordName } from '../../observe/observation-record.js'
import { openRun } from '../../observe/run-source.js'
import { dustPiece } from '../../run/dust-stage.js'
import { writeOutput } from '../../run/output-error.js'
import { openRunFolder, stateName } from '../../run/run-folder.js'
import { runInFolder } from '../../run/run-in-folder.js'
import { identityOf } from '../../run/state/identity.js'
import { pieceFile, StateFolder } from '../../run/state/state-folder.js'
import type { RunOptions } from '../../run/with-crew.js'
import type { Scene } from '../../scene/types.js'
import { seeModel, seenAs } from '../data/see-model.js'
import { seenName } from '../folder/folder-store.js'
import { isPacked } from '../folder/is-packed.js'
import { modelResult } from '../folder/model-result.js'
import { PackStore } from '../folder/pack-store.js'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { modelScene } from '../plan/model-scene.js'
import { hasDust, makeDust, takeDust } from './make-dust.js'

export type ModelOptions = Omit<RunOptions, 'ledger' | 'estimator' | 'dataOnly'>

/** The models that share the dust of a model, and the first of them; undefined for a model by itself. */
export type Group = { lead: number; members: number[] } | undefined

/**
 * Makes a model from the state that is there, and leaves its result in the folder of the sweep. Throws as `runInFolder` does, and
 * as `seeModel`.
 */
export async function makeModel(folder: SweepFolder, model: number, group: Group, options: ModelOptions): Promise<void> {
  const { scene, path, all } = await prepareModel(folder, model, group, options)
  await runInFolder(scene, { ...all, path, force: false, resume: true })
  await keepResult(folder, model)
}

/** Makes of a finished model what data and instrument ask of its images, and of a large sweep keeps the row alone. */
export async function keepResult(folder: SweepFolder, model: number): Promise<void> {
  const { sweep } = folder
  const path = folder.model(model)
  const run = openRun(path)
  const { seen, observed } = seenAs(sweep) ? seeModel(sweep, model, run) : {}
  if (isPacked(sweep)) {
    new PackStore(folder).add(modelResult(model, run.record, seen))
    await rm(path, { recursive: true, force: true })
    return
  }
  if (observed) {
    const out = await openRunFolder(join(path, 'observed'), 'replace', observed.instrument.inputs, observationRecordName)
    // Drawing needs large packages; other commands start faster without them.
    const { writeObservation } = await import('../../observe/observation-files.js')
    await writeObservation(observed, out, true)
  }
  if (seen) await writeOutput(join(path, seenName), `${JSON.stringify(seen)}\n`)
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
