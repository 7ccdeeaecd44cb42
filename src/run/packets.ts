import { addDirectLight, directLight, starImage } from '../camera/direct.js'
import { apertureDetector, cameraDetector, pixelFrame, pixelSolidAngle, seenFrom } from '../camera/frame.js'
import { rayMedium } from '../camera/ray-medium.js'
import { BULK } from '../camera/survey.js'
import { medianOverBulk, standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { GROUPS } from '../solve/groups.js'
import { playRounds, type RoundsProgress } from '../solve/rounds.js'
import { scatterMedium } from '../solve/scatter-medium.js'
import { detectorPixels } from '../transport/detector.js'
import type { PixelTally } from '../transport/peel.js'
import type { WorkerPool } from '../workers/pool.js'
import { depthTo, type Wanted } from './wavelength.js'

export type Estimator = 'emissivity' | 'peel' | 'exit'

/** Values of all detectors: luminosity per sr (erg/s/Hz/sr), with the groups' sums for the error. */
interface Caught {
  direct: Float64Array
  emitted: Float64Array
  scattered: Float64Array
  sigma: Float64Array
}

/**
 * Images and fluxes at one wavelength from single packets, by peel-off or exit bins. Resolves to the packets spent.
 * Direct starlight is calculated for peel-off; exit bins catch it like all other light.
 */
export async function packetsAtWavelength(
  model: Model,
  light: DustLight,
  estimator: 'peel' | 'exit',
  wanted: Wanted[],
  pool: WorkerPool,
  onProgress: (progress: RoundsProgress) => void,
  stop?: AbortSignal
): Promise<number | 'stopped'> {
  const medium = scatterMedium(model, light)
  const { effort, seed } = model.scene
  const detectors = wanted.map((want) =>
    want.kind === 'camera' ? cameraDetector(model, want.spec) : apertureDetector(model, want.spec)
  )
  const pixels = detectorPixels(detectors)
  const parts = { direct: new Float64Array(pixels), emitted: new Float64Array(pixels), scattered: new Float64Array(pixels) }
  const groups = Array.from({ length: GROUPS }, () => new Float64Array(pixels))
  const packetsOf = new Array<number>(GROUPS).fill(0)
  const caught = (): Caught => finish(parts, groups, packetsOf)
  let packets: number | 'stopped' = 0
  if (medium.launch.length > 0) {
    pool.share('scattering', medium)
    packets = await playRounds(
      {
        task: estimator === 'peel' ? 'peeled' : 'exits',
        input: { detectors },
        seed: `${seed}/${estimator}/${light.wavelength}`,
        atMost: effort.cameras,
        precision: effort.precision,
        add: (output, group, share) => {
          const tally = output as PixelTally & { direct?: Float64Array }
          packetsOf[group] += share
          for (const part of ['direct', 'emitted', 'scattered'] as const) {
            const values = tally[part]
            if (!values) continue
            for (let i = 0; i < pixels; i++) {
              parts[part][i] += share * values[i]
              groups[group][i] += share * values[i]
            }
          }
        },
        errorOf: () => {
          const { direct, emitted, scattered, sigma } = caught()
          let offset = 0
          return Math.max(
            ...detectors.map(({ width, height }) => {
              const total = Float64Array.from(
                { length: width * height },
                (_, i) => direct[offset + i] + emitted[offset + i] + scattered[offset + i]
              )
              const relative = total.map((value, i) => (value > 0 ? sigma[offset + i] / value : 0))
              offset += width * height
              return total.some((value) => value > 0) ? medianOverBulk(relative, total, BULK) : 0
            })
          )
        }
      },
      pool,
      onProgress,
      stop
    )
    pool.forget('scattering')
    if (packets === 'stopped') return packets
  }
  const result = caught()
  let offset = 0
  for (const want of wanted) offset = develop(model, light, estimator === 'peel', want, result, offset)
  return packets
}

function finish(
  parts: { direct: Float64Array; emitted: Float64Array; scattered: Float64Array },
  groups: Float64Array[],
  packets: number[]
): Caught {
  const all = packets.reduce((sum, value) => sum + value, 0) || 1
  const estimates = new Float64Array(GROUPS)
  const sigma = parts.direct.map((_, i) => {
    for (let g = 0; g < GROUPS; g++) estimates[g] = packets[g] > 0 ? groups[g][i] / packets[g] : 0
    return standardError(estimates)
  })
  const scale = (values: Float64Array) => values.map((value) => value / all)
  return { direct: scale(parts.direct), emitted: scale(parts.emitted), scattered: scale(parts.scattered), sigma }
}

/** Writes what a detector caught into its image or spectrum; returns where the next detector's values start. */
function develop(model: Model, light: DustLight, addStars: boolean, want: Wanted, caught: Caught, offset: number): number {
  const { distance } = model.scene
  const view = seenFrom(model, want.spec.view)
  const depthAt = depthTo(rayMedium(model, light, undefined), view)
  const stars = addStars ? model.stars.map(({ spec, spectrum }) => starImage(spec, spectrum, light.nu)) : []
  if (want.kind === 'spectrum') {
    const { result, k, spec } = want
    const area = distance * distance
    const direct = stars.reduce((sum, star) => sum + directLight(star, depthAt, spec.aperture * distance), 0)
    result.direct[k] = (caught.direct[offset] + direct) / area
    result.emitted[k] = caught.emitted[offset] / area
    result.scattered[k] = caught.scattered[offset] / area
    result.sigma[k] = caught.sigma[offset] / area
    result.total[k] = result.direct[k] + result.emitted[k] + result.scattered[k]
    return offset + 1
  }
  const { images, k, spec } = want
  const pixels = images.width * images.height
  const at = k * pixels
  // Luminosity per sr divided by the squared distance is flux; by the solid angle of a pixel, intensity.
  const scale = 1 / (distance * distance * pixelSolidAngle(spec))
  const direct = images.direct.subarray(at, at + pixels)
  for (const star of stars) addDirectLight(star, depthAt, pixelFrame(spec, distance), direct)
  for (let i = 0; i < pixels; i++) {
    direct[i] += caught.direct[offset + i] * scale
    images.emitted[at + i] = caught.emitted[offset + i] * scale
    images.scattered[at + i] = caught.scattered[offset + i] * scale
    images.sigma[at + i] = caught.sigma[offset + i] * scale
    images.total[at + i] = direct[i] + images.emitted[at + i] + images.scattered[at + i]
  }
  return offset + pixels
}
