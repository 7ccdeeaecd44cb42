import type { SceneProblem } from '../scene/error.js'
import type { InputFile, ScenePath } from '../scene/types.js'

/** What is pointed at a run: cgs, angles in rad. */
export interface Instrument {
  file: string
  text: string
  title: string
  seed: string
  observations: ObservationSpec[]
  /** The instrument file and every data file it names. */
  inputs: InputFile[]
  /** A problem at a path of the instrument file. */
  problemAt: (path: ScenePath, message: string) => SceneProblem
}

export type ObservationSpec = PictureSpec | PhotometrySpec | VisibilitiesSpec

/** One wavelength (cm), or a band: its response at increasing wavelengths, straight between them. */
export type LightSpec =
  | { kind: 'line'; wavelength: number }
  | { kind: 'band'; wavelength: Float64Array; response: Float64Array; weighting: 'photon' | 'energy' }

interface Common {
  name: string
  light: LightSpec
  /** Flux density of magnitude 0, erg/s/cm2/Hz; absent for AB. */
  zeroMagnitude?: number
  unit: string
}

export interface PictureSpec extends Common {
  kind: 'picture'
  camera: string
  beam?: BeamSpec
  /** Sides of a pixel, rad; absent: those of the camera. */
  pixel?: [number, number]
  core?: {
    /** Nothing is seen closer to the centre, rad. */
    radius: number
    /** Part of the direct starlight that a coronagraph lets through; 1 without one. */
    starlight: number
  }
  background?: { level: Amount; subtracted: boolean }
  noise?: PictureNoise
}

export type PictureNoise =
  | { kind: 'rms'; level: Amount /** `beam`: correlated over the beam. */; per: 'beam' | 'pixel' }
  | {
      kind: 'exposure'
      /** s */
      time: number
      /** The flux density that gives one count a second. */
      zeroPoint: Amount
      /** Counts a pixel, 1 sigma. */
      readNoise: number
    }

export interface PhotometrySpec extends Common {
  kind: 'photometry'
  spectrum: string
  noise?: { kind: 'rms'; level: Amount } | { kind: 'relative'; level: number }
}

export interface VisibilitiesSpec extends Common {
  kind: 'visibilities'
  camera: string
  /** Towards east and north, cm. */
  baselines: [number, number][]
  /** 1 sigma of the real and of the imaginary part. */
  noise?: { kind: 'rms'; level: Amount }
}

/** A number in a unit of intensity or flux density. */
export interface Amount {
  number: number
  unit: string
}

export type BeamSpec =
  /** Full widths at half maximum; the major axis from north towards east. */
  | { kind: 'gaussian'; major: number; minor: number; positionAngle: number }
  /** Diameter of the mirror (cm), and of its obstruction as a part of that. */
  | { kind: 'airy'; diameter: number; obstruction: number }
  | { kind: 'kernel'; kernel: Kernel }

/** A beam as an image: intensity at the centres of pixels, in any scale. */
export interface Kernel {
  file: string
  width: number
  height: number
  values: Float64Array
  /** Pixel (counted from 0) at the centre of the beam, and pixels (x, y) for each rad towards east and north. */
  centre: [number, number]
  perEast: [number, number]
  perNorth: [number, number]
  /** Solid angle of a pixel. */
  pixelSr: number
}
