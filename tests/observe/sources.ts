import type { StarOnSky } from '../../src/camera/types.js'
import type { LightWeights } from '../../src/observe/band.js'
import type { CameraSource } from '../../src/observe/run-source.js'
import type { PictureSpec, VisibilitiesSpec } from '../../src/observe/types.js'
import { ARCSECOND } from '../../src/units/angles.js'

export const MJY = 1e-17

interface SourceOptions {
  width?: number
  height?: number
  /** arcsec */
  pixel?: number
  wavelengths?: number[]
  stars?: Partial<StarOnSky>[]
  direct?: Float64Array
}

/** A camera whose intensity (cgs) at an offset (arcsec) towards east and north is `intensity`, taken at the centres of pixels. */
export function cameraSource(intensity: (east: number, north: number) => number, options: SourceOptions = {}): CameraSource {
  const { width = 64, height = 64, pixel = 0.1, wavelengths = [1e-3], stars = [] } = options
  const plane = Float64Array.from({ length: width * height }, (_, i) =>
    intensity((width / 2 - (i % width) - 0.5) * pixel, (Math.floor(i / width) + 0.5 - height / 2) * pixel)
  )
  const total = new Float64Array(plane.length * wavelengths.length)
  wavelengths.forEach((_, k) => {
    total.set(plane, k * plane.length)
  })
  const direct = options.direct ?? new Float64Array(total.length)
  return {
    name: 'sky',
    width,
    height,
    pixel: [pixel * ARCSECOND, pixel * ARCSECOND],
    wavelengths,
    total: total.map((value, i) => value + direct[i]),
    sigma: total.map((value) => 0.01 * Math.abs(value)),
    direct,
    stars: stars.map((star) => ({
      name: 'star',
      east: 0,
      north: 0,
      radius: 0,
      limbDarkening: 0,
      flux: new Float64Array(wavelengths.length),
      ...star
    })),
    blanks: 0,
    distance: 3e20
  }
}

/** The only wavelength, or the first. */
export function firstWavelength({ wavelengths }: CameraSource): LightWeights {
  const weights = Float64Array.from(wavelengths, (_, k) => (k === 0 ? 1 : 0))
  return { weights, coarse: weights, wavelength: wavelengths[0] }
}

export function pictureSpec(change: Partial<PictureSpec> = {}): PictureSpec {
  return { name: 'p', kind: 'picture', camera: 'sky', light: { kind: 'line', wavelength: 1e-3 }, unit: 'MJy/sr', ...change }
}

export function visibilitiesSpec(baselines: [number, number][], change: Partial<VisibilitiesSpec> = {}): VisibilitiesSpec {
  const light = { kind: 'line' as const, wavelength: 1e-3 }
  return { name: 'v', kind: 'visibilities', camera: 'sky', light, unit: 'Jy', baselines, ...change }
}

export function total(values: Float64Array): number {
  return values.reduce((sum, value) => sum + value, 0)
}

/** Mean and variances of an image, in pixels, along east, along north, and their covariance. */
export function moments(values: Float64Array, width: number) {
  const sum = total(values)
  const mean = (value: (x: number, y: number) => number) =>
    values.reduce((all, weight, i) => all + weight * value(-(i % width), Math.floor(i / width)), 0) / sum
  const [x, y] = [mean((a) => a), mean((_, b) => b)]
  return {
    east: mean((a) => (a - x) ** 2),
    north: mean((_, b) => (b - y) ** 2),
    across: mean((a, b) => (a - x) * (b - y))
  }
}
