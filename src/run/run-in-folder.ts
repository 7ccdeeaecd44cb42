import { existsSync } from 'node:fs'
import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { SceneError } from '../scene/error.js'
import type { Scene } from '../scene/types.js'
import { needsEquilibrium } from '../solve/equilibrium.js'
import { type DustStage, dustPiece } from './dust-stage.js'
import { Easel } from './easel.js'
import { finishedRecord } from './finished-record.js'
import { gatherParts, packetsOfParts } from './gather-parts.js'
import type { PacketSource } from './light-stage.js'
import { OutputError } from './output-error.js'
import { Stopped } from './progress.js'
import { MemoryError } from './require-memory.js'
import { openRunFolder, type RunFolder, stateName, sweep } from './run-folder.js'
import { type Part, PartError, partFolder, requireParts, runPart } from './run-part.js'
import type { RunRecord } from './run-record.js'
import { runDust, runScene } from './run-scene.js'
import { identityOf } from './state/identity.js'
import { pieceFile, StateError, StateFolder } from './state/state-folder.js'
import type { RunOptions } from './with-crew.js'

/** What is to be done in a folder. */
export interface FolderRequest extends Omit<RunOptions, 'ledger'> {
  path: string
  /** Replace what is there; go on with what is there. */
  force: boolean
  resume: boolean
  /** `dust`: temperatures only; `cameras`: images and spectra with the temperatures that are there. Default: both. */
  stage?: 'dust' | 'cameras'
  /** Only this part of the packets of the cameras. */
  part?: Part
}

/** What a folder holds afterwards. */
export type FolderOutcome =
  | { kind: 'products'; record: RunRecord /** It was there before. */; already: boolean }
  | { kind: 'dust'; stage: DustStage }
  | { kind: 'part'; part: Part }

/** A run ended before its end, but its state is on disk: the same command with `--resume` goes on. `cause` says what happened. */
export class Interrupted extends Error {
  override name = 'Interrupted'
}

/**
 * Runs a scene in a folder, keeping its state there until the products are written. Throws SceneError, OutputError,
 * MemoryError, StateError or PartError for what the user can mend; Stopped and WorkerFailure come as the cause of Interrupted
 * when there is anything to go on with.
 */
export async function runInFolder(scene: Scene, request: FolderRequest): Promise<FolderOutcome> {
  const { path, force, resume, stage, part, estimator } = request
  if (part) requireParts(scene, part.of)
  const identity = identityOf(scene, estimator)
  const state = join(path, stateName)
  if (resume && !stage && !part) {
    const record = finishedRecord(path, identity)
    if (record) {
      await rm(state, { recursive: true, force: true })
      return { kind: 'products', record, already: true }
    }
  }
  const late = part !== undefined || stage === 'cameras'
  const folder = await openRunFolder(path, force ? 'replace' : resume || late ? 'continue' : 'begin', scene.inputs)
  return interruptible(path, folder.abandon, async () => {
    const ledger = part ? new StateFolder(join(state, partFolder(part)), identity, state) : new StateFolder(state, identity)
    if (late) requireDust(scene, state)
    const options = { ...request, ledger }
    if (part) {
      if (!resume && existsSync(ledger.path))
        throw new OutputError(`${ledger.path} is there already; go on with it with --resume, or remove it`)
      await runPart(scene, part, options)
      return { kind: 'part', part }
    }
    if (stage === 'dust') return { kind: 'dust', stage: await runDust(scene, options) }
    return finish(scene, options, folder)
  })
}

/** Makes the products of a scene from all parts that lie in run folders, in the folder of the request. Throws as `runInFolder`. */
export async function joinInFolder(
  scene: Scene,
  request: Omit<RunOptions, 'ledger'> & { path: string; runFolders: string[] }
): Promise<FolderOutcome> {
  const { path, runFolders, estimator } = request
  const identity = identityOf(scene, estimator)
  const parts = gatherParts(scene, [path, ...runFolders])
  const states = [path, ...runFolders].map((folder) => join(folder, stateName))
  const withDust = states.find((state) => existsSync(pieceFile(state, dustPiece)))
  if (!withDust) requireDust(scene, states[0])
  const folder = await openRunFolder(path, 'continue', scene.inputs)
  const options = { ...request, ledger: new StateFolder(states[0], identity, withDust) }
  return interruptible(path, folder.abandon, () => finish(scene, options, folder, packetsOfParts(parts, identity)))
}

async function finish(scene: Scene, options: RunOptions, folder: RunFolder, packetsFrom?: PacketSource): Promise<FolderOutcome> {
  const started = new Date().toISOString()
  const { workers, estimator, dataOnly = false, cellEdges = false } = options
  const easel = new Easel(scene, cellEdges)
  try {
    const result = await runScene(scene, options, {
      ...(packetsFrom && { packetsFrom }),
      ...(!dataOnly && { onShown: (shown) => easel.begin(shown) })
    })
    await sweep(folder.path)
    const drawn = await easel.all()
    // Drawing needs large packages; other commands start faster without them.
    const { writeProducts } = await import('./products.js')
    const record = await writeProducts(result, folder, { started, workers, estimator, dataOnly, cellEdges }, drawn)
    await rm(join(folder.path, stateName), { recursive: true, force: true })
    return { kind: 'products', record, already: false }
  } finally {
    easel.end()
  }
}

/** Lets `work` fail with what it fails with when nothing is kept or it cannot be gone on with, otherwise with Interrupted. */
async function interruptible(
  path: string,
  abandon: () => Promise<void>,
  work: () => Promise<FolderOutcome>
): Promise<FolderOutcome> {
  try {
    return await work()
  } catch (error) {
    await abandon()
    const mendable = [SceneError, MemoryError, StateError, PartError].some((kind) => error instanceof kind)
    if (mendable || !existsSync(join(path, stateName))) throw error
    throw new Interrupted(error instanceof Stopped ? 'stopped' : (error as Error).message, { cause: error })
  }
}

function requireDust(scene: Scene, state: string): void {
  if (needsEquilibrium(scene) && !existsSync(pieceFile(state, dustPiece)))
    throw new PartError(`${state} holds no dust temperatures; make them with run --stage dust first`)
}
