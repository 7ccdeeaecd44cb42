import { card } from './card.js'
import { encodeChecksum, onesComplementSum } from './checksum.js'

const block = 2880
const noSum = '0'.repeat(16)

/**
 * One header-data unit (FITS Standard 4.0, section 3): the cards given, then DATASUM, CHECKSUM and END, padded with
 * spaces to whole blocks of 2880 bytes; then the data, padded with zeros.
 */
export function hdu(cards: string[], data: Uint8Array): Uint8Array {
  const dataSum = onesComplementSum(padded(data, 0))
  const withSum = (checksum: string): string[] => [
    ...cards,
    card('DATASUM', String(dataSum), 'sum of the data words'),
    card('CHECKSUM', checksum, 'makes the sum of the unit minus zero'),
    'END'.padEnd(80)
  ]
  const sum = onesComplementSum(header(withSum(noSum)), dataSum)
  return joined([header(withSum(encodeChecksum(sum))), padded(data, 0)])
}

/** Byte arrays one after another. */
export function joined(parts: Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(parts.reduce((length, part) => length + part.length, 0))
  let at = 0
  for (const part of parts) {
    whole.set(part, at)
    at += part.length
  }
  return whole
}

function header(cards: string[]): Uint8Array {
  return padded(new TextEncoder().encode(cards.join('')), 0x20)
}

function padded(bytes: Uint8Array, filler: number): Uint8Array {
  const whole = new Uint8Array(Math.ceil(bytes.length / block) * block).fill(filler, bytes.length)
  whole.set(bytes)
  return whole
}
