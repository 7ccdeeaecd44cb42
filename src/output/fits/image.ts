import { card, realCard } from './card.js'
import { hdu } from './hdu.js'

/**
 * An image HDU of 64-bit IEEE reals (BITPIX -64), big-endian. `axes` are the lengths of the axes, the fastest first;
 * `values` holds their product of numbers. `place` says whether it opens the file. Values that are not finite become NaN,
 * the blank of floating-point images.
 */
export function imageHdu(place: 'primary' | 'extension', axes: number[], values: Float64Array, cards: string[]): Uint8Array {
  const structure = [
    place === 'primary' ? card('SIMPLE', true, 'FITS Standard 4.0') : card('XTENSION', 'IMAGE', 'image extension'),
    card('BITPIX', -64, '64-bit IEEE floating point'),
    card('NAXIS', axes.length),
    ...axes.map((length, i) => card(`NAXIS${i + 1}`, length)),
    ...(place === 'primary' ? [card('EXTEND', true)] : [card('PCOUNT', 0), card('GCOUNT', 1)])
  ]
  const data = new Uint8Array(8 * values.length)
  const view = new DataView(data.buffer)
  for (let i = 0; i < values.length; i++) view.setFloat64(8 * i, Number.isFinite(values[i]) ? values[i] : Number.NaN)
  return hdu([...structure, ...cards], data)
}

/**
 * An image extension of bytes, whose values are whole numbers of steps: bytes stand for 1/`steps` each, counted from 128 (BITPIX 8 with
 * BZERO and BSCALE).
 */
export function stepsHdu(axes: number[], values: Int8Array, steps: number, cards: string[]): Uint8Array {
  const structure = [
    card('XTENSION', 'IMAGE', 'image extension'),
    card('BITPIX', 8, 'unsigned bytes'),
    card('NAXIS', axes.length),
    ...axes.map((length, i) => card(`NAXIS${i + 1}`, length)),
    card('PCOUNT', 0),
    card('GCOUNT', 1),
    realCard('BSCALE', 1 / steps),
    realCard('BZERO', -128 / steps)
  ]
  return hdu(
    [...structure, ...cards],
    Uint8Array.from(values, (value) => value + 128)
  )
}

/** A primary HDU without data, for files that hold only tables. */
export function emptyPrimary(cards: string[]): Uint8Array {
  const structure = [card('SIMPLE', true, 'FITS Standard 4.0'), card('BITPIX', 8), card('NAXIS', 0), card('EXTEND', true)]
  return hdu([...structure, ...cards], new Uint8Array(0))
}
