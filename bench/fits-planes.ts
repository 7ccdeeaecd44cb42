import { readFileSync } from 'node:fs'

const BLOCK = 2880

/** Image planes of doubles in a FITS file (FITS standard 4.0, sections 3 and 4) by EXTNAME; other extensions are left out. */
export function fitsPlanes(path: string): Map<string, Float64Array> {
  const bytes = readFileSync(path)
  const planes = new Map<string, Float64Array>()
  for (let at = 0; at < bytes.length; ) {
    const header = new Map<string, string>()
    for (let ended = false; !ended; at += BLOCK) {
      for (let card = at; card < at + BLOCK; card += 80) {
        const text = bytes.toString('latin1', card, card + 80)
        if (text.startsWith('END ')) ended = true
        else if (text[8] === '=') header.set(text.slice(0, 8).trim(), text.slice(10).split('/')[0].replaceAll("'", '').trim())
      }
    }
    const axes = Array.from({ length: Number(header.get('NAXIS')) }, (_, i) => Number(header.get(`NAXIS${i + 1}`)))
    const count = axes.length > 0 ? axes.reduce((product, length) => product * length, 1) : 0
    const bits = Math.abs(Number(header.get('BITPIX')))
    if (header.get('BITPIX') === '-64') {
      planes.set(
        header.get('EXTNAME') ?? 'PRIMARY',
        Float64Array.from({ length: count }, (_, i) => bytes.readDoubleBE(at + 8 * i))
      )
    }
    at += Math.ceil((count * bits) / 8 / BLOCK) * BLOCK
  }
  return planes
}
