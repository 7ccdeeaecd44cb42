import { spawnSync } from 'node:child_process'
import { join } from 'node:path'
import { expect, it } from 'vitest'
import { imageValues } from '../../src/data/fits/image.js'
import { readFits, unitNamed } from '../../src/data/fits/read.js'
import { folderWith } from '../support/folder-with.js'
import { askPython, astropy, fitsverify, itWith } from '../support/python.js'
import { filesIn, motelight, sceneText } from './motelight.js'

const night = `observations:
  - {name: map, kind: picture, camera: face, wavelength: 60 um, unit: mJy/arcsec2, noise: {kind: rms, level: 50 mJy/arcsec2, per: pixel}}
`
const data = `title: What was seen
data:
  - {name: map, kind: picture, file: seen/pictures/map.fits, camera: face, wavelength: 60 um, errors: {extension: NOISE}, free: [flux]}
  - {name: fluxes, kind: photometry, file: fluxes.csv, spectrum: sed}
`
const fluxes = 'wavelength [um], flux [Jy], sigma [Jy]\n10, 100, 20\n'

/** A folder with a small run, and data that were made of it. */
async function withData(): Promise<string> {
  const folder = folderWith({ 'scene.yaml': sceneText, 'night.yaml': night, 'data.yaml': data, 'fluxes.csv': fluxes })
  await motelight(folder, 'run', 'scene.yaml', '--out', 'run')
  const seen = await motelight(folder, 'observe', 'run', 'night.yaml', '--out', 'seen')
  expect(seen.exitCode, seen.stderr).toBe(0)
  return folder
}

it('a run is compared with data: files, summary, JSON; what is wrong is told with its line', async () => {
  const folder = await withData()
  const first = await motelight(folder, 'compare', 'run', 'data.yaml')
  expect(first.exitCode, first.stderr).toBe(0)
  expect(first.stdout).toContain('What was seen: Small wind')
  expect(first.stdout).toMatch(/flux +\d.* ± .* map/)
  const written = ['comparison.json', 'data.yaml', 'sets/fluxes.ecsv', 'sets/fluxes.png', 'sets/map-profiles.png']
  expect(filesIn(join(folder, 'run-data'))).toEqual(
    expect.arrayContaining([...written, 'sets/map-residual.png', 'sets/map.fits'])
  )
  const second = await motelight(folder, 'compare', 'run', 'data.yaml', '--out', 'again', '--json', '--quiet')
  const { sets, all, scalings, state } = JSON.parse(second.stdout)
  expect([sets.length, scalings.length, state]).toEqual([2, 1, 'done'])
  const units = readFits(join(folder, 'again', 'sets', 'map.fits'))
  const residuals = imageValues(units[0]).filter(Number.isFinite)
  const square = residuals.reduce((sum, value) => sum + value * value, 0)
  expect(square).toBeCloseTo(sets[0].chiSquared, 6)
  expect(all.chiSquared).toBeCloseTo(sets[0].chiSquared + sets[1].chiSquared, 9)
  expect(unitNamed(units, 'MODEL').header.text('BUNIT')).toBe('mJy/arcsec2')

  const refused = await motelight(folder, 'compare', 'run', 'data.yaml')
  expect([refused.exitCode, refused.stderr]).toEqual([2, expect.stringContaining('already holds a result')])
  const wrong = await motelight(
    folderWith({ 'data.yaml': data.replace('camera: face', 'camra: face') }),
    'compare',
    join(folder, 'run'),
    'data.yaml'
  )
  expect([wrong.exitCode, wrong.stderr]).toEqual([2, expect.stringMatching(/data.yaml:3:.*camra/)])
  expect((await motelight(folder, 'compare', 'run')).stderr).toContain('The run or the file of data is missing.')
  expect(JSON.parse((await motelight(folder, 'schema', 'data')).stdout).title).toBe('Motelight data')

  if (fitsverify.present)
    expect(spawnSync(fitsverify.command, ['-q', join(folder, 'run-data/sets/map.fits')], { encoding: 'utf8' }).stdout).toContain(
      'OK'
    )
})

// Source: astropy reads the files, and finds the same place of the sky in the same pixel as in the data.
itWith(astropy, 'residuals keep the coordinates of the data', async () => {
  const folder = await withData()
  await motelight(folder, 'compare', 'run', 'data.yaml', '--quiet')
  const [there, unit] = askPython<[number[][], string]>(
    `
from astropy.wcs import WCS
from astropy.table import Table
from astropy.io import fits
def corner(hdus):
    return [float(v) for v in WCS(hdus[0].header, fobj=hdus).celestial.all_pix2world([[0, 0]], 0)[0]]
out = [corner(fits.open(name)) for name in data['files']]
answer = [out, str(Table.read(data['table'])['model'].unit)]`,
    {
      files: ['seen/pictures/map.fits', 'run-data/sets/map.fits'].map((name) => join(folder, name)),
      table: join(folder, 'run-data/sets/fluxes.ecsv')
    }
  )
  expect(there[0]).toEqual(there[1])
  expect(unit).toBe('Jy')
})
