import type { LightWeights } from './band.js'
import { type Beam, isChromatic, makeBeam } from './beam.js'
import { blurred, type PixelGrid, pixelMean, pixelSrOf } from './blur.js'
import { regridded } from './regrid.js'
import type { CameraSource } from './run-source.js'
import { sumOf } from './sum-of.js'
import type { PictureSpec } from './types.js'

/** Stars smaller than this part of a pixel fill one pixel (or those that meet at its corner) of a run. */
const UNRESOLVED = 0.25

/** Light in the pixels of a detector, cgs. */
interface SeenLight {
  image: Float64Array
  /** 1 sigma of the run's Monte Carlo part, as if the noise of all that is added up were alike: an upper limit. */
  sigma: Float64Array
  /** Flux density in the field of the run. */
  flux: number
  /** Estimated relative error of interpolating between wavelengths. */
  bandError: number
}

/**
 * Light of dust and stars through beam and band into the pixels of `grid`. Stars that are points in the run's pixels are put where
 * they are, as the beam itself averaged over each pixel; everything else is convolved. A beam that changes with wavelength does so
 * at each wavelength of the run.
 */
export function throughOptics(
  { beam: spec, core }: PictureSpec,
  source: CameraSource,
  { weights, coarse, wavelength }: LightWeights,
  grid: PixelGrid
): SeenLight {
  const starlight = core?.starlight ?? 1
  const limit = UNRESOLVED * Math.max(...source.pixel)
  const points = spec && source.stars.every(({ radius }) => radius < limit) ? source.stars : []
  const lit = Array.from(weights.keys()).filter((k) => weights[k] !== 0)
  const layers = isChromatic(spec) ? lit.map((k) => ({ at: source.wavelengths[k], of: [k] })) : [{ at: wavelength, of: lit }]
  const image = new Float64Array(grid.width * grid.height)
  const sigma = new Float64Array(image.length)
  for (const { at, of } of layers) {
    const layer = weightedSum(source, of, weights, starlight, points.length > 0)
    const beam = spec && makeBeam(spec, at)
    const seen = beam ? blurred(layer.image, layer.sigma, source, beam) : layer
    regridded(seen.image, source, grid).forEach((value, i) => {
      image[i] += value
    })
    regridded(seen.sigma, source, grid).forEach((value, i) => {
      sigma[i] += value
    })
    for (const { east, north, flux } of points)
      addPoint(image, grid, beam!, east, north, starlight * of.reduce((sum, k) => sum + weights[k] * flux[k], 0))
  }
  const fluxes = source.wavelengths.map((_, k) => {
    const { image: all } = weightedSum(source, [k], new Float64Array(weights.length).fill(1), starlight, points.length > 0)
    return sumOf(all) * pixelSrOf(source) + points.reduce((sum, star) => sum + starlight * star.flux[k], 0)
  })
  const inBand = (parts: Float64Array) => fluxes.reduce((sum, flux, k) => sum + parts[k] * flux, 0)
  const flux = inBand(weights)
  return { image, sigma, flux, bandError: flux > 0 ? Math.abs(inBand(coarse) - flux) / 3 / flux : 0 }
}

/** The sum of some planes of a run, without the direct light of stars that are points. */
function weightedSum(
  { width, height, total, direct, sigma }: CameraSource,
  of: number[],
  weights: Float64Array,
  starlight: number,
  withoutDirect: boolean
): { image: Float64Array; sigma: Float64Array } {
  const pixels = width * height
  const image = new Float64Array(pixels)
  const noise = new Float64Array(pixels)
  const kept = withoutDirect ? 0 : starlight
  for (const k of of) {
    for (let i = 0, j = k * pixels; i < pixels; i++, j++) {
      image[i] += weights[k] * (total[j] + (kept - 1) * direct[j])
      noise[i] += weights[k] * sigma[j]
    }
  }
  return { image, sigma: noise }
}

function addPoint(image: Float64Array, grid: PixelGrid, beam: Beam, east: number, north: number, flux: number): void {
  if (flux === 0) return
  const { width, height, pixel } = grid
  const mean = pixelMean(beam, grid)
  for (let y = 0; y < height; y++) {
    const offNorth = (y + 0.5 - height / 2) * pixel[1] - north
    for (let x = 0; x < width; x++) image[y * width + x] += flux * mean((width / 2 - x - 0.5) * pixel[0] - east, offNorth)
  }
}
