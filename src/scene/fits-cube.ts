import { DataError } from '../data/error.js'
import { imageValuesInto, valueCount } from '../data/fits/image.js'
import { type FitsUnit, parseFits } from '../data/fits/read.js'
import { SceneError } from './error.js'
import type { DensityCube, Vector } from './types.js'

/**
 * The first image of three axes in a FITS file, as relative density: x is the first axis. Axes of length 1 beyond the third are
 * allowed. `shownAs` names the file in errors. Throws a SceneError.
 */
export function parseDensityCube(bytes: Uint8Array, file: string, shownAs: string): DensityCube {
  const refuse = (message: string) => new SceneError([{ location: { file: shownAs, line: 1, column: 1 }, key: '', message }])
  const unit = cubeIn(bytes, shownAs, refuse)
  const count = valueCount(unit)
  if (count === 0) throw refuse('the cube is empty')
  const values = imageValuesInto(Math.abs(unit.bitpix) > 32 ? new Float64Array(count) : new Float32Array(count), unit)
  let sum = 0
  for (let i = 0; i < count; i++) {
    if (!(values[i] >= 0 && values[i] < 1e30))
      throw refuse(`pixel (${placeOf(i, unit.axes).join(', ')}) is ${values[i]}; densities from 0 up are expected`)
    sum += values[i]
  }
  if (!(sum > 0)) throw refuse('every density of the cube is 0')
  return { kind: 'cube', file, size: unit.axes.slice(0, 3) as Vector, values }
}

function cubeIn(bytes: Uint8Array, shownAs: string, refuse: (message: string) => SceneError): FitsUnit {
  try {
    const isCube = ({ kind, axes }: FitsUnit) =>
      kind === 'image' && axes.length >= 3 && axes.slice(3).every((length) => length === 1)
    const cube = parseFits(bytes, shownAs).find(isCube)
    if (cube) return cube
  } catch (error) {
    throw error instanceof DataError ? refuse(`the file ${error.reason}`) : error
  }
  throw refuse('the file holds no image of three axes')
}

/** One-based position of a pixel, as FITS counts. */
function placeOf(i: number, [nx, ny]: number[]): number[] {
  return [(i % nx) + 1, (Math.floor(i / nx) % ny) + 1, Math.floor(i / (nx * ny)) + 1]
}
