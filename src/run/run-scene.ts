import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import { buildModel } from '../model/build-model.js'
import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import type { Scene } from '../scene/types.js'
import { dustLight } from '../solve/dust-light.js'
import { type EquilibriumResult, needsEquilibrium, solveEquilibrium } from '../solve/equilibrium.js'
import { solveScattering } from '../solve/scattering.js'
import { type DustTemperatures, givenTemperatures } from '../solve/temperatures.js'
import { WorkerPool } from '../workers/pool.js'
import { type Estimator, packetsAtWavelength } from './packets.js'
import { precisionOf } from './precision.js'
import { type RunProgress, Stopped } from './progress.js'
import { observersOf, observeWavelength, quickError, type Wanted } from './wavelength.js'

export interface RunOptions {
  /** Worker threads. */
  workers: number
  estimator: Estimator
  onProgress: (progress: RunProgress) => void
  stop?: AbortSignal
}

export interface RunResult {
  model: Model
  dust: DustTemperatures
  equilibrium?: EquilibriumResult
  images: CameraImages[]
  spectra: ApertureSpectrum[]
  /** Packets at each observed wavelength. */
  lightPackets: { wavelength: number; packets: number }[]
  /** Relative precision of each camera and spectrum. */
  precision: ReturnType<typeof precisionOf>
  times: Record<'model' | 'dust' | 'light', PhaseTime>
}

/** Duration of a phase and processor time of all its threads. */
export interface PhaseTime {
  wallSeconds: number
  cpuSeconds: number
}

/** Runs a scene from model to images and spectra. Throws SceneError, WorkerFailure or Stopped. */
export async function runScene(scene: Scene, options: RunOptions): Promise<RunResult> {
  const { onProgress, stop, estimator } = options
  const clock = stopwatch()
  const model = buildModel(scene)
  const modelTime = clock()
  const pool = new WorkerPool(options.workers, new URL('./thread.js', import.meta.url))
  try {
    const equilibrium = needsEquilibrium(model)
      ? ensure(
          await solveEquilibrium(
            model,
            pool,
            (dust) => errorOfEmission(model, dust),
            (at) => onProgress({ stage: 'dust', of: at.packets, ...at }),
            stop
          )
        )
      : undefined
    const dust = equilibrium?.dust ?? givenTemperatures(model)
    const dustTime = clock()
    const { images, spectra, wantedAt } = emptyProducts(scene)
    const wavelengths = observedWavelengths(scene)
    const lightPackets: RunResult['lightPackets'] = []
    for (const [index, wavelength] of wavelengths.entries()) {
      const wanted = wantedAt(wavelength)
      const light = dustLight(model, dust, wavelength)
      const at = { wavelength, index, count: wavelengths.length }
      if (estimator === 'emissivity') {
        const { observers, indices } = observersOf(model, wanted)
        const scattering = ensure(
          await solveScattering(
            model,
            light,
            observers,
            pool,
            (scattered) => quickError(model, light, scattered, wanted, indices, 'scattered') / SHARE,
            (round) => onProgress({ stage: 'light', ...at, ...round, of: round.packets }),
            stop
          )
        )
        await observeWavelength(
          model,
          light,
          scattering.light,
          wanted,
          indices,
          pool,
          (observer, done, of) => onProgress({ stage: 'pictures', ...at, observer, done, of, round: 0, error: Number.NaN }),
          stop
        )
        lightPackets.push({ wavelength, packets: scattering.packets })
      } else {
        const packets = ensure(
          await packetsAtWavelength(
            model,
            light,
            estimator,
            wanted,
            pool,
            (round) => onProgress({ stage: 'light', ...at, ...round, of: round.packets }),
            stop
          )
        )
        lightPackets.push({ wavelength, packets })
      }
      if (stop?.aborted) throw new Stopped()
    }
    return {
      model,
      dust,
      ...(equilibrium && { equilibrium }),
      images,
      spectra,
      lightPackets,
      precision: precisionOf(images, spectra),
      times: { model: modelTime, dust: dustTime, light: clock() }
    }
  } finally {
    await pool.close()
  }
}

/**
 * Temperatures and scattered light each may make this share of the error asked for, so that together, added in squares, they
 * reach it.
 */
const SHARE = Math.SQRT1_2

/** Wavelengths looked at to see how the noise of the temperatures shows. */
const LOOKS = 8

/** Largest relative error that the noise of the temperatures makes in what will be seen. */
function errorOfEmission(model: Model, dust: DustTemperatures): number {
  const { wantedAt } = emptyProducts(model.scene)
  const wavelengths = observedWavelengths(model.scene)
  let worst = 0
  const looks = Math.min(LOOKS, wavelengths.length)
  for (let i = 0; i < looks; i++) {
    const wavelength = wavelengths[Math.floor(((i + 0.5) * wavelengths.length) / looks)]
    const light = dustLight(model, dust, wavelength)
    const wanted = wantedAt(wavelength)
    worst = Math.max(
      worst,
      quickError(
        model,
        light,
        [],
        wanted,
        wanted.map(() => 0),
        'all'
      )
    )
  }
  return worst / SHARE
}

function ensure<T>(outcome: T | 'stopped'): T {
  if (outcome === 'stopped') throw new Stopped()
  return outcome
}

/** Time since the call before, or since the start. */
export function stopwatch(): () => PhaseTime {
  let wall = performance.now()
  let cpu = process.cpuUsage()
  return () => {
    const { user, system } = process.cpuUsage(cpu)
    const time = { wallSeconds: (performance.now() - wall) / 1000, cpuSeconds: (user + system) / 1e6 }
    wall = performance.now()
    cpu = process.cpuUsage()
    return time
  }
}

/** Products full of zeros, and which of them want a wavelength. */
function emptyProducts(scene: Scene) {
  const arrays = (length: number) => ({
    total: new Float64Array(length),
    sigma: new Float64Array(length),
    direct: new Float64Array(length),
    emitted: new Float64Array(length),
    scattered: new Float64Array(length)
  })
  const images = scene.cameras.map((camera): CameraImages => {
    const [width, height] = camera.pixels
    const count = camera.wavelengths.length
    return { camera, width, height, ...arrays(width * height * count), samplingError: new Array(count).fill(0) }
  })
  const spectra = scene.spectra.map((spectrum): ApertureSpectrum => {
    const count = spectrum.wavelengths.length
    return { spectrum, ...arrays(count), samplingError: new Array(count).fill(0) }
  })
  const wantedAt = (wavelength: number): Wanted[] => [
    ...images.flatMap((result) =>
      indicesOf(result.camera.wavelengths, wavelength).map(
        (k): Wanted => ({ kind: 'camera', spec: result.camera, images: result, k })
      )
    ),
    ...spectra.flatMap((result) =>
      indicesOf(result.spectrum.wavelengths, wavelength).map(
        (k): Wanted => ({ kind: 'spectrum', spec: result.spectrum, result, k })
      )
    )
  ]
  return { images, spectra, wantedAt }
}

function indicesOf(values: number[], value: number): number[] {
  return values.flatMap((other, k) => (other === value ? [k] : []))
}
