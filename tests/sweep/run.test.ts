import { existsSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { dustLeads, sharedDust } from '../../src/sweep/folder/dust-groups.js'
import { motelight, program, sceneWith } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'
import { dataText, planned } from './example.js'

const depth = 'dust.wind.amount.optical-depth'
const slower = sceneWith(['equilibrium: 8000, cameras: 2000', 'equilibrium: 20000, cameras: 60000'])
const scene = sceneWith()
const out = (folder: string, file: string) => readFileSync(join(folder, 'out/plan', file), 'utf8')

describe('motelight sweep', () => {
  it('makes models, tells how they stand, makes none again, and sums up', async () => {
    const folder = folderWith({
      'scene.yaml': scene,
      'fluxes.csv': dataText,
      'plan.yaml': `scene: scene.yaml\nvary: {${depth}: [0.5, 1, 2]}\ndata: [{name: old, file: fluxes.csv, spectrum: sed}]\n`
    })
    const list = await motelight(folder, 'sweep', 'plan.yaml', '--list', '--json')
    expect(JSON.parse(list.stdout)).toMatchObject({
      design: 'grid',
      models: [{ values: [0.5] }, {}, {}],
      estimate: { tried: [1, 2, 3] }
    })
    expect(existsSync(join(folder, 'out'))).toBe(false)
    const early = await motelight(folder, 'sweep', 'plan.yaml', '--summary')
    expect(early).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('no model is finished yet') })
    const first = await motelight(folder, 'sweep', 'plan.yaml', '--json', '--quiet')
    expect(first).toMatchObject({ exitCode: 0, stderr: '' })
    expect(JSON.parse(first.stdout)).toMatchObject({ models: 3, done: 3, failed: 0, unfinished: 0 })
    expect(readdirSync(join(folder, 'out/plan/models/0002')).sort()).toEqual([
      'dust',
      'images',
      'run.json',
      'scene.yaml',
      'spectra'
    ])
    expect(readdirSync(join(folder, 'out/plan/models/0002/images'))).toEqual(['face.fits'])
    const record = out(folder, 'models/0002/run.json')
    const table = out(folder, 'models.ecsv')
    expect((await motelight(folder, 'sweep', 'plan.yaml')).stdout).toContain('3 of 3 models done')
    expect(out(folder, 'models/0002/run.json')).toBe(record)
    expect(out(folder, 'models.ecsv')).toBe(table)
    const { exitCode, stdout } = await motelight(folder, 'sweep', 'plan.yaml', '--summary')
    expect(exitCode).toBe(0)
    expect(stdout).toContain('3 of 3 models compared with 3 measured values')
    expect(out(folder, 'summary.html')).toContain('<svg')
    expect(JSON.parse(out(folder, 'summary.json'))).toMatchObject({ compared: 3, points: 3 })
  })

  it('another plan does not go into the folder of the first; new values of the data do', async () => {
    const plan = (depths: string) =>
      `scene: scene.yaml\nvary: {${depth}: ${depths}}\ndata: [{name: old, file: fluxes.csv, spectrum: sed}]\n`
    const folder = folderWith({
      'scene.yaml': scene,
      'fluxes.csv': dataText,
      'plan.yaml': plan('[1]'),
      'other.yaml': plan('[2]')
    })
    await motelight(folder, 'sweep', 'plan.yaml')
    const other = await motelight(folder, 'sweep', 'other.yaml', '--out', 'out/plan')
    expect(other).toMatchObject({
      exitCode: 2,
      stderr: expect.stringContaining('holds another sweep: its models had other parameters')
    })
    const before = out(folder, 'models.ecsv')
    writeFileSync(join(folder, 'fluxes.csv'), dataText.replace('300, 10', '310, 10'))
    expect(await motelight(folder, 'sweep', 'plan.yaml')).toMatchObject({ exitCode: 0 })
    expect(out(folder, 'models.ecsv')).not.toBe(before)
  })

  it('a model that fails says why and holds up none; --retry-failed makes it again', async () => {
    const folder = folderWith({
      'scene.yaml': sceneWith(['{optical-depth: 1.5, at: 0.55 um}', '{density: 1e-20 g/cm3, at: 20 au}']),
      'plan.yaml': 'scene: scene.yaml\nvary: {dust.wind.amount.at: [20 au, 5000 au, 30 au]}\n'
    })
    const { exitCode, stdout } = await motelight(folder, 'sweep', 'plan.yaml')
    expect(exitCode).toBe(4)
    expect(stdout).toContain('2 of 3 models done, 1 failed')
    expect(stdout).toContain('model 2 failed: dust.0.amount.at: the shape has no finite density')
    expect(out(folder, 'models.ecsv')).toContain('failed')
    const again = await motelight(folder, 'sweep', 'plan.yaml', '--retry-failed', '--json')
    expect(JSON.parse(again.stdout)).toMatchObject({ done: 2, failed: 1, failures: [{ model: 2 }] })
  })

  it('a player that is killed costs one model; the first Ctrl-C keeps what was done', async () => {
    const folder = folderWith({ 'scene.yaml': slower, 'plan.yaml': `scene: scene.yaml\nvary: {${depth}: [0.5, 1, 2, 3]}\n` })
    const words = [program, 'sweep', 'plan.yaml', '--quiet', '--workers', '2']
    const run = execa(process.execPath, words, { cwd: folder, reject: false })
    const working = join(folder, 'out/plan/working.json')
    while (!existsSync(working) || JSON.parse(readFileSync(working, 'utf8') || '{"players":[]}').players.length < 2)
      await setTimeout(20)
    await setTimeout(300)
    const twice = await execa(process.execPath, words, { cwd: folder, reject: false })
    expect(twice).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('another motelight works in') })
    const [victim] = JSON.parse(readFileSync(working, 'utf8')).players as [number, string][]
    process.kill(victim[0], 'SIGKILL')
    await setTimeout(500)
    run.kill('SIGINT')
    const stopped = await run
    expect(stopped.exitCode).toBe(3)
    expect(stopped.stdout).toMatch(/1 failed, [123] unfinished/)
    expect(stopped.stdout).toContain('its process was ended by SIGKILL')
    expect(existsSync(working)).toBe(false)
    const rest = await execa(process.execPath, [...words, '--retry-failed'], { cwd: folder, reject: false })
    expect(rest).toMatchObject({ exitCode: 0, stdout: expect.stringContaining('4 of 4 models done') })
    // What one that was killed when all was made leaves.
    writeFileSync(working, JSON.stringify({ host: hostname(), parent: victim, players: [] }))
    expect(await execa(process.execPath, words, { cwd: folder, reject: false })).toMatchObject({ exitCode: 0 })
    expect(existsSync(working)).toBe(false)
  })
})

describe('shared dust', () => {
  it('models that differ only in what the dust does not feel share it', () => {
    const sweep = planned(`vary:
  ${depth}: [1, 2]
  distance: [100 pc, 200 pc]
  cameras.face.view.inclination: [0 deg, 30 deg]
`)
    expect(dustLeads(sweep)).toEqual([1, 1, 1, 1, 5, 5, 5, 5])
    expect([...sharedDust(dustLeads(sweep))]).toEqual([
      [1, [1, 2, 3, 4]],
      [5, [5, 6, 7, 8]]
    ])
    expect(sharedDust(dustLeads(planned(`vary: {${depth}: [1, 2], effort.cameras: [10]}\n`))).size).toBe(0)
  })

  it('is found once', async () => {
    const folder = folderWith({
      'scene.yaml': scene,
      'plan.yaml': 'scene: scene.yaml\nvary: {distance: [100 pc, 200 pc, 300 pc]}\n'
    })
    expect(await motelight(folder, 'sweep', 'plan.yaml')).toMatchObject({ exitCode: 0 })
    expect(readdirSync(join(folder, 'out/plan/dust'))).toEqual(['0001'])
    const sums = [1, 2, 3].map((model) => out(folder, `models/000${model}/dust/cells.fits`).match(/DATASUM = '\d+/g)![1])
    expect(new Set(sums).size).toBe(1)
    // Four times fainter at twice the distance, by the same temperatures: at 100 um the dust alone shines, to the noise of its scattered light.
    const flux = [1, 2].map((model) => JSON.parse(out(folder, `models/000${model}/run.json`)).found.spectra[2].flux as number)
    expect(flux[0] / flux[1]).toBeCloseTo(4, 3)
  })
})
