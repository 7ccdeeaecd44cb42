import type { StarOnSky } from '../camera/types.js'
import { sumOf } from '../math/stats.js'
import { inLight, interpolationError, type LightWeights } from './band.js'
import { type Beam, isChromatic, makeBeam, turned } from './beam.js'
import { blurred, type PixelGrid, pixelMean, pixelSrOf } from './blur.js'
import { noisePlanes } from './noise-planes.js'
import { regridded } from './regrid.js'
import type { CameraSource } from './run-source.js'
import type { PictureSpec } from './types.js'

/** Stars smaller than this part of a pixel fill one pixel (or those that meet at its corner) of a run. */
const UNRESOLVED = 0.25

/** Light in the pixels of a detector, cgs. */
interface SeenLight {
  image: Float64Array
  /** The run's Monte Carlo part: see `noisePlanes`. */
  noise: Float64Array[]
  /** Flux density in the field of the run. */
  flux: number
  /** Estimated relative error of interpolating between wavelengths. */
  bandError: number
}

/** Light behind a beam in the pixels of the run, cgs; stars that are points stand apart, where they are. */
export interface BlurredLight {
  image: Float64Array
  noise: Float64Array[]
  points: PointLight[]
}

/** A star seen with a beam: flux density, erg/s/cm2/Hz, at an offset towards east and north, rad. */
export interface PointLight {
  beam: Beam
  east: number
  north: number
  flux: number
}

type Optics = Pick<PictureSpec, 'beam' | 'core'>

/**
 * Light of dust and stars through beam and band into the pixels of `grid`. Stars that are points in the run's pixels are put where
 * they are, as the beam itself averaged over each pixel; everything else is convolved.
 */
export function throughOptics(optics: Optics, source: CameraSource, light: LightWeights, grid: PixelGrid): SeenLight {
  const seen = throughBeam(optics, source, light)
  const [image, ...noise] = [seen.image, ...seen.noise].map((values) => Float64Array.from(regridded(values, source, grid)))
  for (const point of seen.points) addPoint(image, grid, point)
  const fluxes = source.wavelengths.map((_, k) => fluxAt(source, k, optics))
  return { image, noise, flux: inLight(light, fluxes), bandError: interpolationError(light, fluxes) }
}

/**
 * Light of dust and stars through beam and band in the pixels of the run. A beam that changes with wavelength does so at each
 * wavelength of the run. The beam is turned by `turn` (rad, from north towards east) against the run.
 */
export function throughBeam(
  { beam: spec, core }: Optics,
  source: CameraSource,
  { weights, wavelength }: LightWeights,
  turn = 0
): BlurredLight {
  const starlight = core?.starlight ?? 1
  const points = spec ? pointsOf(source) : []
  const lit = Array.from(weights.keys()).filter((k) => weights[k] !== 0)
  const layers = isChromatic(spec) ? lit.map((k) => ({ at: source.wavelengths[k], of: [k] })) : [{ at: wavelength, of: lit }]
  const all: BlurredLight = { image: new Float64Array(source.width * source.height), noise: [], points: [] }
  for (const { at, of } of layers) {
    const layer = [weightedSum(source, of, weights, starlight, points.length > 0), ...noisePlanes(source, of, weights)]
    const beam = spec && turned(makeBeam(spec, at), turn)
    const [image, ...noise] = beam ? blurred(layer, source, beam) : layer
    add(all.image, image)
    noise.forEach((plane, g) => {
      if (all.noise[g]) add(all.noise[g], plane)
      else all.noise[g] = plane
    })
    for (const { east, north, flux } of points)
      all.points.push({ beam: beam!, east, north, flux: starlight * of.reduce((sum, k) => sum + weights[k] * flux[k], 0) })
  }
  return all
}

/** Stars, when all are points in the pixels of the run. */
function pointsOf({ stars, pixel }: CameraSource): StarOnSky[] {
  const limit = UNRESOLVED * Math.max(...pixel)
  return stars.every(({ radius }) => radius < limit) ? stars : []
}

function fluxAt(source: CameraSource, k: number, { beam, core }: Optics): number {
  const starlight = core?.starlight ?? 1
  const points = beam ? pointsOf(source) : []
  const image = weightedSum(source, [k], new Float64Array(source.wavelengths.length).fill(1), starlight, points.length > 0)
  return sumOf(image) * pixelSrOf(source) + points.reduce((sum, star) => sum + starlight * star.flux[k], 0)
}

/** The sum of some planes of a run, without the direct light of stars that are points. */
function weightedSum(
  { width, height, total, direct }: CameraSource,
  of: number[],
  weights: Float64Array,
  starlight: number,
  withoutDirect: boolean
): Float64Array {
  const pixels = width * height
  const image = new Float64Array(pixels)
  const kept = withoutDirect ? 0 : starlight
  for (const k of of) {
    for (let i = 0, j = k * pixels; i < pixels; i++, j++) image[i] += weights[k] * (total[j] + (kept - 1) * direct[j])
  }
  return image
}

function add(sum: Float64Array, plane: Float64Array): void {
  for (let i = 0; i < sum.length; i++) sum[i] += plane[i]
}

function addPoint(
  image: Float64Array,
  { width, height, pixel: [across, up] }: PixelGrid,
  { beam, east, north, flux }: PointLight
) {
  if (flux === 0) return
  const mean = pixelMean(beam, [across, 0], [0, up])
  for (let y = 0; y < height; y++) {
    const offNorth = (y + 0.5 - height / 2) * up - north
    for (let x = 0; x < width; x++) image[y * width + x] += flux * mean((width / 2 - x - 0.5) * across - east, offNorth)
  }
}
