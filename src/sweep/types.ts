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

/** Measured fluxes, wavelengths in cm, increasing. */
export interface DataSet {
  name: string
  file: string
  /** Spectrum of every model at exactly the wavelengths of the data. */
  spectrum: string
  wavelengths: number[]
  fluxJy: number[]
  sigmaJy: number[]
}

/** All that a sweep is: its folder keeps this, and models are made from it alone. */
export interface Sweep {
  program: 'motelight'
  version: string
  title: string
  plan: string
  /** Base scene: its file, where data files are relative to, and its content with precision and spectra of the data put in. */
  sceneFile: string
  base: Record<string, unknown>
  seed: string
  /** Data files that the scene names. */
  inputs: InputFile[]
  design: 'grid' | 'latin-hypercube' | 'sobol' | 'table'
  parameters: Parameter[]
  /** One row a model: its values, in the order of the parameters. Models are numbered from 1. */
  models: Value[][]
  data: DataSet[]
  slurm: SlurmSettings
}
