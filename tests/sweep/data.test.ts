import { existsSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { compareRun } from '../../src/compare/compare-run.js'
import { readData } from '../../src/compare/read-data.js'
import { type SetFinding, type Verdict, verdictOf } from '../../src/compare/verdict.js'
import { observationFindings } from '../../src/observe/observation-record.js'
import { observeRun } from '../../src/observe/observe-run.js'
import { readInstrument } from '../../src/observe/read-instrument.js'
import { mostModelFolders } from '../../src/sweep/folder/is-packed.js'
import { openResults } from '../../src/sweep/folder/open-results.js'
import { outcomesOf } from '../../src/sweep/folder/outcomes-of.js'
import { openSweep } from '../../src/sweep/folder/sweep-folder.js'
import { modelScene } from '../../src/sweep/plan/model-scene.js'
import { readPlan } from '../../src/sweep/plan/read-plan.js'
import { runHere } from '../../src/sweep/players/run-here.js'
import { judged } from '../../src/sweep/results/outcomes.js'
import { sweepTable } from '../../src/sweep/results/sweep-table.js'
import { filesIn, motelight, sceneText } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'
import { planFolder, planned, problemsOf, visibilityPlan, visibilityText } from './example.js'

const depth = 'dust.wind.amount.optical-depth'
const options = { workers: 1, onProgress: () => {} }

/** What two telescopes see of the scene, of optical depth 1.5. */
const night = `seed: dark
observations:
  - name: near
    kind: picture
    camera: face
    wavelength: 2.2 um
    beam: {kind: gaussian, major: 2 arcsec}
    noise: {kind: rms, level: 2e5 MJy/sr, per: pixel}
  - {name: array, kind: visibilities, camera: face, wavelength: 60 um, baselines: [[3 m, 0 m], [0 m, 5 m]], noise: {kind: rms, level: 1 Jy}}
  - {name: mid, kind: photometry, spectrum: sed, wavelength: 10 um, noise: {kind: relative, level: 5 %}}
`
const seen = `free: [flux]
data:
  - {name: fluxes, kind: photometry, file: observed/photometry.ecsv, spectrum: sed, errors: noise, free: []}
  - {name: near, kind: picture, file: observed/pictures/near.fits, camera: face, wavelength: 2.2 um, errors: {extension: NOISE}}
  - {name: array, kind: visibilities, file: observed/visibilities/array.ecsv, camera: face, wavelength: 60 um, errors: noise}
`
const plan = `scene: scene.yaml\nvary: {${depth}: [0.5, 1.5, 4]}\ndata: seen.yaml\n`

describe('data that need images', () => {
  it('agree with each model as `compare` says; new data are compared without new models', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText, 'plan.yaml': plan, 'night.yaml': night, 'seen.yaml': seen })
    await motelight(folder, 'run', 'scene.yaml')
    expect(await motelight(folder, 'observe', 'out/scene', 'night.yaml', '--out', 'observed')).toMatchObject({ exitCode: 0 })
    expect(await motelight(folder, 'sweep', 'plan.yaml', '--quiet')).toMatchObject({ exitCode: 0, stderr: '' })
    const path = (model: number, name: string) => join(folder, `out/plan/models/000${model}`, name)
    const kept = (model: number) => JSON.parse(readFileSync(path(model, 'seen.json'), 'utf8')).verdict as Verdict
    const without = ({ sets }: Verdict) => sets.map(({ name, chiSquared }: SetFinding) => [name, chiSquared])
    for (const model of [1, 2, 3])
      expect(without(kept(model))).toEqual(without(verdictOf(compareRun(path(model, '.'), readData(join(folder, 'seen.yaml'))))))
    const table = readFileSync(join(folder, 'out/plan/models.ecsv'), 'utf8')
    for (const name of ['chi2_fluxes', 'chi2_near', 'chi2_array', 'fitted_flux', 'fitted_flux_sigma'])
      expect(table).toContain(`"${name}"`)
    const row = table
      .split('\n')
      .find((line) => line.startsWith('3 '))!
      .split(' ')
    expect(row.slice(3, 6).map(Number)).toEqual(kept(3).sets.map(({ chiSquared }) => chiSquared))

    const { stdout, exitCode } = await motelight(folder, 'sweep', 'plan.yaml', '--summary')
    expect({ exitCode, stdout }).toMatchObject({ exitCode: 0, stdout: expect.stringContaining('3 of 3 models compared') })
    const summary = JSON.parse(readFileSync(join(folder, 'out/plan/summary.json'), 'utf8'))
    expect(summary.best[0]).toMatchObject({ model: 2, chiSquared: kept(2).all.chiSquared })
    expect(JSON.parse(readFileSync(join(folder, 'out/plan/best/comparison.json'), 'utf8')).all).toEqual(kept(2).all)
    // Of the picture residuals and profiles, of the two others one plot each.
    expect(readFileSync(join(folder, 'out/plan/summary.html'), 'utf8').match(/src="data:image\/png;base64,/g)).toHaveLength(4)

    const made = statSync(path(2, 'run.json')).mtimeMs
    const before = kept(2)
    writeFileSync(join(folder, 'seen.yaml'), seen.replace('{extension: NOISE}', '{level: 1e6 MJy/sr}'))
    expect(await motelight(folder, 'sweep', 'plan.yaml', '--quiet')).toMatchObject({ exitCode: 0, stderr: '' })
    expect(statSync(path(2, 'run.json')).mtimeMs).toBe(made)
    expect(kept(2).sets[1].chiSquared).toBeLessThan(0.1 * before.sets[1].chiSquared)
    expect(kept(2).sets[0]).toEqual(before.sets[0])
  })

  it('of a large sweep leave the same in packs, and cannot be replaced later', async () => {
    const wide = `vary: {${depth}: {from: 0.5, to: 2, count: ${mostModelFolders + 1}}}\n`
    const folder = planFolder(wide + visibilityPlan, { 'uv.csv': visibilityText })
    const large = readPlan(join(folder, 'plan.yaml'))
    const packed = await openSweep(join(folderWith(), 'out'), large)
    const foldered = await openSweep(join(folderWith(), 'out'), { ...large, models: large.models.slice(0, 2) })
    for (const sweep of [packed, foldered]) await runHere(sweep, [2], options)
    const verdictIn = (sweep: typeof packed) => openResults(sweep).finished([2]).get(2)!.seen!.verdict!
    expect(verdictIn(packed)).toEqual(verdictIn(foldered))
    expect(verdictIn(packed).sets[0]).toMatchObject({ name: 'array', values: 2 })
    expect(existsSync(packed.model(2))).toBe(false)
    writeFileSync(join(folder, 'uv.csv'), visibilityText.replace('9, 1', '8, 1'))
    await expect(openSweep(packed.path, readPlan(join(folder, 'plan.yaml')))).rejects.toThrow(
      'its data or instrument were others'
    )
  })

  it('that changed while a model was made leave it open', async () => {
    const folder = planFolder(`vary: {${depth}: [1]}\n${visibilityPlan}`, { 'uv.csv': visibilityText })
    const sweep = await openSweep(join(folderWith(), 'out'), readPlan(join(folder, 'plan.yaml')))
    writeFileSync(join(folder, 'uv.csv'), visibilityText.replace('9, 1', '8, 1'))
    await runHere(sweep, [1], options)
    expect(openResults(sweep).finished([1]).size).toBe(0)
    const again = await openSweep(sweep.path, readPlan(join(folder, 'plan.yaml')))
    expect(openResults(again).finished([1]).size).toBe(1)
  })
})

describe('an instrument', () => {
  const tool = `observations:
  - {name: mid, kind: photometry, spectrum: sed, band: {from: 8 um, to: 12 um}, noise: {kind: relative, level: 5 %}, unit: mJy}
  - {name: near, kind: picture, camera: face, wavelength: 2.2 um, beam: {kind: gaussian, major: 2 arcsec}}
`

  it('observes each model, with noise of its own, and leaves data and columns', async () => {
    const folder = planFolder(`vary: {${depth}: [1, 2]}\nobserve: tool.yaml\n`, { 'tool.yaml': tool })
    const plan = readPlan(join(folder, 'plan.yaml'))
    const sweep = await openSweep(join(folderWith(), 'out'), plan)
    await runHere(sweep, [1, 2], options)
    expect(filesIn(join(sweep.model(1), 'observed'))).toEqual([
      'instrument.yaml',
      'observation.json',
      'photometry.ecsv',
      'pictures/near.fits'
    ])
    const outcomes = judged(plan, outcomesOf(sweep))
    const table = sweepTable(plan, outcomes)
    const column = (name: string) => table.find((one) => one.name === name)!
    const apart = [1, 2].map((model) => {
      const instrument = readInstrument(join(folder, 'tool.yaml'), { seed: `1/${model}` })
      return observationFindings(observeRun(sweep.model(model), instrument))
    })
    expect(column('observed_mid_flux')).toMatchObject({
      unit: 'mJy',
      values: apart.map(([one]) => ('value' in one ? one.value : undefined))
    })
    expect(column('observed_near_peak')).toMatchObject({
      unit: 'MJy/sr',
      values: apart.map(([, one]) => ('peak' in one ? one.peak : undefined))
    })
  })

  it('that asks for what the scene has not is refused at once', () => {
    const files = { 'tool.yaml': tool.replace('8 um, to: 12 um', '8 um, to: 200 um') }
    expect(problemsOf(`vary: {${depth}: [1]}\nobserve: tool.yaml\n`, files)).toMatchObject([
      { at: 'tool.yaml:2:50', message: expect.stringContaining('the band reaches from 8um to 200um') }
    ])
    expect(problemsOf(`vary: {${depth}: [1]}\nobserve: none.yaml\n`)).toMatchObject([{ at: 'plan.yaml:3:1' }])
  })
})

describe('measured fluxes', () => {
  it('are compared with a spectrum that has the view of the model, also where it varies', () => {
    const sweep = planned(
      'vary: {spectra.sed.view.inclination: [10 deg, 50 deg]}\ndata: [{name: old, file: fluxes.csv, spectrum: sed}]\n'
    )
    const [sed, own] = modelScene(sweep, 2).spectra
    expect(own.view).toEqual(sed.view)
  })

  it('through bands: with the wavelengths of the spectrum and those of the other rows', () => {
    const sweep = planned(
      `vary: {${depth}: [1]}\ndata: [{name: old, file: named.csv, spectrum: sed, bands: {broad: {from: 2 um, to: 20 um}}}]\n`,
      { 'named.csv': 'name, wavelength [um], flux [mJy], sigma [mJy], limit\nbroad, 9, 1, 1, 0\nline, 60, 10, 1, 1\n' }
    )
    expect(sweep.dataSpectra).toEqual([{ name: 'data-old', like: 'sed', wavelengths: ['1 um', '10 um', '60 um', '100 um'] }])
  })
})
