import type { EcsvTable } from '../data/ecsv.js'
import type { BeamSpec, LightSpec } from '../observe/types.js'
import type { SceneProblem } from '../scene/error.js'
import type { InputFile, ScenePath } from '../scene/types.js'
import type { MeasuredPicture } from './measured-picture.js'

/** What models are compared with: cgs, angles in rad. */
export interface DataList {
  /** Scalings shared by all sets that have none of their own. */
  free: Scaling[]
  sets: MeasuredSpec[]
  inputs: InputFile[]
  /** A problem at a path of the file. */
  problemAt: (path: ScenePath, message: string) => SceneProblem
}

/** A file of data. */
export interface Measurements extends DataList {
  file: string
  text: string
  title: string
}

/** What may be fitted: a factor on the flux, an offset of the centre, a turn about it. */
export type Scaling = 'flux' | 'centre' | 'rotation'

export type MeasuredSpec = PictureData | PhotometryData | VisibilityData | ProfileData

interface Common {
  name: string
  free?: Scaling[]
}

interface Seen {
  camera: string
  light: LightSpec
  beam?: BeamSpec
  core?: { radius: number; starlight: number }
  zeroMagnitude?: number
}

export interface PictureData extends Common, Seen {
  kind: 'picture'
  picture: MeasuredPicture
  /** Errors are correlated over the beam. */
  perBeam: boolean
  /** Where the source is in the picture, deg; absent: where the scene says. */
  centre?: { raDeg: number; decDeg: number }
}

export interface PhotometryData extends Common {
  kind: 'photometry'
  spectrum: string
  table: EcsvTable
  /** Column of the 1 sigma. */
  errors: string
  /** Light of the rows of that name; other rows are at their wavelength. */
  bands: Map<string, LightSpec>
  zeroMagnitude?: number
}

export interface VisibilityData extends Common {
  kind: 'visibilities'
  camera: string
  light: LightSpec
  table: EcsvTable
  errors: string
}

export interface ProfileData extends Common, Seen {
  kind: 'profile'
  table: EcsvTable
  errors: string
  along: 'radius' | 'angle'
  /** Radii between which a profile along the angle is taken. */
  between?: [number, number]
}
