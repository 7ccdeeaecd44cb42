import { convolve } from '../math/convolve.js'
import { gaussLegendre } from '../math/quadrature.js'
import type { Beam } from './beam.js'

/** Pixels of an image: how many, and their sides, rad. x runs to the right (west), y up (north). */
export interface PixelGrid {
  width: number
  height: number
  pixel: [number, number]
}

/** Solid angle of a pixel, sr. */
export function pixelSrOf({ pixel: [across, up] }: PixelGrid): number {
  return across * up
}

/** Fewest pixels across a beam at which its value at the centre of a pixel stands for the whole pixel. */
const FINE = 2
const POINTS = 4

/** Pixels across the smallest width of a beam. */
export function pixelsAcross(beam: Beam, { pixel }: PixelGrid): number {
  return beam.width / Math.max(...pixel)
}

/**
 * The weight of a beam in a pixel at whole offsets (to the right, up). An image of pixel means, convolved with a beam sampled at the
 * centres of pixels, is the convolved sky in pixel means, as long as the beam is FINE pixels wide; a narrower one is averaged over
 * pixels. A beam given as an image is scaled to a sum of 1.
 */
export function beamKernel(beam: Beam, grid: PixelGrid): (dx: number, dy: number) => number {
  const [across, up] = grid.pixel
  const pixelSr = pixelSrOf(grid)
  const mean = pixelsAcross(beam, grid) < FINE ? pixelMean(beam, [across, 0], [0, up]) : beam.at
  const kernel = (dx: number, dy: number) => pixelSr * mean(-dx * across, dy * up)
  if (beam.ellipse) return kernel
  let sum = 0
  for (let dy = 1 - grid.height; dy < grid.height; dy++) {
    for (let dx = 1 - grid.width; dx < grid.width; dx++) sum += kernel(dx, dy)
  }
  return (dx, dy) => kernel(dx, dy) / sum
}

/** A vector on the sky towards east and north, rad. */
export type SkyVector = [east: number, north: number]

/**
 * The mean of a beam over the pixel centred at an offset, by a Gauss-Legendre sum with POINTS points across the beam; `across` and `up`
 * are the sides of the pixel.
 */
export function pixelMean(beam: Beam, across: SkyVector, up: SkyVector): (east: number, north: number) => number {
  const [columns, rows] = [across, up].map((side) =>
    gaussLegendre(2 + Math.ceil((POINTS * Math.hypot(side[0], side[1])) / beam.width))
  )
  return (east, north) => {
    let sum = 0
    for (let j = 0; j < rows.nodes.length; j++) {
      const [x, y] = [east + 0.5 * up[0] * rows.nodes[j], north + 0.5 * up[1] * rows.nodes[j]]
      let row = 0
      for (let i = 0; i < columns.nodes.length; i++) {
        const half = 0.5 * columns.nodes[i]
        row += columns.weights[i] * beam.at(x + half * across[0], y + half * across[1])
      }
      sum += rows.weights[j] * row
    }
    return sum / 4
  }
}

/** Planes of the pixels of a grid seen with a beam. */
export function blurred(planes: Float64Array[], grid: PixelGrid, beam: Beam): Float64Array[] {
  return convolve(planes, grid.width, grid.height, beamKernel(beam, grid))
}
