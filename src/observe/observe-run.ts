import { wavelengthLabel } from '../output/wavelength-label.js'
import { SceneError } from '../scene/error.js'
import { LightError, type LightWeights, lightWeights } from './band.js'
import { makeBeam } from './beam.js'
import { pixelsAcross } from './blur.js'
import { measureFlux, type Photometry } from './photometry.js'
import { type Picture, takePicture } from './picture.js'
import { type CameraSource, type ModelLight, openRun, type RunSource, type SpectrumSource } from './run-source.js'
import type { Instrument, LightSpec, PictureSpec, VisibilitiesSpec } from './types.js'
import { measureVisibilities, type Visibilities } from './visibilities.js'

/** What came of pointing an instrument at a model. */
export interface Observations {
  instrument: Instrument
  pictures: { picture: Picture; source: CameraSource }[]
  fluxes: { photometry: Photometry; source: SpectrumSource }[]
  visibilities: { measured: Visibilities; source: CameraSource }[]
}

/** The same of a run. */
export interface Observed extends Observations {
  run: RunSource
}

/** Narrowest beam in pixels of a camera that makes sense to apply. */
const NARROWEST = 0.1

/** Longest baseline in wavelengths times the side of a pixel where the pixels of a camera begin to hide structure entirely. */
export const NYQUIST = 0.5

/**
 * Observes a run (its folder) with an instrument. Throws a DataError for a run that cannot be used, a SceneError for what the
 * instrument asks of it in vain.
 */
export function observeRun(
  path: string,
  instrument: Instrument,
  onProgress: (name: string, done: number) => void = () => {}
): Observed {
  const run = openRun(path)
  return { run, ...observeModel(run, instrument, onProgress) }
}

/** The same for a model, wherever it is. */
export function observeModel(
  model: ModelLight,
  instrument: Instrument,
  onProgress: (name: string, done: number) => void = () => {}
): Observations {
  const observed: Observations = { instrument, pictures: [], fluxes: [], visibilities: [] }
  const { seed, observations } = instrument
  const cameras = new Map<string, CameraSource>()
  observations.forEach((spec, i) => {
    onProgress(spec.name, i)
    const refuse = (key: string, message: string): never => {
      throw new SceneError([instrument.problemAt(['observations', i, key], message)])
    }
    if (spec.kind === 'photometry') {
      if (!model.spectra.includes(spec.spectrum)) refuse('spectrum', absent('spectrum', model.spectra))
      const source = model.spectrum(spec.spectrum)
      const light = weightsFor(spec, source.wavelengths, refuse)
      observed.fluxes.push({ photometry: measureFlux(spec, source, light, seed), source })
      return
    }
    const source = cameraOf(spec, model, cameras, refuse)
    const light = weightsFor(spec, source.wavelengths, refuse)
    if (spec.kind === 'picture') {
      if (spec.pixel && (spec.pixel[0] > source.width * source.pixel[0] || spec.pixel[1] > source.height * source.pixel[1]))
        refuse('pixel', 'larger than the field of the camera')
      if (spec.beam && pixelsAcross(makeBeam(spec.beam, light.wavelength), source) < NARROWEST)
        refuse('beam', `narrower than ${NARROWEST} pixels of the camera, which show nothing so small; leave it out`)
      observed.pictures.push({ picture: takePicture(spec, source, light, seed), source })
    } else {
      const measured = measureVisibilities(spec, source, light, seed)
      if (measured.coarseness > NYQUIST) refuse('baselines', tooCoarse(measured))
      observed.visibilities.push({ measured, source })
    }
  })
  return observed
}

/** Refuses what is asked for in vain, at a key of its entry. */
export type Refuse = (key: string, message: string) => never

function cameraOf(
  spec: PictureSpec | VisibilitiesSpec,
  model: ModelLight,
  known: Map<string, CameraSource>,
  refuse: Refuse
): CameraSource {
  const source = known.get(spec.camera) ?? cameraNamed(spec.camera, model, refuse)
  known.set(spec.camera, source)
  return source
}

/** The images of a camera that is far away. */
export function cameraNamed(name: string, model: ModelLight, refuse: Refuse): CameraSource {
  if (!model.cameras.includes(name)) refuse('camera', absent('camera', model.cameras))
  return model.camera(name) ?? refuse('camera', 'this camera stands at a place of the scene; one far away is expected')
}

/** Tells what there is, where something is not. */
export function absent(kind: string, there: string[]): string {
  return there.length > 0 ? `the run has no such ${kind}; there are ${there.join(', ')}` : `the run has no ${kind}`
}

/** Weights of the wavelengths of a run for the light that is asked for. */
export function weightsFor({ light }: { light: LightSpec }, wavelengths: number[], refuse: Refuse): LightWeights {
  try {
    return lightWeights(light, wavelengths, (wavelength) => wavelengthLabel(wavelength, 6))
  } catch (error) {
    if (!(error instanceof LightError)) throw error
    return refuse(light.kind === 'line' ? 'wavelength' : 'band', error.message)
  }
}

function tooCoarse({ coarseness }: Visibilities): string {
  const factor = Number((coarseness / NYQUIST).toPrecision(2))
  return `the pixels of the camera hide what the longest baseline sees; it needs pixels at least ${factor} times smaller`
}
