import { join } from 'node:path'
import { expect, it, test } from 'vitest'
import { imageValues } from '../../src/data/fits/image.js'
import { readFits, unitNamed } from '../../src/data/fits/read.js'
import { openRun } from '../../src/observe/run-source.js'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, sceneText, sceneWith } from './motelight.js'

const night = `title: A small mirror
observations:
  - {name: map, kind: picture, camera: face, wavelength: 60 um, beam: {kind: gaussian, major: 2 arcsec}, unit: Jy/beam}
  - {name: sed-2, kind: photometry, spectrum: sed, wavelength: 10 um, noise: {kind: relative, level: 5 %}}
  - {name: pair, kind: visibilities, camera: face, wavelength: 60 um, baselines: [[1 m, 0 m]]}
`

/** A folder with a small run in `run` and the instrument file. */
async function withRun(scene = sceneText, ...words: string[]): Promise<string> {
  const folder = folderWith({ 'scene.yaml': scene, 'night.yaml': night })
  const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml', '--out', 'run', ...words)
  expect(exitCode, stderr).toBe(0)
  return folder
}

it('a run is observed: files, summary, JSON; the same seed gives the same bytes', async () => {
  const folder = await withRun()
  const first = await motelight(folder, 'observe', 'run', 'night.yaml')
  expect(first.exitCode, first.stderr).toBe(0)
  expect(first.stdout).toContain('A small mirror: Small wind')
  expect(first.stdout).toContain('Results are in run-night')
  expect(filesIn(join(folder, 'run-night'))).toHaveLength(10)
  const second = await motelight(folder, 'observe', 'run', 'night.yaml', '--out', 'again', '--json', '--quiet')
  const { observations, files, state } = JSON.parse(second.stdout)
  expect([observations.length, files.length, state]).toEqual([3, 10, 'done'])
  const map = (out: string) => imageValues(readFits(join(folder, out, 'pictures', 'map.fits'))[0])
  expect(map('again')).toEqual(map('run-night'))
  // The point star of the run, at the place and with the flux of its pixels.
  const { stars, direct, pixel } = openRun(join(folder, 'run')).camera('face')!
  const flux = direct.subarray(0, 64).reduce((sum, value) => sum + value, 0) * pixel[0] * pixel[1]
  expect(stars[0].flux[0] / flux).toBeCloseTo(1, 9)
  const refused = await motelight(folder, 'observe', 'run', 'night.yaml')
  expect([refused.exitCode, refused.stderr]).toEqual([2, expect.stringContaining('already holds a result')])
  const replaced = await motelight(folder, 'observe', 'run', 'night.yaml', '--force', '--seed', '2')
  expect(replaced.exitCode).toBe(0)
})

test.each(['peel', 'exit'])('a run by %s is observed with its star', async (estimator) => {
  const folder = await withRun(sceneWith(['[2.2 um, 60 um]', '[2.2 um]']), '--estimator', estimator)
  const instrument = night.split('\n').slice(0, 3).join('\n').replace('60 um', '2.2 um').replace('Jy/beam', 'Jy/pixel')
  const file = join(folderWith({ 'night.yaml': instrument }), 'night.yaml')
  const { exitCode, stderr, stdout } = await motelight(folder, 'observe', 'run', file, '--out', 'seen', '--json')
  expect(exitCode, stderr).toBe(0)
  const [{ fieldJy }] = JSON.parse(stdout).observations
  const units = readFits(join(folder, 'run', 'images', 'face.fits'))
  const { pixel } = openRun(join(folder, 'run')).camera('face')!
  const sum = imageValues(units[0]).reduce((all, value) => all + value, 0) * 1e6 * pixel[0] * pixel[1]
  expect(fieldJy / sum).toBeCloseTo(1, 9)
  expect(imageValues(unitNamed(units, 'DIRECT')).reduce((all, value) => all + value, 0)).toBeGreaterThan(0)
})

test.each([
  [['observe', 'nowhere', 'night.yaml'], /nowhere: does not exist; the folder of a run/],
  [['observe', '.', 'night.yaml'], /holds no run/],
  [['observe', 'run'], /run or the instrument file is missing/],
  [['observe', '.', 'absent.yaml'], /absent\.yaml:1:1: the instrument file does not exist/],
  [['observe', '.', 'wrong.yaml'], /wrong\.yaml:2:\d+: observations\.0\.kind/],
  [['convert', '3.2 mJy/beam', '--to', 'MJy/sr'], /not defined without a beam/],
  [['convert', '1 Jy', '--to', 'MJy/sr', '--beam', '3 au'], /--beam 3 au: .*unit of length/],
  [['convert', '1 Jy'], /Missing required argument: to/]
] as [string[], RegExp][])('%j is refused with exit code 2 and nothing written', async (words, message) => {
  const folder = folderWith({ 'night.yaml': night, 'wrong.yaml': 'observations:\n  - {name: x, kind: movie}\n' })
  const { exitCode, stderr } = await motelight(folder, ...words)
  expect(stderr).toMatch(message)
  expect(exitCode).toBe(2)
  expect(filesIn(folder)).toEqual(['night.yaml', 'wrong.yaml'])
})

it('convert answers in words and in JSON', async () => {
  const words = ['convert', '3.2 mJy/beam', '--to', 'MJy/sr', '--wavelength', '870um', '--beam', '0.3x0.2 arcsec']
  // 37547.9167276 MJy/sr of 1 Jy in a 1 arcsec beam (astropy 5.2.1), over 0.06.
  expect((await motelight('.', ...words)).stdout).toBe('3.2 mJy/beam = 2002.555559 MJy/sr')
  expect(JSON.parse((await motelight('.', ...words, '--json')).stdout)).toEqual({
    value: expect.closeTo(2002.555558805, 6),
    unit: 'MJy/sr'
  })
})
