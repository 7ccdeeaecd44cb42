import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import { type DustStage, dustStage } from './dust-stage.js'
import { lightStage, type PacketSource } from './light-stage.js'
import { precisionOf } from './precision.js'
import type { RunResult } from './run-result.js'
import type { Shown } from './shown.js'
import { type RunOptions, withCrew } from './with-crew.js'

/** What a run may be told beside its options. */
export interface StageOptions {
  /** Scattered packets that others have played. */
  packetsFrom?: PacketSource
  /** Told what can be shown, as soon as it is known. */
  onShown?: (shown: Shown) => void
}

/** Runs a scene from model to images and spectra. Throws SceneError, MemoryError, WorkerFailure or Stopped. */
export function runScene(scene: Scene, options: RunOptions, stages: StageOptions = {}): Promise<RunResult> {
  const { packetsFrom, onShown = () => {} } = stages
  return withCrew(scene, options, async (crew) => {
    const { estimator, onProgress, stop } = options
    const { model, dust, equilibrium, innerRadii, sublimation, time: dustTime } = await dustStage(crew, onProgress, stop)
    onShown({ kind: 'dust', model, dust })
    const light = await lightStage({ ...crew, model }, dust, {
      estimator,
      onProgress,
      onShown,
      ...(stop && { stop }),
      ...(packetsFrom && { packetsFrom })
    })
    const { images, spectra, lightPackets } = light
    return {
      model,
      dust,
      ...(equilibrium && { equilibrium }),
      ...(innerRadii && { innerRadii }),
      ...(sublimation && { sublimation }),
      images,
      spectra,
      lightPackets,
      precision: precisionOf(images, spectra),
      times: { model: crew.time, dust: dustTime, light: light.time }
    }
  })
}

/** Solves for the dust temperatures of a scene and leaves them in the ledger. Throws as `runScene` does. */
export function runDust(scene: Scene, options: RunOptions): Promise<DustStage & { model: Model }> {
  return withCrew(scene, options, (crew) => dustStage(crew, options.onProgress, options.stop))
}
