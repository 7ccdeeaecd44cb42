import { describe, expect, it } from 'vitest'
import { binOpacity } from '../../src/dust/binned-opacity.js'
import { coolingOf, makeEmissionTable, rowOf, temperatureOf } from '../../src/dust/emission.js'
import { makeOpacityLaw } from '../../src/dust/opacity-law.js'
import { planckBins } from '../../src/dust/planck-bins.js'
import { blackbodyRange, transportWavelengths } from '../../src/dust/wavelength-grid.js'
import { allocateShared } from '../../src/math/allocate.js'
import { sampleBin } from '../../src/math/cdf.js'
import { stream } from '../../src/math/random.js'
import type { OpacitySpec } from '../../src/scene/types.js'
import { BOLTZMANN, LIGHT_SPEED, PLANCK, STEFAN_BOLTZMANN } from '../../src/units/constants.js'
import { chiSquareSigmas } from '../support/chi-square.js'

const grid = transportWavelengths(...blackbodyRange(6000), [1e-4])

function binned(spec: OpacitySpec): Float64Array {
  return binOpacity(makeOpacityLaw(spec), grid).absorption
}

/** kappa = 1 cm2/g at 1 um, ~ nu^beta. */
function powerTable(beta: number) {
  const reference = { wavelength: 1e-4, absorption: 1 }
  const scattering = { albedo: 0, asymmetry: 0 }
  return binned({ law: 'power', reference, slope: beta, scattering, phase: 'isotropic' })
}

/** Absorption flat up to 1 um and ~ 1/wavelength beyond. */
const bentTable = binned({
  law: 'table',
  phase: 'isotropic',
  table: {
    file: 'made-up.csv',
    wavelength: Float64Array.of(1e-6, 1e-4, 1),
    absorption: Float64Array.of(1, 1, 1e-4),
    scattering: new Float64Array(3),
    asymmetry: new Float64Array(3)
  }
})

const sum = (values: Float64Array) => values.reduce((total, value) => total + value, 0)
const planckMean = (absorption: Float64Array, temperature: number) =>
  (Math.PI * coolingOf(makeEmissionTable(absorption, grid), temperature)) / (STEFAN_BOLTZMANN * temperature ** 4)

/**
 * Relative excess of a Planck mean of nu^beta for an opacity constant in bins 0.015 wide in ln(nu): the covariance in a bin of
 * kappa and B, -(h^2 / 12) beta dlnB/dlnnu, whose mean over the emission is beta (beta + 1) h^2 / 12 after integration by parts.
 */
const binningError = (beta: number) => (beta * (beta + 1) * 0.015 ** 2) / 12

describe('coolingOf', () => {
  it('gives the Planck means of powers of frequency', () => {
    // Mean of nu^beta: (k T / h)^beta Gamma(4 + beta) zeta(4 + beta) / (Gamma(4) zeta(4)); factors from mpmath
    for (const [beta, factor] of [
      [0, 1],
      [1, 3.8322294961],
      [1.5, 8.2634056446],
      [2, 18.7992464783]
    ]) {
      for (const temperature of [25.3, 801.7]) {
        const kT = (BOLTZMANN * temperature) / PLANCK / (LIGHT_SPEED / 1e-4)
        const ratio = planckMean(powerTable(beta), temperature) / (kT ** beta * factor)
        expect(Math.abs(ratio - 1)).toBeLessThan(1.05 * binningError(beta) + 1e-6)
      }
    }
  })

  it('gives the Planck means of a bent law', () => {
    // min(1, 1 um / wavelength), by quadrature in high precision apart from this program
    expect(Math.abs(planckMean(bentTable, 2500) / 0.62206286 - 1)).toBeLessThan(binningError(1))
    expect(Math.abs(planckMean(bentTable, 800) / 0.21308156 - 1)).toBeLessThan(binningError(1))
  })

  it('agrees between rows with the sum over bins, to 1e-5', () => {
    const table = makeEmissionTable(bentTable, grid)
    for (let i = 0; i < 60; i++) {
      const temperature = 1.01 * 9800 ** (i / 60)
      const direct = sum(planckBins(grid, temperature).map((value, k) => value * bentTable[k]))
      expect(Math.abs(coolingOf(table, temperature) / direct - 1)).toBeLessThan(1e-5)
    }
  })
})

describe('temperatureOf', () => {
  const table = makeEmissionTable(bentTable, grid)

  it('undoes coolingOf to rounding, within and beyond the rows', () => {
    for (const temperature of [0.3, 1, 1.7, 33, 1499, 1e4, 3e4]) {
      expect(temperatureOf(table, 4 * Math.PI * coolingOf(table, temperature)) / temperature).toBeCloseTo(1, 12)
    }
    expect(temperatureOf(table, 0)).toBe(0)
    expect(coolingOf(table, 0)).toBe(0)
  })

  it('is the temperature of the field for dust inside a blackbody', () => {
    const row = 250
    const temperature = Math.exp(table.lnFirst + row * table.lnStep)
    const field = planckBins(grid, temperature)
    let absorbed = 0
    for (let k = 0; k < grid.count; k++) absorbed += 4 * Math.PI * bentTable[k] * field[k]
    expect(temperatureOf(table, absorbed) / temperature).toBeCloseTo(1, 13)
  })

  it('gives thin dust far from a star its textbook temperature', () => {
    // kappa ~ nu^beta: T = T* (R / 2 r)^(2 / (4 + beta)) (common practice); 5000 K, r = 1000 R
    for (const [beta, expected] of [
      [0, 111.80339887],
      [1, 239.08812495],
      [1.5, 315.20671468],
      [2, 396.85026299]
    ]) {
      const absorption = powerTable(beta)
      const absorbed = sum(planckBins(grid, 5000).map((value, k) => Math.PI * value * absorption[k])) / 1000 ** 2
      expect(temperatureOf(makeEmissionTable(absorption, grid), absorbed) / expected).toBeCloseTo(1, 6)
    }
  })

  it('puts 800 K dust of the bent law at 8.343 stellar radii of a 2500 K star', () => {
    // Thin limit of the dusty-envelope problem of Ivezic et al. 1997 (MNRAS 291, 121): r = sqrt(Q(2500) 2500^4 / Q(800) 800^4) / 2
    const absorbed = sum(planckBins(grid, 2500).map((value, k) => Math.PI * value * bentTable[k])) / 8.342847 ** 2
    // the bend at 1 um affects heating and cooling unequally: up to the error of the mean over the slope 5 of cooling
    expect(Math.abs(temperatureOf(table, absorbed) / 800 - 1)).toBeLessThan(binningError(1) / 5)
  })
})

describe('emission spectra', () => {
  const shared = makeEmissionTable(bentTable, grid, allocateShared)
  const { bins, cumulative } = shared.sampling

  it('between two rows differ from the exact one by 1e-4 of the energy at most', () => {
    for (const near of [30, 300, 1500]) {
      const row = Math.floor(rowOf(shared, near))
      const exact = planckBins(grid, Math.exp(shared.lnFirst + (row + 0.5) * shared.lnStep)).map((b, k) => b * bentTable[k])
      const total = sum(exact)
      let below = 0
      let worst = 0
      for (let k = 0; k < bins; k++) {
        below += exact[k] / total
        const mixed = 0.5 * (cumulative[row * bins + k] + cumulative[(row + 1) * bins + k])
        worst = Math.max(worst, Math.abs(mixed - below))
      }
      expect(worst).toBeLessThan(1e-4)
    }
  })

  it('are drawn as they are, with the fraction of the row as a probability', () => {
    const temperature = 431
    const uniform = stream('emission/draws')
    const position = rowOf(shared, temperature)
    const draws = 300_000
    const perGroup = 25
    const counts = new Float64Array(Math.ceil(bins / perGroup))
    const expected = new Float64Array(counts.length)
    for (let i = 0; i < draws; i++) {
      const row = Math.floor(position + uniform())
      counts[Math.floor(sampleBin(shared.sampling, row, uniform()) / perGroup)]++
    }
    const exact = planckBins(grid, temperature).map((value, k) => value * bentTable[k])
    for (let k = 0; k < bins; k++) expected[Math.floor(k / perGroup)] += (draws * exact[k]) / sum(exact)
    // groups where less than five draws are expected are joined to the last that has more
    for (let i = counts.length - 1; i > 0; i--) {
      if (expected[i] >= 5) continue
      counts[i - 1] += counts[i]
      expected[i - 1] += expected[i]
      counts[i] = expected[i] = 0
    }
    for (let i = 0; i < counts.length - 1; i++) {
      if (expected[i] >= 5) continue
      counts[i + 1] += counts[i]
      expected[i + 1] += expected[i]
      counts[i] = expected[i] = 0
    }
    // fixed seed; 4 sigma: a chance of 6e-5
    expect(Math.abs(chiSquareSigmas(counts, expected))).toBeLessThan(4)
  })

  it('can be posted to a thread without copying the arrays', () => {
    const posted = structuredClone(shared)
    posted.lnCooling[7] += 1
    expect(shared.lnCooling[7]).toBe(posted.lnCooling[7])
    posted.lnCooling[7] -= 1
    expect(posted.sampling.cumulative.buffer).toBeInstanceOf(SharedArrayBuffer)
    expect(sampleBin(posted.sampling, 200, 0.4)).toBe(sampleBin(shared.sampling, 200, 0.4))
  })
})

describe('unusual dust', () => {
  it('that absorbs nothing stays at 0 K', () => {
    const table = makeEmissionTable(new Float64Array(grid.count), grid)
    expect(coolingOf(table, 300)).toBe(0)
    expect(temperatureOf(table, 1)).toBe(0)
  })

  it('that absorbs only below 1 um has a table at every temperature', () => {
    const table = makeEmissionTable(
      grid.centres.map((wavelength) => (wavelength < 1e-4 ? 1 : 0)),
      grid
    )
    for (let row = 1; row < table.rows; row++) {
      expect(table.lnCooling[row]).toBeGreaterThan(table.lnCooling[row - 1])
      expect(grid.centres[sampleBin(table.sampling, row, 0.999)]).toBeLessThan(1e-4)
    }
    for (const temperature of [25, 40, 1000]) {
      expect(temperatureOf(table, 4 * Math.PI * coolingOf(table, temperature)) / temperature).toBeCloseTo(1, 10)
    }
  })
})
