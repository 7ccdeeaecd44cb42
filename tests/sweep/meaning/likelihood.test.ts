import { describe, expect, it } from 'vitest'
import { stream } from '../../../src/math/random.js'
import type { ModelResult } from '../../../src/sweep/folder/model-result.js'
import { rankedFits } from '../../../src/sweep/meaning/likelihood.js'
import { marginalOf } from '../../../src/sweep/meaning/marginal.js'
import { profileOf } from '../../../src/sweep/meaning/profile.js'
import { summarize } from '../../../src/sweep/meaning/summary.js'
import { compareFluxes, type Judged } from '../../../src/sweep/results/outcomes.js'
import type { Sweep } from '../../../src/sweep/types.js'
import { fluxList, planned } from '../example.js'

/*
 * The fluxes of these models are formulas, so that the likelihood is known in closed form: at three wavelengths
 * F = a, F = b, F = a + b, with a the optical depth and b a hundredth of the temperature in K.
 */
function models(plan: string): Sweep {
  return planned(`${plan}data: [{name: old, file: fluxes.csv, spectrum: sed}]\n`)
}

const depth = 'dust.wind.amount.optical-depth'
const temperature = 'sources.giant.temperature'
const grid = models(`vary:
  ${depth}: {from: 1, to: 3, count: 21}
  ${temperature}: {from: 2800 K, to: 3200 K, count: 33}
`)
const truth = { a: 2.03, b: 30.17 }

function results(sweep: Sweep, sigma = 0): Map<number, ModelResult> {
  return new Map(
    sweep.models.map(([a, t], i): [number, ModelResult] => {
      const b = Number(t) / 100
      const flux = [Number(a), b, Number(a) + b]
      const spectra = [{ name: 'data-old', unit: 'Jy', wavelengthUm: [2.2, 10, 60], flux, sigma: flux.map(() => sigma) }]
      return [i + 1, { model: i + 1, precise: true, spectra, images: [], packets: 1, warnings: [], cpuSeconds: 1 }]
    })
  )
}

/** Fluxes that the truth gives with Gaussian noise (Box & Muller 1958), Jy. */
function measured(sigmaJy: number[], seed: string): number[] {
  const uniform = stream(seed)
  const normal = () => Math.sqrt(-2 * Math.log(uniform())) * Math.cos(2 * Math.PI * uniform())
  const { a, b } = truth
  return [a, b, a + b].map((flux, i) => flux + sigmaJy[i] * normal())
}

/** The models with how they agree with measured fluxes. */
function judge(found: Map<number, ModelResult>, fluxJy: number[], sigmaJy: number[]): Judged {
  return { results: found, failures: new Map(), verdicts: compareFluxes(found, fluxList([2.2, 10, 60], fluxJy, sigmaJy)) }
}

describe('what data say', () => {
  // Two of the three fluxes measure a and b with 1 sigma s, the third their sum with u: the least-squares solution of a linear model.
  const [s, u] = [0.2, 0.3]
  const data = measured([s, s, u], 'one')
  const seen = judge(results(grid), data, [s, s, u])
  const [d1, d2, d3] = data
  const [p, q] = [1 / s ** 2 + 1 / u ** 2, 1 / u ** 2]
  const best = { a: 0, b: 0 }
  const [ra, rb] = [d1 / s ** 2 + d3 / u ** 2, d2 / s ** 2 + d3 / u ** 2]
  best.a = (p * ra - q * rb) / (p ** 2 - q ** 2)
  best.b = (p * rb - q * ra) / (p ** 2 - q ** 2)
  const sigma = Math.sqrt(p / (p ** 2 - q ** 2))

  it('marginals and profiles on a grid are those of the linear least-squares solution', () => {
    const fits = rankedFits(seen)
    for (const [parameter, centre, width] of [
      [0, best.a, sigma],
      [1, 100 * best.b, 100 * sigma]
    ]) {
      const { low, middle, high, curve } = marginalOf(grid, fits, parameter)!
      expect(Math.abs(middle - centre) / width).toBeLessThan(0.01)
      expect(Math.abs(low - (centre - width)) / width).toBeLessThan(0.01)
      expect(Math.abs(high - (centre + width)) / width).toBeLessThan(0.01)
      const top = Math.max(...curve.map(({ density }) => density))
      expect(top * width * Math.sqrt(2 * Math.PI)).toBeCloseTo(1, 2)
      // The profile takes the best of the grid's values of the other parameter, which leaves it a little above the true one.
      const profile = profileOf(grid, fits, parameter)
      expect(Math.abs(profile.low! - (centre - width)) / width).toBeLessThan(0.05)
      expect(Math.abs(profile.high! - (centre + width)) / width).toBeLessThan(0.05)
    }
  })

  // 50 realisations, two parameters: 68.27 % of 50 are 34.1, 1 sigma of the binomial 3.3. Within 3 sigma: 24 to 44; fails by
  // chance once in 370 draws for each; the seed is fixed.
  it.each([
    ['grid', grid],
    [
      'sobol',
      models(`vary:\n  ${depth}: {from: 1, to: 3}\n  ${temperature}: {from: 2500 K, to: 3500 K}\ndesign: {sobol: 1024}\n`)
    ]
  ])('%s: the truth lies in the 68 % interval as often as it should', (_, design) => {
    const found = results(design)
    const inside = [0, 0]
    for (let n = 0; n < 50; n++) {
      const fits = rankedFits(judge(found, measured([s, s, u], `realisation ${n}`), [s, s, u]))
      for (const [i, value] of [truth.a, 100 * truth.b].entries()) {
        const { low, high } = marginalOf(design, fits, i)!
        if (low <= value && value <= high) inside[i]++
      }
    }
    for (const count of inside) {
      expect(count).toBeGreaterThanOrEqual(24)
      expect(count).toBeLessThanOrEqual(44)
    }
  })

  it('no warning where there is nothing to warn of', () => {
    const { warnings, best: ranked } = summarize(grid, seen)!
    expect(warnings).toEqual([])
    expect(ranked[0].deviance).toBe(0)
    expect(ranked).toHaveLength(5)
  })

  it.each([
    ['a grid too coarse', [0.005, 0.02, 0.05], 0, 'the grid is too coarse'],
    ['noisy models', [s, s, u], 0.15, 'the Monte Carlo error of the best model'],
    ['models that never fit', [1e-3, 1e-3, 1e-3], 0, 'no model fits']
  ] as const)('warns of %s', (_, errors, noise, message) => {
    const judged = judge(results(grid, noise), measured([...errors], 'warned'), [...errors])
    expect(summarize(grid, judged)!.warnings.join('\n')).toContain(message)
  })

  it('warns of a best model at an end, and of missing models', () => {
    const narrow = models(
      `vary: {${depth}: {from: 1, to: 1.5, count: 6}, ${temperature}: {from: 2500 K, to: 3500 K, count: 21}}\n`
    )
    const found = results(narrow)
    found.delete(3)
    const { warnings } = summarize(narrow, judge(found, measured([s, s, u], 'ends'), [s, s, u]))!
    expect(warnings.join('\n')).toContain(`${depth}: the best model has the greatest value`)
    expect(warnings[0]).toBe('1 of 126 models are missing from the comparison')
  })
})
