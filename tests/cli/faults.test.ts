import { chmodSync, existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, program, sceneText, sceneWith } from './motelight.js'

/** Breaks every worker thread, between two of its tasks, once there is something on disk to go on with. */
const saboteur = `const { isMainThread } = require('node:worker_threads')
const { existsSync } = require('node:fs')
if (!isMainThread) setInterval(() => {
  if (!existsSync('out/scene/state/dust-rounds.bin')) return
  if (process.env.FAULT === 'exit') process.exit(7)
  throw new Error('out of control')
}, 5)
`
const long = sceneWith(['equilibrium: 8000', 'equilibrium: 1e6'])

async function whole(text: string): Promise<Buffer> {
  const folder = folderWith({ 'scene.yaml': text })
  await motelight(folder, 'run', 'scene.yaml', '--quiet')
  return readFileSync(join(folder, 'out/scene/images/face.fits'))
}

describe('a worker that breaks', () => {
  it.each([
    ['throw', /^a worker thread died: out of control$/m],
    ['exit', /^a worker thread ended unexpectedly \(code 7\)$/m]
  ])('%s: exit code 1, a sentence, and what was done is kept', async (fault, message) => {
    const folder = folderWith({ 'scene.yaml': long, 'saboteur.cjs': saboteur })
    const env = { FAULT: fault, NODE_OPTIONS: '--require ./saboteur.cjs', MOTELIGHT_DEBUG: '' }
    const { exitCode, stderr, stdout } = await execa('node', [program, 'run', 'scene.yaml', '--quiet'], {
      cwd: folder,
      reject: false,
      env
    })
    expect(stderr).toMatch(message)
    expect(stderr).toMatch(/defect of motelight/)
    expect(stderr).not.toMatch(/^\s+at /m)
    expect(stderr).toMatch(/\n +motelight run scene\.yaml --quiet --resume$/)
    expect({ exitCode, stdout }).toEqual({ exitCode: 1, stdout: '' })
    expect(filesIn(join(folder, 'out'))).toContain('scene/state/dust-rounds.bin')
    expect(filesIn(join(folder, 'out')).filter((file) => !/^scene\/state\/[a-z0-9-]+\.bin$/.test(file))).toEqual([])
    if (fault === 'throw') return
    expect((await motelight(folder, 'run', 'scene.yaml', '--quiet', '--resume')).exitCode).toBe(0)
    expect(readFileSync(join(folder, 'out/scene/images/face.fits'))).toEqual(await whole(long))
  })
})

describe('a disk that takes no more', () => {
  /** Products larger than the limit, state smaller: the run itself comes to its end. */
  const text = sceneWith(['pixels: 8', 'pixels: 64'])

  it('stops the run with its state, and nothing half-written; it can be gone on with', async () => {
    const folder = folderWith({ 'scene.yaml': text })
    // A limit on the size of files (POSIX: in blocks of 512 bytes) stands for the disk.
    const { exitCode, stderr } = await execa({
      cwd: folder,
      reject: false,
      shell: '/bin/sh'
    })`ulimit -f 600; exec node ${program} run scene.yaml --quiet`
    expect(stderr).toMatch(/^cannot write out\/scene\/images\/face\.fits: the file is too large for the file system$/m)
    expect(stderr).toMatch(/\n +motelight run scene\.yaml --quiet --resume$/)
    expect(exitCode).toBe(3)
    const out = join(folder, 'out/scene')
    expect(JSON.parse(readFileSync(join(out, 'run.json'), 'utf8')).state).toBe('writing')
    expect(filesIn(out).filter((file) => /fits|part$/.test(file))).toEqual([])
    expect((await motelight(folder, 'run', 'scene.yaml', '--quiet', '--resume')).exitCode).toBe(0)
    expect(readFileSync(join(out, 'images/face.fits'))).toEqual(await whole(text))
    expect(existsSync(join(out, 'state'))).toBe(false)
  })

  it('that cannot even hold the state ends the run', async () => {
    const folder = folderWith({ 'scene.yaml': text })
    const { exitCode, stderr } = await execa({
      cwd: folder,
      reject: false,
      shell: '/bin/sh'
    })`ulimit -f 4; exec node ${program} run scene.yaml --quiet`
    expect(stderr).toMatch(/^cannot write out\/scene\/state: the file is too large/)
    expect(exitCode).toBe(3)
    expect(filesIn(folder).filter((file) => file.includes('part'))).toEqual([])
  })
})

describe('memory', () => {
  it('a scene that needs more than it may have is refused before anything is begun', async () => {
    const text = sceneWith(
      ['{kind: spherical, radial: 20}', '{kind: spherical, radial: 2000, polar: 2000}'],
      ['pixels: 8', 'pixels: 500']
    )
    const folder = folderWith({ 'scene.yaml': text })
    const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml', '--memory', '1.5GB', '--workers', '4')
    expect(stderr).toMatch(
      /^about [\d.]+ GB of memory would be needed, 1\.50 GB may be used; it would fit with .*cells \(grid\); --memory sets the limit$/
    )
    expect(exitCode).toBe(2)
    expect(filesIn(folder)).toEqual(['scene.yaml'])
  })

  it('fewer workers make it fit where they do', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText })
    const needs = await motelight(folder, 'run', 'scene.yaml', '--memory', '500MB', '--workers', '64')
    const [, fit] = /it would fit with (\d+) workers? instead of 64/.exec(needs.stderr) ?? []
    expect(
      (await motelight(folder, 'run', 'scene.yaml', '--memory', '500MB', '--workers', String(Number(fit) + 1))).exitCode
    ).toBe(2)
    expect((await motelight(folder, 'run', 'scene.yaml', '--memory', '500MB', '--workers', fit)).exitCode).toBe(0)
  })
})

describe('files that change under the program', () => {
  const table = 'wavelength [um],absorption [cm2/g],scattering [cm2/g]\n0.1,9000,900\n1000,1,0.1\n'
  const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`

  it('a table spoilt between check and run is a located message', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith([power, 'law: table\n    file: soot.csv']), 'soot.csv': table })
    expect((await motelight(folder, 'check', 'scene.yaml')).exitCode).toBe(0)
    writeFileSync(join(folder, 'soot.csv'), table.replace('9000', 'many'))
    const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml')
    expect(stderr).toMatch(/^soot\.csv:2:5: absorption = many: a number is expected/)
    expect(exitCode).toBe(2)
    expect(readdirSync(folder).sort()).toEqual(['scene.yaml', 'soot.csv'])
  })

  it('a table that changes during the run is told, and the record holds what was used', async () => {
    const text = sceneWith([power, 'law: table\n    file: soot.csv'], ['equilibrium: 8000', 'equilibrium: 1e6'])
    const folder = folderWith({ 'scene.yaml': text, 'soot.csv': table })
    const run = execa('node', [program, 'run', 'scene.yaml'], { cwd: folder, reject: false })
    while (!existsSync(join(folder, 'out/scene'))) await setTimeout(5)
    writeFileSync(join(folder, 'soot.csv'), table.replace('9000', '8000'))
    const { exitCode, stdout } = await run
    expect(exitCode).toBe(0)
    expect(stdout).toMatch(/warning: .*soot\.csv has changed since the run began; the results are those of its former content/)
  })
})

it('an output folder that may not be written', async () => {
  // The superuser may write everywhere; Linux keeps even that user from /proc.
  const folder = folderWith({ 'scene.yaml': sceneText })
  mkdirSync(join(folder, 'out/scene'), { recursive: true })
  chmodSync(join(folder, 'out/scene'), 0o555)
  const out = process.getuid?.() === 0 ? '/proc/self' : 'out/scene'
  const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml', '--out', out)
  expect(stderr).toMatch(/^(cannot write|the folder \/proc\/self is not empty)/)
  expect(exitCode).toBe(2)
})
