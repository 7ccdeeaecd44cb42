import { describe, expect, it } from 'vitest'
import { transportWavelengths } from '../../src/dust/wavelength-grid.js'
import { makeSamplingTable, sampleBin } from '../../src/math/cdf.js'
import { stream } from '../../src/math/random.js'
import type { StarSpec } from '../../src/scene/types.js'
import { powerBins } from '../../src/sources/power-bins.js'
import { starSpectrum } from '../../src/sources/star.js'

const star: StarSpec = {
  name: 'star',
  kind: 'star',
  temperature: 5000,
  luminosity: 4e33,
  radius: 7e10,
  at: [0, 0, 0],
  extent: 'point',
  limbDarkening: 0,
  spectrum: { kind: 'blackbody' }
}

const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0)

describe('powerBins', () => {
  // 0.50 of a blackbody lies below 4107.24848771 um K, 0.25 below 2897.53157101 um K (series of the blackbody fraction)
  const [quarter, half] = [2897.53157101, 4107.24848771].map((lambdaT) => (lambdaT * 1e-4) / 5000)
  const grid = transportWavelengths(...starSpectrum(star).range, [quarter, half])
  const bins = powerBins(starSpectrum(star), grid)

  it('share out the luminosity of a blackbody as its fractions say', () => {
    expect(sum(bins) / star.luminosity).toBeCloseTo(1, 14)
    expect(sum(bins.subarray(0, grid.edges.indexOf(quarter))) / star.luminosity).toBeCloseTo(0.25, 8)
    expect(sum(bins.subarray(0, grid.edges.indexOf(half))) / star.luminosity).toBeCloseTo(0.5, 8)
  })

  it('launch packets on both sides of the middle alike', () => {
    const table = makeSamplingTable(bins, 1, grid.count)
    const uniform = stream('star/launch')
    const draws = 200_000
    let below = 0
    for (let i = 0; i < draws; i++) if (grid.edges[sampleBin(table, 0, uniform())] < half * (1 - 1e-9)) below++
    // fixed seed; 4 sigma of a binomial count: a chance of 6e-5
    expect(Math.abs(below / draws - 0.5)).toBeLessThan(4 * 0.5 * draws ** -0.5)
  })

  it('keep lines and ends of a table that are narrower than a bin', () => {
    const wavelength = Float64Array.of(1, 1.2, 1.20001, 1.20002, 1.5).map((um) => um * 1e-4)
    // a continuum of 1 and a triangular line whose area in frequency dwarfs it
    const fluxNu = Float64Array.of(1, 1, 1e8, 1, 1)
    const spectrum = { kind: 'table' as const, table: { file: 'made-up.csv', wavelength, fluxNu } }
    const lined = starSpectrum({ ...star, spectrum })
    const parts = powerBins(lined, grid)
    const at = grid.edges.findIndex((edge) => edge > 1.2e-4) - 1
    expect(sum(parts) / star.luminosity).toBeCloseTo(1, 14)
    // log-log flanks: area 2 x 1e8 / ln(1e8) x half width, against a continuum 3e4 times wider
    const line = (1e8 / Math.log(1e8)) * (1 / 1.2 - 1 / 1.20002)
    const continuum = 1 - 1 / 1.5
    expect((parts[at] + parts[at + 1]) / star.luminosity).toBeGreaterThan(line / (line + continuum) - 1e-4)
    for (let k = 0; k < grid.count; k++) {
      if (grid.edges[k + 1] <= 1e-4 || grid.edges[k] >= 1.5e-4) expect(parts[k]).toBe(0)
      else expect(parts[k]).toBeGreaterThan(0)
    }
  })
})
