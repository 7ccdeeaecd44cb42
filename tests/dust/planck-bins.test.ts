import { describe, expect, it } from 'vitest'
import { planckBins } from '../../src/dust/planck-bins.js'
import { transportWavelengths } from '../../src/dust/wavelength-grid.js'
import { STEFAN_BOLTZMANN } from '../../src/units/constants.js'

/**
 * lambda T (um K), fraction of blackbody emission below it: the series (15/pi^4) sum e^-nz/n (z^3 + 3z^2/n + 6z/n^2 + 6/n^3)
 * evaluated to 8 decimals; and the column of the usual heat-transfer handbook table (recalled; NaN where the book has a known
 * misprint), whose old constants put it up to 5e-5 high at the long end.
 */
const FRACTIONS = [
  [1000, 0.00032077, 0.000321],
  [1400, 0.00779039, 0.00779],
  [2000, 0.06672994, 0.066728],
  [2898, 0.25010629, 0.250108],
  [4000, 0.48086464, 0.480877],
  [5200, 0.65794734, Number.NaN],
  [6000, 0.73778942, 0.737818],
  [8000, 0.85625069, 0.856288],
  [10000, 0.91415697, 0.914199],
  [20000, 0.98555384, 0.985602],
  [50000, 0.99890388, 0.998953]
]
const MEDIAN = 4107.24848771

describe('planckBins', () => {
  const temperature = 800
  const stops = [...FRACTIONS.map(([product]) => product), MEDIAN].map((product) => (product * 1e-4) / temperature)
  const grid = transportWavelengths(0.05e-4, 3, stops)
  const bins = planckBins(grid, temperature)
  const total = (STEFAN_BOLTZMANN * temperature ** 4) / Math.PI
  const fractionBelow = (lambdaT: number) => {
    const wanted = (lambdaT * 1e-4) / temperature
    const edge = grid.edges.findIndex((wavelength) => Math.abs(wavelength / wanted - 1) < 1e-12)
    return bins.subarray(0, edge).reduce((sum, part) => sum + part, 0) / total
  }

  it('adds up to the tabulated blackbody fractions', () => {
    for (const [product, exact, book] of FRACTIONS) {
      const fraction = fractionBelow(product)
      expect(Math.abs(fraction - exact)).toBeLessThan(6e-9) // last printed digit, and 1e-9 below the grid
      if (!Number.isNaN(book)) expect(Math.abs(fraction - book)).toBeLessThan(5.1e-5)
    }
    expect(fractionBelow(MEDIAN)).toBeCloseTo(0.5, 9)
  })

  it('adds up to sigma T^4 / pi over the whole grid', () => {
    for (const [hot, allowed] of [
      [20, 1e-6],
      [300, 1e-8],
      [1e4, 2e-9]
    ]) {
      const sum = planckBins(grid, hot).reduce((a, b) => a + b, 0)
      expect(Math.abs((sum * Math.PI) / (STEFAN_BOLTZMANN * hot ** 4) - 1)).toBeLessThan(allowed)
    }
  })
})
