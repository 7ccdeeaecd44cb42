import { convolve } from '../math/convolve.js'
import { drawNormal, drawPoisson } from '../math/draw.js'
import type { Beam } from './beam.js'
import { beamKernel, type PixelGrid } from './blur.js'

/** Widths of a beam by which a plane of noise is made larger, so that noise at the edge is as elsewhere. */
const MARGIN = 3

/** Normal noise of mean 0 and variance 1, independent in each pixel. */
export function whiteNoise(count: number, random: () => number): Float64Array {
  return Float64Array.from({ length: count }, () => drawNormal(random))
}

/** Normal noise of mean 0 and variance 1, correlated as a beam makes it: white noise seen with the beam. */
export function beamNoise(beam: Beam, grid: PixelGrid, random: () => number): Float64Array {
  const widest = Math.max(beam.width, beam.ellipse?.major ?? 0)
  const margin = Math.ceil((MARGIN * widest) / Math.min(...grid.pixel))
  const wide = { ...grid, width: grid.width + 2 * margin, height: grid.height + 2 * margin }
  const kernel = beamKernel(beam, wide)
  const white = whiteNoise(wide.width * wide.height, random)
  const [noise] = convolve([white], wide.width, wide.height, kernel)
  let power = 0
  for (let dy = 1 - wide.height; dy < wide.height; dy++) {
    for (let dx = 1 - wide.width; dx < wide.width; dx++) power += kernel(dx, dy) ** 2
  }
  const scale = 1 / Math.sqrt(power)
  return Float64Array.from({ length: grid.width * grid.height }, (_, i) => {
    const [x, y] = [i % grid.width, Math.floor(i / grid.width)]
    return scale * noise[(y + margin) * wide.width + x + margin]
  })
}

/** Counts read from pixels that expect so many: Poisson counts, and read noise on top. */
export function countsRead(expected: Float64Array, readNoise: number, random: () => number): Float64Array {
  return expected.map((mean) => drawPoisson(mean, random) + (readNoise > 0 ? readNoise * drawNormal(random) : 0))
}
