import { pixelSolidAngles } from '../camera/frame.js'
import { BULK } from '../camera/survey.js'
import type { ApertureSpectrum, CameraImages } from '../camera/types.js'
import { medianOverBulk } from '../math/stats.js'
import type { PrecisionReached, RunResult } from './run-result.js'

export function precisionOf(images: CameraImages[], spectra: ApertureSpectrum[]): PrecisionReached[] {
  return [
    ...images.map((result): PrecisionReached => {
      const pixels = result.width * result.height
      const solidAngles = pixelSolidAngles(result.camera)
      const photonNoise = result.camera.wavelengths.map((_, k) => {
        const total = result.total.subarray(k * pixels, (k + 1) * pixels)
        const relative = total.map((value, i) => (value > 0 ? result.sigma[k * pixels + i] / value : 0))
        const flux = total.map((value, i) => value * solidAngles[i])
        return total.some((value) => value > 0) ? medianOverBulk(relative, flux, BULK) : 0
      })
      const { name, wavelengths } = result.camera
      return { name, kind: 'camera', wavelengths, photonNoise, samplingError: result.samplingError }
    }),
    ...spectra.map(
      (result): PrecisionReached => ({
        name: result.spectrum.name,
        kind: 'spectrum',
        wavelengths: result.spectrum.wavelengths,
        photonNoise: Array.from(result.total, (value, k) => (value > 0 ? result.sigma[k] / value : 0)),
        samplingError: result.samplingError
      })
    )
  ]
}

/** An error within this factor of the one asked for reaches it: from 16 groups, 1 sigma itself is known to 18 %. */
const SLACK = 1.1

/** Where the precision asked for was missed, relative; nothing when exactly the packets given were to be spent. */
export function missed({ model, precision }: RunResult): { at: PrecisionReached; k: number; error: number }[] {
  const asked = model.scene.effort.precision
  if (asked === null) return []
  return precision.flatMap((at) =>
    at.wavelengths.flatMap((_, k) => {
      const error = Math.max(at.photonNoise[k], at.samplingError[k])
      return error > SLACK * asked ? [{ at, k, error }] : []
    })
  )
}

/** Whether a run reached the precision asked for, in temperatures, images and fluxes. */
export function isReached(result: RunResult): boolean {
  return result.equilibrium?.reached !== false && missed(result).length === 0
}
