import type { Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { TRIAL_PACKETS, TRIAL_PIXELS, type Trial, type TrialPackets } from './trial.js'

/** What a run is expected to take; right to an order of magnitude. */
export interface Forecast {
  seconds: { dust: number; light: number; pictures: number; all: number }
  /** Packets thought to be needed for the precision, and the most that may be spent; `light` is for one wavelength. */
  packets: { dust: Needed; light: Needed }
  /** False when the trial was cut short: the times then leave out what it did not come to. */
  complete: boolean
}

interface Needed {
  needed: number
  most: number
}

/**
 * Time of a picture goes about as these powers of 1 / tolerance (in one dimension, and in more) and of the number of pixels;
 * measured on shells and disks.
 */
const BY_TOLERANCE = [0.25, 0.75]
const BY_PIXELS = 0.35
/** Placing tolerance follows this precision where none is asked for. */
const USUAL_PRECISION = 0.01

/** Carries a trial over to the whole scene: errors fall as the square root of the packets. */
export function forecast({ scene, dimensions }: Model, trial: Trial, workers: number): Forecast {
  const { effort, cameras, spectra } = scene
  const { precision } = effort
  const need = ({ seconds, noise }: TrialPackets, first: number, most: number): Needed => {
    if (seconds === 0) return { needed: 0, most }
    if (precision === null || !trial.complete) return { needed: most, most }
    return { needed: Math.max(first, first * (noise / precision) ** 2), most }
  }
  // Rounds of the temperatures stand alone, each twice the one before; those of scattered light add up.
  const last = need(trial.dust, TRIAL_PACKETS.dust, effort.equilibrium)
  const dust = { needed: 2 * last.needed, most: last.most }
  const light = need(trial.light, TRIAL_PACKETS.light, effort.cameras)
  const time = ({ needed, most }: Needed, { seconds, packets }: TrialPackets) =>
    (Math.min(needed, most) * seconds) / Math.max(1, packets)
  const finer = (trial.precision / (precision ?? USUAL_PRECISION)) ** BY_TOLERANCE[dimensions === 1 ? 0 : 1]
  const each = (seconds: number, count: number) => seconds / Math.max(1, count)
  const picture = ([width, height]: [number, number]) =>
    each(trial.pictures.fixedSeconds, trial.pictures.count) +
    each(trial.pictures.seconds, trial.pictures.count) * finer * ((width * height) / TRIAL_PIXELS ** 2) ** BY_PIXELS
  // One picture more is that of the column density.
  const aperture = each(trial.apertures.seconds, trial.apertures.count) * finer
  const seconds = {
    dust: time(dust, trial.dust) / workers,
    light: (trial.starlightSeconds + time(light, trial.light) * observedWavelengths(scene).length) / workers,
    pictures:
      cameras.reduce((sum, { pixels, wavelengths }) => sum + (picture(pixels) * (wavelengths.length + 1)) / workers, 0) +
      spectra.reduce((sum, { wavelengths }) => sum + aperture * wavelengths.length, 0)
  }
  return {
    seconds: { ...seconds, all: seconds.dust + seconds.light + seconds.pictures },
    packets: { dust, light },
    complete: trial.complete
  }
}
