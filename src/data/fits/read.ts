import { DataError } from '../error.js'
import { bytesOf } from '../read-bytes.js'
import { FitsHeader } from './header.js'

const BLOCK = 2880
const CARD = 80
const MOST_AXES = 999

/** One header-data unit of a file: `data` holds its bytes, big-endian, without padding. */
export interface FitsUnit {
  file: string
  /** `primary`, or `EXTNAME`, or the number of the extension: for messages. */
  name: string
  kind: 'image' | 'table' | 'other'
  header: FitsHeader
  /** Lengths of the axes, the fastest first; empty where there is no data. */
  axes: number[]
  bitpix: number
  data: Uint8Array
}

/** The units of a FITS file. Throws a DataError that says what is wrong and where. */
export function readFits(file: string): FitsUnit[] {
  return parseFits(bytesOf(file), file)
}

/**
 * The units in the bytes of a FITS file (FITS Standard 4.0, section 3): images of every BITPIX and binary tables; what else there is
 * keeps its place in the list as `other`. `file` names it in errors. Throws a DataError.
 */
export function parseFits(bytes: Uint8Array, file: string): FitsUnit[] {
  if (bytes[0] === 0x1f && bytes[1] === 0x8b) throw new DataError(file, 'is compressed; unpack it with gunzip first')
  if (latin(bytes, 0, 9) !== 'SIMPLE  =') throw new DataError(file, 'is not FITS: it does not begin with SIMPLE')
  const units: FitsUnit[] = []
  let at = 0
  while (at < bytes.length && !isFiller(bytes, at)) {
    const { unit, end } = readUnit(bytes, at, file, units.length)
    units.push(unit)
    at = end
  }
  return units
}

/** The image extension (or the primary image) of that name. Throws a DataError that lists what there is. */
export function unitNamed(units: FitsUnit[], name: string): FitsUnit {
  const found = units.find((unit) => unit.name.toUpperCase() === name.toUpperCase())
  if (!found)
    throw new DataError(units[0].file, `has no extension ${name}; there are ${units.map((unit) => unit.name).join(', ')}`)
  return found
}

/** The first unit that holds an image. Throws a DataError where there is none. */
export function firstImage(units: FitsUnit[]): FitsUnit {
  const found = units.find((unit) => unit.kind === 'image' && unit.axes.length >= 2)
  if (!found) throw new DataError(units[0].file, 'holds no image (no unit with two axes or more)')
  return found
}

function readUnit(bytes: Uint8Array, start: number, file: string, index: number): { unit: FitsUnit; end: number } {
  const where = index === 0 ? 'primary header' : `header of extension ${index}`
  const cards: string[] = []
  let at = start
  for (; ; at += CARD) {
    if (at + CARD > bytes.length) throw new DataError(file, `the ${where} has no END; the file is cut short`)
    const card = latin(bytes, at, CARD)
    if (card.startsWith('END') && card.trim() === 'END') break
    cards.push(card)
  }
  const header = new FitsHeader(cards)
  const whole = (keyword: string, least: number, most: number, otherwise?: number): number => {
    const value = header.number(keyword) ?? otherwise
    if (value === undefined || !Number.isInteger(value) || value < least || value > most)
      throw new DataError(file, `the ${where} has ${value === undefined ? 'no' : 'an unsound'} ${keyword}`)
    return value
  }
  const bitpix = whole('BITPIX', -64, 64)
  if (![8, 16, 32, 64, -32, -64].includes(bitpix)) throw new DataError(file, `the ${where} has an unsound BITPIX`)
  const axes = Array.from({ length: whole('NAXIS', 0, MOST_AXES) }, (_, i) => whole(`NAXIS${i + 1}`, 0, Number.MAX_SAFE_INTEGER))
  const extra = index === 0 ? 0 : whole('PCOUNT', 0, Number.MAX_SAFE_INTEGER, 0)
  const groups = index === 0 ? 1 : whole('GCOUNT', 1, Number.MAX_SAFE_INTEGER, 1)
  const values = axes.length === 0 ? 0 : axes.reduce((product, length) => product * length, 1)
  const size = (Math.abs(bitpix) / 8) * groups * (extra + values)
  const from = start + padded(at + CARD - start)
  const name = header.text('EXTNAME') ?? (index === 0 ? 'primary' : String(index))
  if (from + size > bytes.length) throw new DataError(file, `the data of ${name} are cut short`)
  const unit = { file, name, kind: kindOf(header, index), header, axes, bitpix, data: bytes.subarray(from, from + size) }
  return { unit, end: from + padded(size) }
}

function kindOf(header: FitsHeader, index: number): FitsUnit['kind'] {
  if (index === 0) return 'image'
  const type = header.text('XTENSION')
  return type === 'IMAGE' ? (header.has('ZIMAGE') ? 'other' : 'image') : type === 'BINTABLE' ? 'table' : 'other'
}

/** What may follow the last unit: anything that opens no extension (section 3.5, special records). */
function isFiller(bytes: Uint8Array, at: number): boolean {
  return at > 0 && latin(bytes, at, 8) !== 'XTENSION'
}

function padded(size: number): number {
  return Math.ceil(size / BLOCK) * BLOCK
}

function latin(bytes: Uint8Array, at: number, length: number): string {
  return String.fromCharCode(...bytes.subarray(at, at + length))
}
