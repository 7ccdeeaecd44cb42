import { pixelSrOf } from './blur.js'
import type { CameraSource } from './run-source.js'

/** Complex visibilities, flux densities in cgs. */
export interface ComplexValues {
  re: Float64Array
  im: Float64Array
}

/** Light without that of the stars known, and 1 sigma of its pixels, as flux densities; `scatter`: the variance of their sum if pixels are independent. */
export function planeOf({ width, height, total, direct, sigma, stars: known, ...grid }: CameraSource, k: number) {
  const pixels = width * height
  const pixelSr = pixelSrOf({ width, height, pixel: grid.pixel })
  const slice = (values: Float64Array) => values.slice(k * pixels, (k + 1) * pixels).map((value) => value * pixelSr)
  const [all, stars, noise] = [slice(total), slice(direct), slice(sigma)]
  return {
    dust: known.length > 0 ? all.map((value, i) => value - stars[i]) : all,
    sigma: noise,
    scatter: noise.reduce((sum, value) => sum + value * value, 0)
  }
}

/**
 * V(u, v) = int I exp(-2 pi i (u l + v m)) dl dm, l towards east and m towards north (Thompson, Moran & Swenson, Interferometry and
 * Synthesis in Radio Astronomy, chapter 2), of fluxes in pixels; u, v in wavelengths. A pixel is the mean over its square, whose own
 * transform is divided out.
 */
export function transformed(
  flux: Float64Array,
  { width, height, pixel }: CameraSource,
  u: number,
  v: number
): { re: number; im: number } {
  const across = phases(width, -u * pixel[0])
  const up = phases(height, v * pixel[1])
  let re = 0
  let im = 0
  for (let y = 0; y < height; y++) {
    let rowRe = 0
    let rowIm = 0
    for (let x = 0; x < width; x++) {
      rowRe += flux[y * width + x] * across[2 * x]
      rowIm += flux[y * width + x] * across[2 * x + 1]
    }
    re += rowRe * up[2 * y] - rowIm * up[2 * y + 1]
    im += rowRe * up[2 * y + 1] + rowIm * up[2 * y]
  }
  const square = sinc(u * pixel[0]) * sinc(v * pixel[1])
  return { re: re / square, im: im / square }
}

/** cos and sin of -2 pi f times the offset of each pixel from the middle, in pixels. */
function phases(count: number, f: number): Float64Array {
  const values = new Float64Array(2 * count)
  for (let i = 0; i < count; i++) {
    const angle = -2 * Math.PI * f * (i + 0.5 - count / 2)
    values[2 * i] = Math.cos(angle)
    values[2 * i + 1] = Math.sin(angle)
  }
  return values
}

/** sin(pi x) / (pi x) */
export function sinc(x: number): number {
  return x === 0 ? 1 : Math.sin(Math.PI * x) / (Math.PI * x)
}
