import type { Scene } from '../scene/types.js'
import { FIRST_ROUND } from '../solve/rounds.js'
import { startThread } from '../workers/start-thread.js'
import type { GrainTables } from './grain-tables.js'

/** How long parts of a run took on one worker, and how noisy they came out. */
export interface Trial {
  /** Temperatures, and scattered light at all wavelengths tried. */
  dust: TrialPackets
  light: TrialPackets
  /** Sums over the pictures, TRIAL_PIXELS squared each: what does not depend on their size, and the rest. */
  pictures: { fixedSeconds: number; seconds: number; count: number }
  apertures: { seconds: number; count: number }
  /** Columns between stars and cells, which are those of the whole run. */
  starlightSeconds: number
  /** Placing tolerance is a tenth of this. */
  precision: number
  /** False when time ran out. */
  complete: boolean
}

export interface TrialPackets {
  packets: number
  seconds: number
  /** Largest relative error that one first round of packets left in what is seen; 0 while unknown. */
  noise: number
}

/** Packets for the temperatures, and for each wavelength: one first round. */
export const TRIAL_PACKETS = { dust: 16_384, light: FIRST_ROUND }
/** Pixels along each side of the picture. */
export const TRIAL_PIXELS = 16
/** The least precision asked of a trial: placing rays to better than a tenth of this would take too long. */
export const TRIAL_PRECISION = 0.05

/**
 * Runs a scene in small on one worker: a round of packets for the dust, one camera and one spectrum at two wavelengths. It has
 * a thread of its own, which is ended after `mostSeconds` whatever it is doing.
 */
export function runTrial({ locate, ...scene }: Scene, tables: GrainTables, mostSeconds: number): Promise<Trial> {
  return new Promise((resolve, reject) => {
    const thread = startThread(new URL('./trial-thread.js', import.meta.url), { workerData: { scene, tables } })
    let latest: Trial = {
      dust: { packets: 0, seconds: 0, noise: 0 },
      light: { packets: 0, seconds: 0, noise: 0 },
      pictures: { fixedSeconds: 0, seconds: 0, count: 0 },
      apertures: { seconds: 0, count: 0 },
      starlightSeconds: 0,
      precision: TRIAL_PRECISION,
      complete: false
    }
    const end = () => {
      clearTimeout(timer)
      thread.terminate().then(() => resolve(latest), reject)
    }
    const timer = setTimeout(end, 1000 * mostSeconds)
    thread.on('message', (trial: Trial) => {
      latest = trial
      if (trial.complete) end()
    })
    thread.on('error', (error) => {
      clearTimeout(timer)
      reject(error)
    })
  })
}
