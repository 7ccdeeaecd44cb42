import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import type { Model } from '../model/model.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'
import type { EquilibriumResult } from '../solve/equilibrium.js'
import type { InnerRadii } from '../solve/inner-radius.js'
import type { Sublimation } from '../solve/sublimation.js'
import type { LightPackets } from './light-stage.js'
import type { PhaseTime } from './stopwatch.js'

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
  precision: PrecisionReached[]
  times: Record<'model' | 'dust' | 'light', PhaseTime>
}

/** Relative 1 sigma reached at each wavelength, and the error of placing the rays. */
export interface PrecisionReached {
  name: string
  kind: 'camera' | 'spectrum'
  /** cm */
  wavelengths: number[]
  /** For images the median over the pixels that hold 95 % of the flux. */
  photonNoise: number[]
  samplingError: number[]
}
