import type { CameraImages } from '../../src/camera/types.js'
import { sphericalOf } from '../../src/grid/cells.js'
import type { RunResult } from '../../src/run/run-result.js'
import { LIGHT_SPEED } from '../../src/units/constants.js'

export type Part = 'total' | 'direct' | 'emitted' | 'scattered' | 'sigma'

/** Values of one wavelength of a camera, height x width, row 0 the lowest. */
export function plane(images: CameraImages, part: Part, k = 0): Float64Array {
  const pixels = images.width * images.height
  return images[part].subarray(k * pixels, (k + 1) * pixels)
}

/** Sum of an image times the solid angle of its pixels, erg/s/cm2/Hz. */
export function fluxOf(images: CameraImages, part: Part, k = 0): number {
  const { camera, width, height } = images
  const pixel = (camera.field[0] * camera.field[1]) / (width * height)
  return sumOf(plane(images, part, k)) * pixel
}

export function sumOf(values: Iterable<number>): number {
  let sum = 0
  for (const value of values) sum += value
  return sum
}

/** Spectral luminosity of the first star at a wavelength in cm, erg/s/Hz. */
export function starlight(result: RunResult, wavelength: number): number {
  return result.model.stars[0].spectrum.luminosityNu(LIGHT_SPEED / wavelength)
}

/** Radius of the middle of each radial cell of a spherical model without its core, cm, and the temperatures of a component. */
export function radialTemperatures(
  { model, dust }: RunResult,
  component = 0
): { r: number; temperature: number; sigma: number }[] {
  const { r } = sphericalOf(model.walls)
  const rows = []
  for (let i = 1; i < r.length - 1; i++) {
    const at = component * model.cells + i
    rows.push({ r: Math.sqrt(r[i] * r[i + 1]), temperature: dust.temperature[at], sigma: dust.sigma[at] })
  }
  return rows
}
