import { observedWavelengths } from '../model/wavelengths.js'
import { errorAt } from '../scene/error.js'
import type { Scene } from '../scene/types.js'
import { divide } from '../solve/batches.js'
import { dustLight } from '../solve/dust-light.js'
import { playShare, type Share, shareOf } from '../solve/share.js'
import { dustStage } from './dust-stage.js'
import { lightPieces } from './light-stage.js'
import { makeLightJob } from './make-light-job.js'
import { Stopped } from './progress.js'
import { emptyProducts } from './wanted.js'
import { type RunOptions, withCrew } from './with-crew.js'

/** One of several equal parts of the packets of all wavelengths; `index` counts from 1. */
export interface Part {
  index: number
  of: number
}

/** A command asks for what its scene or its options do not allow. Exit code 2. */
export class PartError extends Error {
  override name = 'PartError'
}

/** Name of the folder of pieces of a part. */
export function partFolder({ index, of }: Part): string {
  return `part-${index}-of-${of}`
}

/** Throws SceneError or PartError when the scene cannot be run in so many parts. */
export function requireParts(scene: Scene, of: number): void {
  const { precision, cameras } = scene.effort
  if (precision !== null) {
    const message = 'parts need `precision: none`: how many packets a precision takes is known only from all parts together'
    throw errorAt(scene, ['effort', 'precision'], message)
  }
  const { count } = divide(cameras, 0)
  if (of > count)
    throw new PartError(`${of} parts are too many: effort.cameras = ${cameras} makes ${count} batches, at most one part each`)
}

/** Plays the share of a part at every wavelength, and leaves it in the ledger. Throws as `runScene` does. */
export function runPart(scene: Scene, { index, of }: Part, options: RunOptions): Promise<void> {
  requireParts(scene, of)
  const { estimator, onProgress, stop } = options
  return withCrew(scene, options, async (crew) => {
    const { pool, ledger } = crew
    const { model, dust } = await dustStage(crew, onProgress, stop)
    const { wantedAt } = emptyProducts(scene, estimator)
    const wavelengths = observedWavelengths(scene)
    for (const [k, wavelength] of wavelengths.entries()) {
      const names = lightPieces(k)
      if (ledger.take(names.done)) continue
      const { request } = makeLightJob(model, dustLight(model, dust, wavelength), estimator, wantedAt(wavelength), pool)
      const range = shareOf(index - 1, of, divide(scene.effort.cameras, request?.tallied ?? 0))
      const at = { stage: 'light', wavelength, index: k, count: wavelengths.length } as const
      const share: Share | 'stopped' = request
        ? await playShare(
            request,
            range,
            pool,
            ledger,
            names.packets,
            (round) => onProgress({ ...at, ...round, of: round.packets }),
            stop
          )
        : { ...range, groups: [], loose: [] }
      if (share === 'stopped') throw new Stopped()
      await ledger.settle()
      ledger.keep(names.done, { ...share })
      ledger.forget(names.packets)
    }
  })
}
