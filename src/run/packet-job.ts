import { apertureDetector, cameraDetector, farView, pixelSolidAngles } from '../camera/frame.js'
import { putModes } from '../camera/noise-modes.js'
import { STOKES, STOKES_PAIRS, type StokesPlanes, stokesPlanes } from '../camera/stokes-planes.js'
import { BULK } from '../camera/survey.js'
import { medianOverBulk, standardError } from '../math/stats.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { emptySums, type GroupSums } from '../solve/group-sums.js'
import { GROUPS } from '../solve/groups.js'
import { scatterMedium } from '../solve/scatter-medium.js'
import { type Detector, detectorPixels } from '../transport/detector.js'
import type { LightJob } from './light-job.js'
import { directFlux, paintStars } from './stars-seen.js'
import type { Wanted } from './wanted.js'

/** Values of all detectors: luminosity per sr (erg/s/Hz/sr). */
interface Caught {
  direct: Float64Array
  emitted: Float64Array
  scattered: Float64Array
  sigma: Float64Array
  /** GROUPS x as many values. */
  modes: Int8Array
  stokes?: StokesPlanes
}

/**
 * Images and fluxes at one wavelength from single packets, by peel-off or exit bins. Direct starlight is calculated for
 * peel-off; exit bins catch it like all other light.
 */
export function packetJob(model: Model, light: DustLight, estimator: 'peel' | 'exit', wanted: Wanted[]): LightJob {
  const medium = scatterMedium(model, light)
  const { effort, seed } = model.scene
  const detectors = wanted.map((want) =>
    want.kind === 'camera' ? cameraDetector(model, want.spec) : apertureDetector(model, want.spec)
  )
  const pixels = detectorPixels(detectors)
  return {
    ...(medium.launch.length > 0 && {
      request: {
        medium,
        task: estimator === 'peel' ? 'peeled' : 'exits',
        input: { detectors },
        tallied: pixels,
        seed: `${seed}/${estimator}/${light.wavelength}`,
        atMost: effort.cameras,
        precision: effort.precision,
        errorOf: async (sums) => largestError(detectors, caughtBy(pixels, sums))
      }
    }),
    develop: async (sums) => {
      const caught = caughtBy(pixels, sums ?? emptySums())
      let offset = 0
      for (const want of wanted) offset = develop(model, light, estimator === 'peel', want, caught, offset)
      return true
    }
  }
}

/** Median relative error over the pixels that hold 95 % of the flux; the largest of all detectors. */
function largestError(detectors: Detector[], { direct, emitted, scattered, sigma }: Caught): number {
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

/** What the packets of all groups brought: each sum holds direct, emitted and scattered light, `pixels` values each. */
function caughtBy(pixels: number, { sums, packets }: GroupSums): Caught {
  const all = packets.reduce((sum, value) => sum + value, 0) || 1
  const mean = new Float64Array(sums[0]?.length ?? 3 * pixels)
  for (const sum of sums) for (let i = 0; i < mean.length; i++) mean[i] += sum[i] / all
  const estimates = new Float64Array(GROUPS)
  const modes = new Int8Array(GROUPS * pixels)
  const sigma = Float64Array.from({ length: pixels }, (_, i) => {
    sums.forEach((sum, g) => {
      estimates[g] = (sum[i] + sum[pixels + i] + sum[2 * pixels + i]) / packets[g]
    })
    const error = standardError(estimates)
    putModes(modes, i, pixels, estimates, error)
    return error
  })
  const [direct, emitted, scattered] = [0, 1, 2].map((part) => mean.subarray(part * pixels, (part + 1) * pixels))
  if (mean.length === 3 * pixels) return { direct, emitted, scattered, sigma, modes }
  const stokes = stokesPlanes(pixels)
  for (const [i, [value, error]] of STOKES_PAIRS.entries()) {
    const from = (3 + i) * pixels
    stokes[value].set(mean.subarray(from, from + pixels))
    for (let pixel = 0; pixel < pixels; pixel++) {
      sums.forEach((sum, g) => {
        estimates[g] = sum[from + pixel] / packets[g]
      })
      stokes[error][pixel] = standardError(estimates)
    }
  }
  return { direct, emitted, scattered, sigma, modes, stokes }
}

/** Writes what a detector caught into its image or spectrum; returns where the next detector's values start. */
function develop(model: Model, light: DustLight, addStars: boolean, want: Wanted, caught: Caught, offset: number): number {
  const { distance } = model.scene
  const view = farView(model, want.spec)
  if (want.kind === 'spectrum') {
    const { result, k, spec } = want
    const area = distance * distance
    const direct = addStars ? directFlux(model, light, view, spec.aperture * distance) : 0
    result.direct[k] = (caught.direct[offset] + direct) / area
    result.emitted[k] = caught.emitted[offset] / area
    result.scattered[k] = caught.scattered[offset] / area
    result.sigma[k] = caught.sigma[offset] / area
    result.total[k] = result.direct[k] + result.emitted[k] + result.scattered[k]
    if (result.stokes && caught.stokes) for (const plane of STOKES) result.stokes[plane][k] = caught.stokes[plane][offset] / area
    return offset + 1
  }
  const { images, k, spec } = want
  const pixels = images.width * images.height
  const at = k * pixels
  // Luminosity per sr divided by the squared distance is flux; by the solid angle of a pixel, intensity.
  const scale = 1 / (distance * distance * pixelSolidAngles(spec)[0])
  const direct = addStars ? paintStars(model, light, view, want) : images.direct.subarray(at, at + pixels)
  if (images.stokes && caught.stokes) {
    for (const plane of STOKES)
      images.stokes[plane].set(
        caught.stokes[plane].subarray(offset, offset + pixels).map((value) => value * scale),
        at
      )
  }
  const detected = caught.sigma.length
  for (let g = 0; g < GROUPS; g++)
    images.modes.set(caught.modes.subarray(g * detected + offset, g * detected + offset + pixels), (k * GROUPS + g) * pixels)
  for (let i = 0; i < pixels; i++) {
    direct[i] += caught.direct[offset + i] * scale
    images.emitted[at + i] = caught.emitted[offset + i] * scale
    images.scattered[at + i] = caught.scattered[offset + i] * scale
    images.sigma[at + i] = caught.sigma[offset + i] * scale
    images.total[at + i] = direct[i] + images.emitted[at + i] + images.scattered[at + i]
  }
  return offset + pixels
}
