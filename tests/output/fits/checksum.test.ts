import { describe, expect, it } from 'vitest'
import { encodeChecksum, onesComplementSum } from '../../../src/output/fits/checksum.js'

describe('checksum', () => {
  it('encodes the worked example of the FITS checksum proposal (Seaman, Pence & Rots 1995; recalled from memory)', () => {
    expect(encodeChecksum(868229149)).toBe('hcHjjc9ghcEghc9g')
  })

  it('carries overflow round to the lowest bit', () => {
    // By hand: 0xffffffff + 0x00000002 = 0x1_00000001, whose carry makes 0x00000002.
    expect(onesComplementSum(new Uint8Array([255, 255, 255, 255, 0, 0, 0, 2]))).toBe(2)
  })

  it('makes any sum minus zero with letters and digits only', () => {
    // As in a CHECKSUM card: the code begins one byte before a word of four.
    const frame = (code: string): Uint8Array => new TextEncoder().encode(`\0\0\0${code}\0`)
    const zeros = onesComplementSum(frame('0'.repeat(16)))
    for (let i = 0; i < 2000; i++) {
      const rest = Math.imul(i, 0x9e3779b1) >>> 0
      const total = rest + zeros
      const code = encodeChecksum(total > 0xffffffff ? total - 0xffffffff : total)
      expect(code).toMatch(/^[0-9A-Za-z]{16}$/)
      expect(onesComplementSum(frame(code), rest)).toBe(0xffffffff)
    }
  })
})
