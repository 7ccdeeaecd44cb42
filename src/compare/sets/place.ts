import { pixelMean, type SkyVector } from '../../observe/blur.js'
import type { BlurredLight, PointLight } from '../../observe/optics.js'
import type { Placement } from './compared-set.js'

/** The pixel of the data (x and y from 0) at an offset from where the source is, rad. */
export type Place = (east: number, north: number) => [number, number]

/** Where an offset of the model lies after it was turned about its centre and shifted. */
export function moved(place: Place, { east, north, rotation }: Placement): Place {
  const [sin, cos] = [Math.sin(rotation), Math.cos(rotation)]
  return (x, y) => place(east + x * cos + y * sin, north + y * cos - x * sin)
}

/** Steps on the sky (rad) of one pixel to the right and up, at an offset. */
function pixelSteps(place: Place, east: number, north: number): { across: SkyVector; up: SkyVector } {
  const step = 1e-7
  const difference = (one: [number, number], other: [number, number]) => [one[0] - other[0], one[1] - other[1]]
  const [ax, ay] = difference(place(east + step, north), place(east - step, north)).map((value) => value / (2 * step))
  const [bx, by] = difference(place(east, north + step), place(east, north - step)).map((value) => value / (2 * step))
  const determinant = ax * by - ay * bx
  return { across: [by / determinant, -ay / determinant], up: [-bx / determinant, ax / determinant] }
}

export function offsetsOf(place: Place, width: number, height: number) {
  const { across, up } = pixelSteps(place, 0, 0)
  const [x0, y0] = place(0, 0)
  const along = (axis: 0 | 1) =>
    Float64Array.from(
      { length: width * height },
      (_, i) => ((i % width) - x0) * across[axis] + (Math.floor(i / width) - y0) * up[axis]
    )
  return { east: along(0), north: along(1) }
}

/** Adds stars: their beam averaged over each pixel, in the frame of the model. */
export function addPoints(image: Float64Array, { points }: BlurredLight, place: Place, pixels: Int32Array, width: number): void {
  for (const { beam, east, north, flux } of points as PointLight[]) {
    if (flux === 0) continue
    const { across, up } = pixelSteps(place, east, north)
    const [x0, y0] = place(east, north)
    const mean = pixelMean(beam, across, up)
    for (let k = 0; k < pixels.length; k++) {
      const [dx, dy] = [(pixels[k] % width) - x0, Math.floor(pixels[k] / width) - y0]
      image[k] += flux * mean(dx * across[0] + dy * up[0], dx * across[1] + dy * up[1])
    }
  }
}
