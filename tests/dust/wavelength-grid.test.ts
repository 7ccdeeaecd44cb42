import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { blackbodyRange, transportWavelengths } from '../../src/dust/wavelength-grid.js'

describe('transportWavelengths', () => {
  it('covers the range asked for in bins at most 1.5 % wide, with an edge at, or half a bin from, each breakpoint', () => {
    const wavelength = fc.double({ min: Math.log(1e-7), max: Math.log(30), noNaN: true }).map(Math.exp)
    fc.assert(
      fc.property(wavelength, wavelength, fc.array(wavelength, { maxLength: 40 }), (shortest, longest, breakpoints) => {
        const grid = transportWavelengths(shortest, longest, breakpoints)
        const { count, edges, centres, widthsHz } = grid
        expect(edges).toHaveLength(count + 1)
        expect(edges[0]).toBe(Math.min(shortest, 5e-6))
        expect(edges[count]).toBe(Math.max(longest, 3))
        for (let k = 0; k < count; k++) {
          expect(edges[k + 1] / edges[k]).toBeLessThan(Math.exp(0.015) * (1 + 1e-12))
          expect(centres[k] > edges[k] && centres[k] < edges[k + 1] && widthsHz[k] > 0).toBe(true)
        }
        for (const stop of breakpoints) {
          if (stop < edges[0] || stop > edges[count]) continue
          expect(Math.min(...Array.from(edges, (edge) => Math.abs(Math.log(edge / stop))))).toBeLessThan(0.00751)
        }
      }),
      { numRuns: 30 }
    )
  })

  it('puts a lone breakpoint exactly on an edge', () => {
    expect(transportWavelengths(1, 1, [1e-4]).edges).toContain(1e-4)
  })

  it('has about nine hundred bins for an ordinary scene', () => {
    const [shortest, longest] = blackbodyRange(2500)
    const { count } = transportWavelengths(shortest, longest, [])
    expect(count).toBeGreaterThan(850)
    expect(count).toBeLessThan(950)
  })
})
