import { stream } from '../math/random.js'
import { sumOf } from '../math/stats.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { IntensityContext } from '../units/intensity.js'
import type { SpectralUnit } from '../units/spectral-unit.js'
import type { LightWeights } from './band.js'
import { type Beam, makeBeam } from './beam.js'
import { type PixelGrid, pixelSrOf, pixelsAcross } from './blur.js'
import { beamNoise, countsRead, whiteNoise } from './noise.js'
import { sigmaOf } from './noise-planes.js'
import { throughOptics } from './optics.js'
import { detectorGrid } from './regrid.js'
import type { CameraSource } from './run-source.js'
import type { PictureNoise, PictureSpec } from './types.js'
import { COUNTS, countsUnit, fluxOf, intensityOf, pictureUnit } from './unit.js'

/** A picture as an instrument records it: cgs intensities in pixels of `grid`, rows from south to north; NaN under the mask. */
export interface Picture {
  spec: PictureSpec
  grid: PixelGrid
  /** cm; the pivot of a band. */
  wavelength: number
  observed: Float64Array
  /** The same without noise. */
  expected: Float64Array
  /** 1 sigma of the run's Monte Carlo part. */
  sigma: Float64Array
  /** 1 sigma of the instrument's noise; absent without. */
  noise?: Float64Array
  beam?: Beam
  unit: SpectralUnit<IntensityContext>
  context: IntensityContext
  /** Flux density in the run's field and in the picture, erg/s/cm2/Hz: the beam sends light past the edges. */
  flux: { source: number; inPicture: number }
  /** Estimated relative error of the interpolation between the run's wavelengths. */
  bandError: number
  /** Pixels of the run across the beam. */
  fineness?: number
  /** Light that the edge of the picture would add if it went on for as large an area, relative to the flux in the picture. */
  edge: number
  masked: number
}

/** Observes a camera of a run; `seed` is that of the noise. */
export function takePicture(spec: PictureSpec, source: CameraSource, light: LightWeights, seed: string): Picture {
  const grid = detectorGrid(source, spec.pixel)
  const beam = spec.beam && makeBeam(spec.beam, light.wavelength)
  const context: IntensityContext = {
    frequencyHz: LIGHT_SPEED / light.wavelength,
    pixelSr: pixelSrOf(grid),
    ...(beam && { beamSr: beam.solidAngle })
  }
  const seen = throughOptics(spec, source, light, grid)
  const zero = spec.zeroMagnitude
  const background = spec.background ? intensityOf(spec.background.level, context, zero) : 0
  const removed = spec.background?.subtracted ? background : 0
  const expected = seen.image.map((value) => value + background - removed)
  const { noise } = spec
  const count = noise?.kind === 'exposure' ? fluxOf(noise.zeroPoint, context.frequencyHz, zero) / noise.time / context.pixelSr : 1
  const made =
    noise && makeNoise(noise, { expected, removed, count, grid, beam, context, random: stream(`${seed}/${spec.name}`) })
  const hidden = underMask(spec.core?.radius, grid)
  const masked = (values: Float64Array) => values.map((value, i) => (hidden[i] ? Number.NaN : value))
  return {
    spec,
    grid,
    wavelength: light.wavelength,
    observed: masked(made?.observed ?? expected),
    expected: masked(expected),
    sigma: masked(sigmaOf(seen.noise)),
    ...(made && { noise: masked(made.sigma) }),
    ...(beam && { beam, fineness: pixelsAcross(beam, source) }),
    unit: spec.unit === COUNTS ? countsUnit(count) : pictureUnit(spec.unit, zero),
    context,
    flux: { source: seen.flux, inPicture: sumOf(seen.image) * context.pixelSr },
    bandError: seen.bandError,
    edge: edgeOf(seen.image, grid),
    masked: hidden.reduce((sum, value) => sum + value, 0)
  }
}

interface NoiseCircumstances {
  expected: Float64Array
  /** Background that is taken off again, and the intensity of one count in a pixel. */
  removed: number
  count: number
  grid: PixelGrid
  beam: Beam | undefined
  context: IntensityContext
  random: () => number
}

/** A picture with noise, and the 1 sigma of that noise. */
function makeNoise(noise: PictureNoise, { expected, removed, count, grid, beam, context, random }: NoiseCircumstances) {
  if (noise.kind === 'rms') {
    const rms = intensityOf(noise.level, context)
    const drawn = noise.per === 'beam' ? beamNoise(beam!, grid, random) : whiteNoise(expected.length, random)
    return { observed: expected.map((value, i) => value + rms * drawn[i]), sigma: new Float64Array(expected.length).fill(rms) }
  }
  const counts = expected.map((value) => Math.max(0, value + removed) / count)
  const read = countsRead(counts, noise.readNoise, random)
  return {
    observed: read.map((value) => value * count - removed),
    sigma: counts.map((value) => count * Math.sqrt(value + noise.readNoise ** 2))
  }
}

function underMask(radius: number | undefined, { width, height, pixel }: PixelGrid): Uint8Array {
  const hidden = new Uint8Array(width * height)
  if (radius === undefined) return hidden
  for (let y = 0; y < height; y++) {
    for (let x = 0; x < width; x++) {
      const distance = Math.hypot((x + 0.5 - width / 2) * pixel[0], (y + 0.5 - height / 2) * pixel[1])
      hidden[y * width + x] = distance < radius ? 1 : 0
    }
  }
  return hidden
}

function edgeOf(image: Float64Array, { width, height }: PixelGrid): number {
  let sum = 0
  let count = 0
  for (let i = 0; i < image.length; i++) {
    const [x, y] = [i % width, Math.floor(i / width)]
    if (x > 0 && y > 0 && x < width - 1 && y < height - 1) continue
    sum += image[i]
    count++
  }
  const all = sumOf(image)
  return all > 0 ? ((sum / count) * image.length) / all : 0
}
