import { DataError } from '../error.js'
import type { FitsUnit } from './read.js'

/**
 * The values of an image, the first axis fastest, scaled by BSCALE and BZERO; NaN where integers equal BLANK
 * (FITS Standard 4.0, sections 4.4.2.5 and 5). Integers of 64 bits beyond 2^53 are rounded. Throws a DataError.
 */
export function imageValues(unit: FitsUnit): Float64Array {
  return imageValuesInto(new Float64Array(valueCount(unit)), unit)
}

/** The number of values of an image. */
export function valueCount({ axes }: FitsUnit): number {
  return axes.length === 0 ? 0 : axes.reduce((product, length) => product * length, 1)
}

/** The same, written into an array of that many numbers. */
export function imageValuesInto<Values extends Float64Array | Float32Array>(
  values: Values,
  { file, name, kind, header, axes, bitpix, data }: FitsUnit
): Values {
  if (kind !== 'image' || axes.length === 0) throw new DataError(file, `${name} holds no image`)
  const view = new DataView(data.buffer, data.byteOffset, data.byteLength)
  const bytes = Math.abs(bitpix) / 8
  const get = getters[bitpix]
  const scale = header.number('BSCALE') ?? 1
  const zero = header.number('BZERO') ?? 0
  const blank = bitpix > 0 ? header.number('BLANK') : undefined
  for (let i = 0; i < values.length; i++) {
    const stored = get(view, i * bytes)
    values[i] = stored === blank ? Number.NaN : zero + scale * stored
  }
  return values
}

const getters: Record<number, (view: DataView, at: number) => number> = {
  8: (view, at) => view.getUint8(at),
  16: (view, at) => view.getInt16(at),
  32: (view, at) => view.getInt32(at),
  64: (view, at) => Number(view.getBigInt64(at)),
  [-32]: (view, at) => view.getFloat32(at),
  [-64]: (view, at) => view.getFloat64(at)
}
