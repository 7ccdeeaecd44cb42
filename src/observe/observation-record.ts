import { version } from '../output/version.js'
import { micrometres } from '../run/findings.js'
import type { InputFile } from '../scene/types.js'
import { JANSKY, LIGHT_SPEED } from '../units/constants.js'
import type { Observations, Observed } from './observe-run.js'
import { photometryUnit } from './unit.js'
import { observationWarnings } from './warnings.js'

/** The file that makes a folder an observation. */
export const observationRecordName = 'observation.json'

/** Content of `observation.json`. */
export interface ObservationRecord {
  program: 'motelight'
  version: string
  /** `writing` stands only in the record of an observation whose files were never finished. */
  state: 'writing' | 'done'
  title: string
  instrument: string
  inputs: InputFile[]
  seed: string
  /** The run that was observed. */
  run: { folder: string; title: string; version: string; seed: string; inputs: InputFile[] }
  observations: ObservationFinding[]
  warnings: string[]
  /** Relative to the folder. */
  files: string[]
}

export type ObservationFinding = { name: string; wavelengthUm: number } & (
  | {
      kind: 'picture'
      unit: string
      /** The brightest pixel, its noise and its Monte Carlo 1 sigma. */
      peak: number
      peakNoise: number
      peakSigma: number
      /** Flux of the field of the run, and of the picture before noise, background and mask. */
      fieldJy: number
      pictureJy: number
      maskedPixels: number
      bandError: number
    }
  | { kind: 'photometry'; unit: string; value: number; valueNoise: number; valueSigma: number; bandError: number }
  | { kind: 'visibilities'; baselines: number; closurePhases: number; fluxJy: number; noiseJy: number }
)

export function observationRecord(observed: Observed, files: string[]): ObservationRecord {
  const { run, instrument } = observed
  const { title, version: runVersion, seed, inputs } = run.record
  return {
    program: 'motelight',
    version,
    state: 'done',
    title: instrument.title,
    instrument: instrument.file,
    inputs: instrument.inputs,
    seed: instrument.seed,
    run: { folder: run.path, title, version: runVersion, seed, inputs },
    observations: observationFindings(observed),
    warnings: observationWarnings(observed),
    files
  }
}

/** What was observed, in the order of the instrument file. */
export function observationFindings({ instrument, pictures, fluxes, visibilities }: Observations): ObservationFinding[] {
  const all = [
    ...pictures.map(({ picture }): ObservationFinding => {
      const { spec, observed, expected, noise, sigma, unit, context, flux } = picture
      const brightest = observed.reduce(
        (best, value, i) => (value > observed[best] || Number.isNaN(observed[best]) ? i : best),
        0
      )
      const error = (value: number) => unit.sigmaFromCgs(expected[brightest], value, context)
      return {
        name: spec.name,
        kind: 'picture',
        wavelengthUm: micrometres(picture.wavelength),
        unit: spec.unit,
        peak: unit.fromCgs(observed[brightest], context),
        peakNoise: error(noise ? noise[brightest] : 0),
        peakSigma: error(sigma[brightest]),
        fieldJy: flux.source / JANSKY,
        pictureJy: flux.inPicture / JANSKY,
        maskedPixels: picture.masked,
        bandError: picture.bandError
      }
    }),
    ...fluxes.map(({ photometry: { spec, wavelength, observed, expected, noise, sigma, bandError } }): ObservationFinding => {
      const unit = photometryUnit(spec.unit, spec.zeroMagnitude)
      const context = { frequencyHz: LIGHT_SPEED / wavelength }
      return {
        name: spec.name,
        kind: 'photometry',
        wavelengthUm: micrometres(wavelength),
        unit: spec.unit,
        value: unit.fromCgs(observed, context),
        valueNoise: unit.sigmaFromCgs(expected, noise, context),
        valueSigma: unit.sigmaFromCgs(expected, sigma, context),
        bandError
      }
    }),
    ...visibilities.map(
      ({ measured: { spec, wavelength, closures, flux, noise } }): ObservationFinding => ({
        name: spec.name,
        kind: 'visibilities',
        wavelengthUm: micrometres(wavelength),
        baselines: spec.baselines.length,
        closurePhases: closures.length,
        fluxJy: flux / JANSKY,
        noiseJy: noise / JANSKY
      })
    )
  ]
  const place = new Map(instrument.observations.map(({ name }, i) => [name, i]))
  return all.sort((a, b) => place.get(a.name)! - place.get(b.name)!)
}
