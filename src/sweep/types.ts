import type { InputFile, ScenePath } from '../scene/types.js'
import type { SlurmSettings } from './plan/plan-schema.js'
import type { Value } from './plan/value.js'

/** A value of the scene that differs between models. */
export interface Parameter {
  /** Its path as the plan writes it; the name of its column. */
  name: string
  path: ScenePath
  /** As scenes write it; empty for a bare number or text. */
  unit: string
  /** `tied` values follow varied ones. */
  role: 'varied' | 'tied'
  kind: 'number' | 'text'
  /** Evenly spaced in its logarithm. */
  log: boolean
}

/** What every model is compared with. */
export interface SweepData {
  /** The file that holds the list: a plan or a file of data. */
  file: string
  /** The list as written, and what all its sets leave free. */
  content: { free?: string[]; data: { name: string; kind: string; file: string }[] }
  /** Tells these data from others, their files included. */
  fingerprint: string
  /** Some sets need the images of a model, which its row in the table does not hold. */
  needsImages: boolean
}

/** The instrument file that every model is observed with. */
export interface SweepInstrument {
  file: string
  text: string
  fingerprint: string
}

/** A spectrum that every model gets for a data set: like another of its scene, at the wavelengths of the data. */
export interface DataSpectrum {
  name: string
  like: string
  wavelengths: string[]
}

/** All that a sweep is: its folder keeps this, and models are made from it alone. */
export interface Sweep {
  program: 'motelight'
  version: string
  title: string
  plan: string
  /** Base scene: its file, where data files are relative to, and its content with the precision put in. */
  sceneFile: string
  base: Record<string, unknown>
  seed: string
  /** Data files that the scene names. */
  inputs: InputFile[]
  design: 'grid' | 'latin-hypercube' | 'sobol' | 'table'
  parameters: Parameter[]
  /** One row a model: its values, in the order of the parameters. Models are numbered from 1. */
  models: Value[][]
  data?: SweepData
  dataSpectra: DataSpectrum[]
  instrument?: SweepInstrument
  slurm: SlurmSettings
}
