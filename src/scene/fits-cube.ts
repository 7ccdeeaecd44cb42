import { SceneError } from './error.js'
import type { DensityCube, Vector } from './types.js'

const BLOCK = 2880
const CARD = 80
/** BITPIX and how to read one value, most significant byte first (FITS Standard 4.0, sections 4.4.1 and 5). */
const readers: Record<number, (view: DataView, at: number) => number> = {
  8: (view, at) => view.getUint8(at),
  16: (view, at) => view.getInt16(at),
  32: (view, at) => view.getInt32(at),
  64: (view, at) => Number(view.getBigInt64(at)),
  [-32]: (view, at) => view.getFloat32(at),
  [-64]: (view, at) => view.getFloat64(at)
}

/**
 * The first image of three axes in a FITS file, as relative density: x is the first axis. Axes of length 1 beyond the third are
 * allowed. `shownAs` names the file in errors. Throws a SceneError.
 */
export function parseDensityCube(bytes: Uint8Array, file: string, shownAs: string): DensityCube {
  const view = new DataView(bytes.buffer, bytes.byteOffset, bytes.byteLength)
  const refuse = (message: string) => new SceneError([{ location: { file: shownAs, line: 1, column: 1 }, key: '', message }])
  if (text(bytes, 0, 9) !== 'SIMPLE  =') throw refuse('the file is not FITS: it does not begin with SIMPLE')
  let at = 0
  while (at + BLOCK <= bytes.length) {
    const header = readHeader(bytes, at)
    if (!header) break
    const { cards, end } = header
    const number = (key: string, otherwise = 0) => {
      const value = cards.has(key) ? Number(cards.get(key)) : otherwise
      if (!Number.isFinite(value)) throw refuse(`${key} = ${cards.get(key)} is not a number`)
      return value
    }
    const axes = Array.from({ length: number('NAXIS') }, (_, i) => number(`NAXIS${i + 1}`))
    const size = Math.abs(number('BITPIX')) / 8
    const count = axes.length === 0 ? 0 : axes.reduce((product, length) => product * length, 1)
    const image = at === 0 || cards.get('XTENSION')?.includes('IMAGE')
    if (image && axes.length >= 3 && axes.slice(3).every((length) => length === 1)) {
      const read = readers[number('BITPIX')]
      if (!read) throw refuse(`BITPIX = ${cards.get('BITPIX')} is not one of ${Object.keys(readers).join(', ')}`)
      if (count === 0) throw refuse('the cube is empty')
      if (end + count * size > bytes.length) throw refuse('the file ends before the cube does')
      const values = size > 4 ? new Float64Array(count) : new Float32Array(count)
      const [zero, scale] = [number('BZERO'), number('BSCALE', 1)]
      let sum = 0
      for (let i = 0; i < count; i++) {
        const value = zero + scale * read(view, end + i * size)
        if (!(value >= 0 && value < 1e30))
          throw refuse(`pixel (${placeOf(i, axes).join(', ')}) is ${value}; densities from 0 up are expected`)
        values[i] = value
        sum += value
      }
      if (!(sum > 0)) throw refuse('every density of the cube is 0')
      return { kind: 'cube', file, size: axes.slice(0, 3) as Vector, values }
    }
    const data = count === 0 ? 0 : size * number('GCOUNT', 1) * (number('PCOUNT') + count)
    at = end + Math.ceil(data / BLOCK) * BLOCK
  }
  throw refuse('the file holds no image of three axes')
}

/** One-based position of a pixel, as FITS counts. */
function placeOf(i: number, [nx, ny]: number[]): number[] {
  return [(i % nx) + 1, (Math.floor(i / nx) % ny) + 1, Math.floor(i / (nx * ny)) + 1]
}

/** Keywords and their values as written, and where the data begin; undefined when the header has no end. */
function readHeader(bytes: Uint8Array, start: number): { cards: Map<string, string>; end: number } | undefined {
  const cards = new Map<string, string>()
  for (let at = start; at + CARD <= bytes.length; at += CARD) {
    const card = text(bytes, at, CARD)
    const key = card.slice(0, 8).trimEnd()
    if (key === 'END') return { cards, end: start + Math.ceil((at + CARD - start) / BLOCK) * BLOCK }
    if (card[8] === '=') cards.set(key, card.slice(10).split('/')[0].trim())
  }
  return undefined
}

function text(bytes: Uint8Array, at: number, length: number): string {
  return String.fromCharCode(...bytes.subarray(at, at + length))
}
