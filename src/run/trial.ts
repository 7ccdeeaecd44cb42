import type { Scene } from '../scene/types.js'
import { type RunProgress, Stopped } from './progress.js'
import { type RunResult, runScene } from './run-scene.js'

/** How long parts of a run took on one worker, and how noisy they came out; `result` is absent when time ran out. */
export interface Trial {
  /** Packets of each phase in the trial. */
  packets: number
  dustSecondsPerPacket: number
  lightSecondsPerPacket: number
  /** One picture of TRIAL_PIXELS squared: what does not depend on its size, and the rest. */
  pictureFixedSeconds: number
  pictureSeconds: number
  apertureSeconds: number
  result?: RunResult
}

/** Packets for the temperatures and for each wavelength: one first round. */
const PACKETS = 16_384
/** Pixels along each side of the picture. Rows go out by eights, so half the picture is the second task. */
export const TRIAL_PIXELS = 16

/**
 * Runs a scene in small on one worker: a round of packets for the dust, one camera and one spectrum at two wavelengths.
 * Stops after `mostSeconds`.
 */
export async function runTrial(scene: Scene, mostSeconds: number): Promise<Trial> {
  const spent = { dust: 0, light: 0, rows: [] as number[], aperture: 0 }
  const packets = { dust: 0, light: 0 }
  let apertures = 0
  let last = performance.now()
  const onProgress = ({ stage, done, observer, index = 0 }: RunProgress) => {
    const seconds = (performance.now() - last) / 1000
    last = performance.now()
    if (stage === 'pictures' && observer?.kind === 'camera') spent.rows.push(seconds)
    else if (stage === 'pictures') {
      spent.aperture += seconds
      apertures++
    } else {
      spent[stage] += seconds
      packets[stage] = stage === 'light' ? index * PACKETS + done : done
    }
  }
  let result: RunResult | undefined
  try {
    result = await runScene(inSmall(scene), {
      workers: 1,
      estimator: 'emissivity',
      onProgress,
      stop: AbortSignal.timeout(1000 * mostSeconds)
    })
  } catch (error) {
    if (!(error instanceof Stopped)) throw error
  }
  const pictures = spent.rows.length / 2
  const second = spent.rows.reduce((sum, seconds, i) => sum + (i % 2 === 1 ? seconds : 0), 0)
  const first = spent.rows.reduce((sum, seconds, i) => sum + (i % 2 === 0 ? seconds : 0), 0)
  const each = (seconds: number, count: number) => (count > 0 ? seconds / count : 0)
  return {
    packets: PACKETS,
    dustSecondsPerPacket: each(spent.dust, packets.dust),
    lightSecondsPerPacket: each(spent.light, packets.light),
    pictureSeconds: each(2 * second, pictures),
    pictureFixedSeconds: each(Math.max(0, first - second), pictures),
    apertureSeconds: each(spent.aperture, apertures),
    ...(result && { result })
  }
}

function inSmall(scene: Scene): Scene {
  const few = (wavelengths: number[]) => {
    const at = (share: number) => wavelengths[Math.floor(share * (wavelengths.length - 1))]
    return [...new Set([at(0.25), at(0.75)])]
  }
  return {
    ...scene,
    effort: { ...scene.effort, equilibrium: PACKETS, cameras: PACKETS },
    cameras: scene.cameras
      .slice(0, 1)
      .map((camera) => ({ ...camera, pixels: [TRIAL_PIXELS, TRIAL_PIXELS], wavelengths: few(camera.wavelengths) })),
    spectra: scene.spectra.slice(0, 1).map((spectrum) => ({ ...spectrum, wavelengths: few(spectrum.wavelengths) }))
  }
}
