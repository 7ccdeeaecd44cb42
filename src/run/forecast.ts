import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { TRIAL_PIXELS, type Trial } from './trial.js'

/** What a run is expected to take; right to an order of magnitude. */
export interface Forecast {
  seconds: { dust: number; light: number; pictures: number; all: number }
  /** Packets thought to be needed for the precision, and the most that may be spent; `light` is for one wavelength. */
  packets: { dust: { needed: number; most: number }; light: { needed: number; most: number } }
  /** False when the trial was cut short: then the most packets are taken to be spent. */
  complete: boolean
}

const FIRST_ROUND = 16_384

/** Carries a trial over to the whole scene: errors fall as the square root of the packets, pictures grow with their pixels. */
export function forecast(model: Model, trial: Trial, workers: number): Forecast {
  const { effort, cameras, spectra } = model.scene
  const noise = noiseOf(trial)
  const { precision } = effort
  const needed = (relative: number, most: number) =>
    precision === null || !trial.result ? most : Math.max(FIRST_ROUND, trial.packets * (relative / precision) ** 2)
  const dustNeeded = trial.dustSecondsPerPacket > 0 ? needed(noise.dust, effort.equilibrium) : 0
  const lightNeeded = trial.lightSecondsPerPacket > 0 ? needed(noise.light, effort.cameras) : 0
  // Each round of the temperatures stands alone and is twice the one before; those of scattered light add up.
  const dust = Math.min(effort.equilibrium, 2 * dustNeeded) * trial.dustSecondsPerPacket
  const light = Math.min(effort.cameras, lightNeeded) * trial.lightSecondsPerPacket * observedWavelengths(model.scene).length
  const picture = ([width, height]: [number, number]) =>
    trial.pictureFixedSeconds + (trial.pictureSeconds / workers) * ((width * height) / TRIAL_PIXELS ** 2)
  const pictures =
    cameras.reduce((sum, { pixels, wavelengths }) => sum + picture(pixels) * wavelengths.length, 0) +
    spectra.reduce((sum, { wavelengths }) => sum + trial.apertureSeconds * wavelengths.length, 0)
  const seconds = { dust: dust / workers, light: light / workers, pictures }
  return {
    seconds: { ...seconds, all: seconds.dust + seconds.light + seconds.pictures },
    packets: {
      dust: { needed: 2 * dustNeeded, most: effort.equilibrium },
      light: { needed: lightNeeded, most: effort.cameras }
    },
    complete: trial.result !== undefined
  }
}

/** Largest relative errors in the trial that its dust temperatures and its scattered packets account for. */
function noiseOf({ result }: Trial): { dust: number; light: number } {
  const noise = { dust: result?.equilibrium?.rounds.at(-1)?.error ?? 0, light: 0 }
  if (!result) return noise
  const products = [...result.images, ...result.spectra]
  result.precision.forEach(({ photonNoise }, i) => {
    photonNoise.forEach((relative, k) => {
      const count = products[i].total.length / photonNoise.length
      const sum = (values: Float64Array) => values.subarray(k * count, (k + 1) * count).reduce((total, value) => total + value, 0)
      const part = sum(products[i].emitted) > sum(products[i].scattered) && result.equilibrium ? 'dust' : 'light'
      noise[part] = Math.max(noise[part], relative)
    })
  })
  return noise
}
