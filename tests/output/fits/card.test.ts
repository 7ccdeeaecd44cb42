import { describe, expect, it } from 'vitest'
import { ascii, card, commentCard, realCard } from '../../../src/output/fits/card.js'

// Expected cards written by hand from the rules of FITS Standard 4.0, sections 4.1 and 4.2.
describe('card', () => {
  it('puts logical and number values so that they end in column 30', () => {
    expect(card('SIMPLE', true)).toBe('SIMPLE  =                    T'.padEnd(80))
    expect(card('BITPIX', -64, 'bits')).toBe('BITPIX  =                  -64 / bits'.padEnd(80))
  })

  it('writes reals with a decimal point and an upper-case exponent', () => {
    expect(realCard('CRVAL3', 1)).toBe('CRVAL3  =                  1.0'.padEnd(80))
    expect(card('X', 1e-7)).toBe('X       =               1.0E-7'.padEnd(80))
    expect(card('X', 2.5e30)).toBe('X       =              2.5E+30'.padEnd(80))
  })

  it('pads strings to eight characters and doubles their quotes', () => {
    expect(card('XTENSION', 'IMAGE', 'kind')).toBe("XTENSION= 'IMAGE   '           / kind".padEnd(80))
    expect(card('OBJECT', "giant's wind")).toBe("OBJECT  = 'giant''s wind'".padEnd(80))
  })

  it('cuts a long string to one card without splitting a doubled quote', () => {
    const cut = card('OBJECT', `${'a'.repeat(67)}'b`)
    expect(cut).toHaveLength(80)
    expect(cut).toBe(`OBJECT  = '${'a'.repeat(67)}'`.padEnd(80))
  })

  it('reduces text to ASCII', () => {
    expect(ascii('étoile ★\n2')).toBe('etoile ? 2')
    expect(commentCard('§').trimEnd()).toBe('COMMENT ?')
  })
})
