import { DataError } from '../data/error.js'
import { imageValues } from '../data/fits/image.js'
import { pixelMatrix } from '../data/fits/pixel-matrix.js'
import { firstImage, parseFits } from '../data/fits/read.js'
import { sumOf } from '../math/stats.js'
import type { Kernel } from './types.js'

/**
 * A beam from the first image in the bytes of a FITS file. Its scale is that of the header (CDELT or CD); its centre is the middle of
 * the image. Throws a DataError.
 */
export function parseKernel(bytes: Uint8Array, file: string): Kernel {
  const unit = firstImage(parseFits(bytes, file))
  const [width, height, ...more] = unit.axes
  if (more.some((length) => length !== 1)) throw new DataError(file, 'is a cube; a beam is an image of two axes')
  const matrix = pixelMatrix(unit)
  if (!matrix) throw new DataError(file, 'has no pixel scale (CDELT1 and CDELT2, or CD1_1 to CD2_2, deg)')
  const values = imageValues(unit)
  const bad = values.reduce((count, value) => count + (Number.isFinite(value) ? 0 : 1), 0)
  if (bad > 0) throw new DataError(file, `${bad} of ${values.length} pixels of the beam have no value`)
  const sum = sumOf(values)
  if (!(sum > 0)) throw new DataError(file, 'the pixels of the beam do not add up to more than 0')
  const { perEast, perNorth, pixelSr } = matrix
  return { file, width, height, values, centre: [(width - 1) / 2, (height - 1) / 2], perEast, perNorth, pixelSr }
}
