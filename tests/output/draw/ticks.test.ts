import { describe, expect, it } from 'vitest'
import { inferno } from '../../../src/output/draw/colours.js'
import { shortNumber, unitText } from '../../../src/output/draw/numbers.js'
import { linearTicks, logTicks } from '../../../src/output/draw/ticks.js'

const labels = (ticks: { major: { label: string }[] }): string[] => ticks.major.map(({ label }) => label)

describe('ticks', () => {
  it('of linear axes stand at round numbers with equal decimals', () => {
    expect(labels(linearTicks(-6, 6, 6))).toEqual(['−6', '−4', '−2', '0', '2', '4', '6'])
    expect(labels(linearTicks(0, 0.08, 4))).toEqual(['0.00', '0.02', '0.04', '0.06', '0.08'])
  })

  it('take a power of ten out of long labels', () => {
    const ticks = linearTicks(-2e6, 2e6, 4)
    expect(ticks.exponent).toBe(6)
    expect(labels(ticks)).toEqual(['−2', '−1', '0', '1', '2'])
  })

  it('of logarithmic axes stand at decades, or at their parts when decades are few', () => {
    expect(labels(logTicks(1e-3, 10))).toEqual(['0.001', '0.01', '0.1', '1', '10'])
    expect(labels(logTicks(0.5, 20))).toEqual(['1', '3', '10'])
    expect(logTicks(1e-30, 1e30, 6).major.length).toBeLessThanOrEqual(7)
    expect(labels(logTicks(1.01, 1.09)).length).toBeGreaterThan(2)
    expect(labels(logTicks(6.7, 16.7))).toEqual(['8', '10', '12', '14', '16'])
    expect(labels(logTicks(63, 143))).toEqual(['80', '100', '120', '140'])
  })

  it('of short logarithmic axes keep the power of ten in their labels', () => {
    expect(labels(logTicks(8.7e-23, 1.15e-22))).toEqual([
      '9×10⁻²³',
      '9.5×10⁻²³',
      '10⁻²²',
      '1.05×10⁻²²',
      '1.1×10⁻²²',
      '1.15×10⁻²²'
    ])
  })

  it('lie inside their axis over many decades, both ends included', () => {
    for (let decade = -40; decade <= 40; decade += 4) {
      const [low, high] = [1.7 * 10 ** decade, 4.3 * 10 ** (decade + 2)]
      for (const ticks of [linearTicks(low, high, 6), logTicks(low, high)]) {
        expect(ticks.major.length).toBeGreaterThanOrEqual(2)
        for (const { value } of ticks.major) {
          expect(value).toBeGreaterThanOrEqual(low * 0.999)
          expect(value).toBeLessThanOrEqual(high * 1.001)
        }
      }
    }
  })
})

describe('ranges that are none', () => {
  it.each([
    [30, 30],
    [30, 30 * (1 + 2 ** -52)],
    [1e300, 1.0000001e300]
  ])('%d to %d come to an end', (low, high) => {
    for (const { major, minor } of [linearTicks(low, high, 6), logTicks(low, high)])
      expect(major.length + minor.length).toBeLessThan(2000)
  })
})

describe('labels', () => {
  it('use raised digits for powers', () => {
    expect(['0.002', '10⁴', '10⁻⁵', '2.5×10⁻⁷', '−3']).toEqual([0.002, 1e4, 1e-5, 2.5e-7, -3].map((v) => shortNumber(v)))
    expect(unitText('mag/arcsec2')).toBe('mag/arcsec²')
    expect(unitText('W/m2/um')).toBe('W/m²/µm')
  })
})

describe('colour map', () => {
  it('runs between the published ends of inferno (matplotlib _cm_listed.py; recalled from memory)', () => {
    const ends = [
      [0.001462, 0.000466, 0.013866],
      [0.988362, 0.998364, 0.644924]
    ].map((rgb) => rgb.map((part) => Math.round(255 * part)))
    expect([...inferno.subarray(0, 3)]).toEqual(ends[0])
    expect([...inferno.subarray(-3)]).toEqual(ends[1])
  })
})
