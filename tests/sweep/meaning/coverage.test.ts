import { join } from 'node:path'
import { expect, it } from 'vitest'
import { drawNormal } from '../../../src/math/draw.js'
import { stream } from '../../../src/math/random.js'
import type { ModelResult } from '../../../src/sweep/folder/model-result.js'
import { openResults } from '../../../src/sweep/folder/open-results.js'
import { openSweep } from '../../../src/sweep/folder/sweep-folder.js'
import { rankedFits } from '../../../src/sweep/meaning/likelihood.js'
import { marginalOf } from '../../../src/sweep/meaning/marginal.js'
import { profileOf } from '../../../src/sweep/meaning/profile.js'
import { runHere } from '../../../src/sweep/players/run-here.js'
import { compareFluxes } from '../../../src/sweep/results/outcomes.js'
import { sceneWith } from '../../cli/motelight.js'
import { folderWith } from '../../support/folder-with.js'
import { fluxList, planned } from '../example.js'

const scene = sceneWith(
  ['precision: none, equilibrium: 8000, cameras: 2000', 'equilibrium: 1e6, cameras: 1e6'],
  ['[1 um, 10 um, 100 um]', '[1.2 um, 2.2 um, 12 um, 40 um]']
).replace(/cameras:\n(.|\n)*(?=spectra)/, '')
const wavelengthUm = [1.2, 2.2, 12, 40]
const truth = { depth: 0.2535, luminosity: 5030 }
/** Relative 1 sigma of the data. */
const NOISE = 0.06
const REALISATIONS = 50

/** Makes all models of a plan about the optical depth and the luminosity. */
async function made(depth: string, luminosity: string, precision: string) {
  const plan = `vary:
  dust.wind.amount.optical-depth: ${depth}
  sources.giant.luminosity: ${luminosity}
precision: ${precision}
data: [{name: old, file: four.csv, spectrum: sed}]
`
  const rows = wavelengthUm.map((wavelength) => `${wavelength}, 1, 1`).join('\n')
  const files = { 'scene.yaml': scene, 'four.csv': `wavelength [um], flux [Jy], sigma [Jy]\n${rows}\n` }
  const folder = await openSweep(join(folderWith(), 'out'), planned(plan, files))
  const models = folder.sweep.models.map((_, i) => i + 1)
  await runHere(folder, models, { workers: 2, onProgress: () => {} })
  return { sweep: folder.sweep, results: openResults(folder).finished(models) }
}

const fluxesOf = (result: ModelResult) => result.spectra.find(({ name }) => name === 'data-old')!.flux

/*
 * Data are made from a model between those of the grid, 50 times with other noise. Nothing is in closed form here: models are run, and the
 * likelihood is interpolated between values 1.5 sigma apart; the noise of the models themselves, below 0.1 %, does not matter. 68.27 % of
 * 50 are 34.1, 1 sigma of the binomial 3.3. Within 3 sigma: 24 to 44; fails by chance once in 370 draws for each count; the seeds are fixed.
 */
it('the truth lies in the 68 % intervals of real models as often as it should', async () => {
  const range = (from: string, to: string) => `{from: ${from}, to: ${to}, count: 5, spacing: log}`
  const { sweep, results } = await made(range('0.21', '0.305'), range('4470 Lsun', '5660 Lsun'), '2 %')
  expect(results.size).toBe(25)
  const own = await made(`[${truth.depth}]`, `[${truth.luminosity} Lsun]`, '0.6 %')
  const expected = fluxesOf(own.results.get(1)!)
  const inside = { depth: 0, luminosity: 0, depthProfile: 0, luminosityProfile: 0 }
  for (let n = 0; n < REALISATIONS; n++) {
    const random = stream(`realisation ${n}`)
    const sigma = expected.map((flux) => NOISE * flux)
    const data = expected.map((flux, i) => flux + sigma[i] * drawNormal(random))
    const fits = rankedFits({ verdicts: compareFluxes(results, fluxList(wavelengthUm, data, sigma)) })
    for (const [p, key] of (['depth', 'luminosity'] as const).entries()) {
      const { low, high } = marginalOf(sweep, fits, p)!
      if (low <= truth[key] && truth[key] <= high) inside[key]++
      const profile = profileOf(sweep, fits, p)
      if (profile.low! <= truth[key] && truth[key] <= profile.high!) inside[`${key}Profile`]++
    }
  }
  console.info(JSON.stringify(inside))
  for (const count of Object.values(inside)) {
    expect(count).toBeGreaterThanOrEqual(24)
    expect(count).toBeLessThanOrEqual(44)
  }
})
