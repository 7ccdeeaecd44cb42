import { existsSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, program, sceneText, sceneWith } from './motelight.js'

const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const withTable = sceneWith([power, 'law: table\n    file: soot.csv'])
const table = 'wavelength [um],absorption [cm2/g],scattering [cm2/g]\n0.1,9000,900\n1000,1,0.1\n'

/** A folder with a run that has its temperatures and nothing else. */
async function unfinished(text = sceneText) {
  const folder = folderWith({ 'scene.yaml': text, 'soot.csv': table })
  expect(await motelight(folder, 'run', 'scene.yaml', '--stage', 'dust', '--quiet')).toMatchObject({ exitCode: 0, stderr: '' })
  return folder
}

describe('--resume', () => {
  it('goes on with the command that a stopped run prints, to the same bits', async () => {
    const effort = 'equilibrium: 2e6, cameras: 2000'
    const text = sceneWith(['equilibrium: 8000, cameras: 2000', effort])
    const folder = folderWith({ 'scene.yaml': text, 'whole.yaml': text })
    const words = ['run', 'scene.yaml', '--out', 'an out', '--workers', '1', '--force']
    const run = execa('node', [program, ...words], { cwd: folder, reject: false })
    while (!existsSync(join(folder, 'an out/state/dust-rounds.bin'))) await setTimeout(5)
    run.kill('SIGTERM')
    const stopped = await run
    expect(stopped.exitCode).toBe(3)
    const command = stopped.stderr.split('\n').at(-1)!.trim()
    expect(command).toBe("motelight run scene.yaml --out 'an out' --workers 1 --resume")
    expect(readdirSync(join(folder, 'an out'))).toEqual(['state'])
    const resumed = await execa({
      cwd: folder,
      shell: '/bin/sh',
      reject: false
    })`${command.replace('motelight', `node ${program}`)}`
    expect(resumed.exitCode).toBe(0)
    expect(existsSync(join(folder, 'an out/state'))).toBe(false)
    await motelight(folder, 'run', 'whole.yaml', '--quiet')
    for (const file of ['images/face.fits', 'spectra/sed.ecsv', 'dust/cells.fits'])
      expect(readFileSync(join(folder, 'an out', file)).equals(readFileSync(join(folder, 'out/whole', file))), file).toBe(true)
  })

  it('begins where there is nothing yet, and says so when all is done', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText })
    const first = await motelight(folder, 'run', 'scene.yaml', '--resume')
    expect(first).toMatchObject({ exitCode: 0, stdout: expect.not.stringContaining('already') })
    const record = readFileSync(join(folder, 'out/scene/run.json'))
    const second = await motelight(folder, 'run', 'scene.yaml', '--resume')
    expect(second).toMatchObject({ exitCode: 0, stdout: expect.stringMatching(/^This run is complete already\.\nSmall wind/) })
    expect(readFileSync(join(folder, 'out/scene/run.json'))).toEqual(record)
    const other = await motelight(folder, 'run', 'scene.yaml', '--resume', '--seed', 'x')
    expect(other).toMatchObject({ exitCode: 2, stderr: expect.stringMatching(/already holds a run/) })
  })

  it('refuses what belongs to another scene, table or seed, saying why', async () => {
    const folder = await unfinished(withTable)
    const resume = (...words: string[]) => motelight(folder, 'run', 'scene.yaml', '--quiet', '--resume', ...words)
    expect(await resume('--seed', 'second')).toMatchObject({
      exitCode: 2,
      stderr: 'out/scene/state/dust.bin belongs to another run: its seed was "first", now it is "second"'
    })
    writeFileSync(join(folder, 'soot.csv'), table.replace('9000', '8000'))
    expect(await resume()).toMatchObject({ exitCode: 2, stderr: expect.stringMatching(/soot\.csv has changed since$/) })
    writeFileSync(join(folder, 'soot.csv'), table)
    writeFileSync(join(folder, 'scene.yaml'), `${withTable}# a remark\n`)
    expect(await resume()).toMatchObject({ exitCode: 2, stderr: expect.stringMatching(/scene\.yaml has changed since$/) })
    writeFileSync(join(folder, 'scene.yaml'), withTable)
    const piece = join(folder, 'out/scene/state/dust.bin')
    const bytes = readFileSync(piece)
    writeFileSync(piece, bytes.subarray(0, bytes.length - 7))
    expect(await resume()).toMatchObject({
      exitCode: 2,
      stderr: expect.stringMatching(/cannot be used: its checksum does not fit/)
    })
    writeFileSync(piece, bytes)
    expect(await resume()).toMatchObject({ exitCode: 0, stderr: '' })
  })

  it('an unfinished run is neither begun anew nor overwritten without a word', async () => {
    const folder = await unfinished()
    expect(await motelight(folder, 'run', 'scene.yaml')).toMatchObject({
      exitCode: 2,
      stderr: expect.stringMatching(/holds an unfinished run; go on with it with --resume.*--force/)
    })
    expect(filesIn(folder)).toEqual(['out/scene/state/dust.bin', 'scene.yaml', 'soot.csv'])
    expect(await motelight(folder, 'run', 'scene.yaml', '--force', '--seed', 'b')).toMatchObject({ exitCode: 0 })
    expect(existsSync(join(folder, 'out/scene/state'))).toBe(false)
  })

  it.each([
    [['--force', '--resume'], /--force replaces a run/],
    [['--force', '--part', '1/2'], /--force replaces a run/],
    [['--stage', 'dust', '--part', '1/2'], /--stage dust comes before/],
    [['--part', '3/2'], /such as 3\/16/],
    [['--part', 'one'], /such as 3\/16/],
    [['--stage', 'light'], /dust.*cameras/],
    [['--memory', '3 apples'], /such as 500MB/]
  ])('%j: exit code 2', async (words, message) => {
    const folder = folderWith({ 'scene.yaml': sceneText })
    const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml', ...words)
    expect(stderr).toMatch(message)
    expect(exitCode).toBe(2)
    expect(filesIn(folder)).toEqual(['scene.yaml'])
  })
})

describe('join', () => {
  it('makes the products of parts that lie here and there', async () => {
    const folder = await unfinished()
    await motelight(folder, 'run', 'scene.yaml', '--part', '1/2')
    await motelight(folder, 'run', 'scene.yaml', '--stage', 'dust', '--out', 'there')
    const second = await motelight(folder, 'run', 'scene.yaml', '--part', '2/2', '--out', 'there')
    expect(second).toMatchObject({ exitCode: 0, stdout: expect.stringMatching(/^Part 2\/2 is in there/) })
    const few = await motelight(folder, 'join', 'scene.yaml')
    expect(few).toMatchObject({ exitCode: 2, stderr: expect.stringMatching(/^part 2\/2 not found in out\/scene; make it/) })
    const all = await motelight(folder, 'join', 'scene.yaml', 'there')
    expect(all).toMatchObject({ exitCode: 0, stdout: expect.stringMatching(/Results are in out\/scene/) })
    await motelight(folder, 'run', 'scene.yaml', '--out', 'whole')
    for (const file of ['images/face.fits', 'spectra/sed.ecsv'])
      expect(readFileSync(join(folder, 'out/scene', file)).equals(readFileSync(join(folder, 'whole', file))), file).toBe(true)
    rmSync(folder, { recursive: true })
  })
})
