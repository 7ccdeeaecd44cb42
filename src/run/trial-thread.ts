import { parentPort, workerData } from 'node:worker_threads'
import type { Scene } from '../scene/types.js'
import type { GrainTables } from './grain-tables.js'
import type { RunProgress } from './progress.js'
import type { RunResult } from './run-result.js'
import { runScene } from './run-scene.js'
import { TRIAL_PACKETS, TRIAL_PIXELS, TRIAL_PRECISION, type Trial } from './trial.js'

/** Runs on the thread of a trial: tells after every step what is known so far. */
const { scene: full, tables } = workerData as { scene: Omit<Scene, 'locate'>; tables: GrainTables }
const scene = inSmall(full)
const trial: Trial = {
  dust: { packets: 0, seconds: 0, noise: 0 },
  light: { packets: 0, seconds: 0, noise: 0 },
  pictures: { fixedSeconds: 0, seconds: 0, count: 0 },
  apertures: { seconds: 0, count: 0 },
  starlightSeconds: 0,
  precision: scene.effort.precision ?? TRIAL_PRECISION,
  complete: false
}
let last = performance.now()
/** The wavelength whose packets count: those before it pay for what a run does once. */
let timed = 0
/** Time for the lower and the upper half of a picture, which are about alike but for what is done once. */
let halves: [number, number] = [0, 0]

const result = await runScene(scene, { workers: 1, estimator: 'emissivity', tables, onProgress: note })
noteNoise(result)
trial.complete = true
parentPort!.postMessage(trial)

/** Books the time since the step before. */
function note({ stage, done, of, observer, index = 0 }: RunProgress): void {
  const seconds = (performance.now() - last) / 1000
  last = performance.now()
  if (stage === 'starlight') trial.starlightSeconds += seconds
  else if (stage === 'dust' || stage === 'light') {
    if (stage === 'light' && index > timed) {
      timed = index
      trial.light.seconds = 0
    }
    trial[stage].seconds += seconds
    trial[stage].packets = done
  } else if (observer?.kind === 'spectrum') {
    trial.apertures.seconds += seconds
    trial.apertures.count++
  } else {
    halves[2 * done <= of ? 0 : 1] += seconds
    if (done === of) {
      const [lower, upper] = halves
      trial.pictures.seconds += 2 * upper
      trial.pictures.fixedSeconds += Math.max(0, lower - upper)
      trial.pictures.count++
      halves = [0, 0]
    }
  }
  parentPort!.postMessage(trial)
}

/** The largest errors that temperatures and scattered packets account for. */
function noteNoise({ images, spectra, precision, equilibrium }: RunResult): void {
  trial.dust.noise = equilibrium?.rounds.at(-1)?.error ?? 0
  const products = [...images, ...spectra]
  precision.forEach(({ photonNoise }, i) => {
    const { total, emitted, scattered } = products[i]
    const count = total.length / photonNoise.length
    photonNoise.forEach((relative, k) => {
      const sum = (values: Float64Array) => values.subarray(k * count, (k + 1) * count).reduce((all, value) => all + value, 0)
      const part = equilibrium && sum(emitted) > sum(scattered) ? trial.dust : trial.light
      part.noise = Math.max(part.noise, relative)
    })
  })
}

function inSmall(full: Omit<Scene, 'locate'>): Scene {
  const few = (wavelengths: number[]) => {
    const at = (share: number) => wavelengths[Math.floor(share * (wavelengths.length - 1))]
    return [...new Set([at(0.25), at(0.75)])]
  }
  const { effort, cameras, spectra, file } = full
  return {
    ...full,
    locate: () => ({ file, line: 1, column: 1 }),
    effort: {
      ...effort,
      precision: Math.max(effort.precision ?? 0, TRIAL_PRECISION),
      equilibrium: TRIAL_PACKETS.dust,
      cameras: TRIAL_PACKETS.light
    },
    cameras: cameras
      .slice(0, 1)
      .map((camera) => ({ ...camera, pixels: [TRIAL_PIXELS, TRIAL_PIXELS], wavelengths: few(camera.wavelengths) })),
    spectra: spectra.slice(0, 1).map((spectrum) => ({ ...spectrum, wavelengths: few(spectrum.wavelengths) }))
  }
}
