import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import type { EquilibriumResult } from '../solve/equilibrium.js'
import type { InnerRadii } from '../solve/inner-radius.js'
import type { Sublimation } from '../solve/sublimation.js'
import type { DustTemperatures } from '../solve/temperatures.js'
import { type DustStage, dustStage } from './dust-stage.js'
import { type LightPackets, lightStage, type PacketSource } from './light-stage.js'
import { precisionOf } from './precision.js'
import type { PhaseTime } from './stopwatch.js'
import { type RunOptions, withCrew } from './with-crew.js'

export interface RunResult {
  model: Model
  dust: DustTemperatures
  /** Absent when no temperature had to be solved for. */
  equilibrium?: Omit<EquilibriumResult, 'dust'>
  /** Absent when none was sought. */
  innerRadii?: InnerRadii
  /** Absent when no dust may sublimate. */
  sublimation?: Sublimation
  images: CameraImages[]
  spectra: ApertureSpectrum[]
  /** At each observed wavelength. */
  lightPackets: LightPackets[]
  /** Relative precision of each camera and spectrum. */
  precision: ReturnType<typeof precisionOf>
  times: Record<'model' | 'dust' | 'light', PhaseTime>
}

/**
 * Runs a scene from model to images and spectra; `packetsFrom`: scattered packets that others have played. Throws SceneError,
 * MemoryError, WorkerFailure or Stopped.
 */
export function runScene(scene: Scene, options: RunOptions, packetsFrom?: PacketSource): Promise<RunResult> {
  return withCrew(scene, options, async (crew) => {
    const { estimator, onProgress, stop } = options
    const { model, dust, equilibrium, innerRadii, sublimation, time: dustTime } = await dustStage(crew, onProgress, stop)
    const light = await lightStage({ ...crew, model }, dust, {
      estimator,
      onProgress,
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
