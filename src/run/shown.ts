import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import type { Model } from '../model/model.js'
import type { DustTemperatures } from '../solve/dust-temperatures.js'

/** What of a run can be shown by itself, as soon as it is known. */
export type Shown =
  | { kind: 'dust'; model: Model; dust: DustTemperatures }
  | { kind: 'column'; images: CameraImages }
  | { kind: 'camera'; images: CameraImages; k: number }
  | { kind: 'spectrum'; result: ApertureSpectrum }
