import { pixelSrOf } from './blur.js'
import type { CameraSource } from './run-source.js'

/** Complex visibilities, flux densities in cgs. */
export interface ComplexValues {
  re: Float64Array
  im: Float64Array
}

/** Light without that of the stars known, as flux densities of the pixels. */
export function dustOf(source: CameraSource, k: number): Float64Array {
  const { width, height, total, direct, stars } = source
  const pixelSr = pixelSrOf(source)
  const from = k * width * height
  const light = total.slice(from, from + width * height)
  return light.map((value, i) => pixelSr * (stars.length > 0 ? value - direct[from + i] : value))
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
