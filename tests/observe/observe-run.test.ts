import { execFileSync } from 'node:child_process'
import { readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it, test } from 'vitest'
import { DataError } from '../../src/data/error.js'
import { writeObservation } from '../../src/observe/observation-files.js'
import { type Observed, observeRun } from '../../src/observe/observe-run.js'
import { readInstrument } from '../../src/observe/read-instrument.js'
import { openRun } from '../../src/observe/run-source.js'
import { observationWarnings } from '../../src/observe/warnings.js'
import { cameraFits } from '../../src/output/fits/camera-fits.js'
import { openRunFolder } from '../../src/run/run-folder.js'
import { SceneError } from '../../src/scene/error.js'
import type { PlaceViewSpec } from '../../src/scene/types.js'
import { exampleScene } from '../output/examples.js'
import { askPython, astropy, fitsverify, itWith } from '../support/python.js'
import { images, runFolder } from './run-folder.js'

const picture = `observations:
  - name: map
    kind: picture
    camera: face
    wavelength: 870 um
    beam: {kind: gaussian, major: 2 arcsec, minor: 1.5 arcsec, position-angle: 30 deg}
    noise: {kind: rms, level: 1 mJy/beam, per: beam}
    core: {radius: 0.8 arcsec}
    unit: Jy/beam
`
const flux = '  - {name: k, kind: photometry, spectrum: sed, band: {from: 2 um, to: 2.4 um}, zero-magnitude: 640 Jy, unit: mag}\n'
const array = `  - name: array
    kind: visibilities
    camera: face
    wavelength: 870 um
    baselines: [[30 m, 0 m], [0 m, 40 m], [30 m, 40 m]]
    noise: {kind: rms, level: 1 mJy}
`

function observe(run: string, text: string): Observed {
  const file = join(run, '..', 'night.yaml')
  writeFileSync(file, text)
  return observeRun(run, readInstrument(file))
}

describe('observing a run', () => {
  it('refuses a camera at a place of the scene, whose lines of sight are not parallel', () => {
    const { camera, ...planes } = images()
    const view = { from: [1e14, 0, 0], toward: [0, 0, 0], roll: 0, allSky: false } satisfies PlaceViewSpec
    const fits = cameraFits({ ...planes, camera: { ...camera, view, field: [1, 1] } }, exampleScene())
    expect(() => observe(runFolder({ fits }), picture)).toThrow(/camera = face: this camera stands at a place of the scene/)
  })

  itWith(fitsverify, 'leaves files that fitsverify passes', async () => {
    const run = runFolder()
    const out = join(run, '..', 'out')
    const record = await writeObservation(
      observe(run, picture + flux + array),
      await openRunFolder(out, 'begin', [], 'observation.json')
    )
    expect(record.files).toEqual([
      'observation.json',
      'instrument.yaml',
      'pictures/map.fits',
      'pictures/map.png',
      'photometry.ecsv',
      'photometry-sed.png',
      'visibilities/array.ecsv',
      'visibilities/array-closure.ecsv',
      'visibilities/array-curve.ecsv',
      'visibilities/array.png',
      'report.html'
    ])
    expect(execFileSync(fitsverify.command, [join(out, 'pictures/map.fits')], { encoding: 'utf8' })).toContain(
      'found 0 warning(s) and 0 error(s)'
    )
    expect(JSON.parse(readFileSync(join(out, 'observation.json'), 'utf8'))).toEqual(record)
    await expect(openRunFolder(run, 'replace', [], 'observation.json')).rejects.toThrow('holds a run')
    await expect(openRunFolder(out, 'begin', [], 'observation.json')).rejects.toThrow('already holds a result')
  })

  itWith(astropy, 'leaves files that astropy reads: places, units, beam, fluxes and visibilities', async () => {
    const run = runFolder()
    const out = join(run, '..', 'out')
    const plain = picture
      .replace(/ {4}noise.*\n/, '')
      .replace('Jy/beam\n', 'mJy/arcsec2\n')
      .replace(/ {4}core.*\n/, '')
    await writeObservation(observe(run, plain + flux + array), await openRunFolder(out, 'begin', [], 'observation.json'))
    const theirs = askPython<{
      names: string[]
      unit: string
      bright: number[]
      wavelength: number
      flux: number
      beam: number[]
      k: number[]
      array: number[][]
      closure: number[]
    }>(
      `import numpy as np, astropy.units as u
from astropy.io import fits
from astropy.wcs import WCS
from astropy.table import QTable
with fits.open(data + '/pictures/map.fits', checksum=True) as file:
    image, header, wcs = file[0].data[0], file[0].header, WCS(file[0].header, file)
    y, x = np.indices(image.shape)
    far = (abs(x - 11.5) > 3) | (abs(y - 7.5) > 3)
    centre = [float((image * far * v).sum() / (image * far).sum()) for v in (x, y)]
    sky, wave = wcs.pixel_to_world(*centre, 0)
    pixel = abs(header['CDELT1'] * header['CDELT2']) * 3600**2
    answer = dict(names=[h.name for h in file], unit=str(u.Unit(header['BUNIT'])), bright=[float(sky.ra.deg), float(sky.dec.deg)], wavelength=float(wave.to_value(u.um)),
        flux=float(image.sum() * pixel), beam=[header[k] * 3600 for k in ('BMAJ', 'BMIN')] + [header['BPA']])
phot = QTable.read(data + '/photometry.ecsv')
answer['k'] = [float(phot['flux'][0].to_value(u.Jy)), float(phot['value'][0]), float(phot['wavelength'][0].to_value(u.um))]
vis = QTable.read(data + '/visibilities/array.ecsv')
answer['array'] = [list(map(float, vis[c].value if hasattr(vis[c], 'value') else vis[c])) for c in ('u', 'expected_amplitude', 'expected_phase')]
answer['closure'] = [float(v) for v in QTable.read(data + '/visibilities/array-closure.ecsv')['expected'].to_value(u.deg)]`,
      out
    )
    expect(theirs.names).toEqual(['OBSERVED', 'SIGMA', 'EXPECTED', 'WAVELENGTH'])
    expect(theirs.unit).toBe('mJy / arcsec2')
    expect(theirs.wavelength).toBeCloseTo(870, 9)
    // The bright quarter lies 1.5 arcsec east and 1 arcsec north of the centre.
    expect((theirs.bright[0] - 84.21) * 3600 * Math.cos((31.7 * Math.PI) / 180)).toBeGreaterThan(1)
    expect((theirs.bright[1] + 31.7) * 3600).toBeGreaterThan(0.7)
    // 24 pixels of 4e-17 cgs and the star of 0.4 mJy, less what the beam sends past the edges.
    const expected = (24 * 4e-17 * (0.5 * (Math.PI / 648000)) ** 2) / 1e-26 + 0.4
    expect(theirs.flux / expected).toBeCloseTo(1, 3)
    expect(theirs.beam[0]).toBeCloseTo(2, 9)
    expect(theirs.beam[2]).toBeCloseTo(30, 9)
    // A flat 2 Jy: -2.5 lg(2/640).
    expect(theirs.k[0]).toBeCloseTo(2, 9)
    expect(theirs.k[1]).toBeCloseTo(-2.5 * Math.log10(2 / 640), 9)
    // The brightness lies to the north-east: phases fall towards u and v.
    expect(theirs.array[0][0]).toBeCloseTo(30 / 870e-6, 6)
    expect(theirs.array[2][0]).toBeLessThan(-10)
    expect(theirs.array[2][1]).toBeLessThan(-5)
    expect(theirs.closure).toHaveLength(1)
  })

  it('is the same with a run in any unit', () => {
    const text = picture.replace(/ {4}noise.*\n/, '')
    const at = (unit: string) => {
      const { picture: seen } = observe(runFolder({ fits: cameraFits(images(unit), exampleScene()) }), text).pictures[0]
      return [seen.expected, seen.sigma].map((values) => Array.from(values, (value) => Math.round(value / 1e-22)))
    }
    const inMjy = at('MJy/sr')
    for (const unit of ['erg/s/cm2/Hz/sr', 'Jy/pixel', 'K', 'mag/arcsec2']) expect(at(unit), unit).toEqual(inMjy)
  })

  it('keeps stars through the files of a run', () => {
    const { stars, direct, pixel, blanks, sky } = openRun(runFolder()).camera('face')!
    expect(stars).toHaveLength(1)
    expect(stars[0].name).toBe('star')
    expect(stars[0].flux[0] / 3e-26).toBeCloseTo(1, 12)
    expect((direct.slice(0, 384).reduce((a, b) => a + b) * pixel[0] * pixel[1]) / 3e-26).toBeCloseTo(1, 12)
    expect([blanks, sky]).toEqual([0, { raDeg: 84.21, decDeg: -31.7 }])
    const placeless = runFolder({ fits: cameraFits(images(), exampleScene({ sky: undefined })) })
    expect(openRun(placeless).camera('face')!.sky).toBeUndefined()
  })

  test.each([
    ['camera: face', 'camera: side', 'observations.0.camera', /no such camera; there are face/],
    ['wavelength: 870 um', 'wavelength: 850 um', 'observations.0.wavelength', /there are 2.2um, 870um/],
    ['wavelength: 870 um', 'band: {from: 1 um, to: 3 um}', 'observations.0.band', /reaches from 1um to 3um.*from 2.2um to 870um/],
    ['major: 2 arcsec, minor: 1.5 arcsec', 'major: 20 mas', 'observations.0.beam', /narrower than 0.1 pixels/],
    ['    unit', '    pixel: 9 arcsec\n    unit', 'observations.0.pixel', /larger than the field/],
    ['spectrum: sed', 'spectrum: flux', 'observations.1.spectrum', /there are sed/],
    ['[30 m, 0 m]', '[3 km, 0 m]', 'observations.2.baselines', /pixels at least 17 times smaller/]
  ] as [string, string, string, RegExp][])('in vain (%j as %j) tells where', (from, to, key, message) => {
    const text = (picture + flux + array).replace(from, to)
    let error: unknown
    try {
      observe(runFolder(), text)
    } catch (thrown) {
      error = thrown
    }
    expect(error).toBeInstanceOf(SceneError)
    const [problem] = (error as SceneError).problems
    expect(problem.key).toBe(key)
    expect(problem.message).toMatch(message)
  })

  const without = (keyword: string) =>
    Buffer.from(
      Buffer.from(cameraFits(images(), exampleScene()))
        .toString('latin1')
        .replace(new RegExp(`${keyword.padEnd(8)}=`), `X${keyword.slice(1).padEnd(7)}=`),
      'latin1'
    )
  test.each([
    ['without BUNIT', { fits: without('BUNIT') }, /face.fits: has no unit/],
    ['without WCS', { fits: without('CDELT1') }, /has no CDELT1/],
    ['cut short', { fits: cameraFits(images(), exampleScene()).subarray(0, 8000) }, /cut short/],
    ['never finished', { record: { state: 'writing' } }, /never finished/],
    ['of something else', { record: { program: 'other' } }, /holds no run/]
  ] as [string, Parameters<typeof runFolder>[0], RegExp][])('%s is refused', (_, change, message) => {
    expect(() => observe(runFolder(change), picture)).toThrow(DataError)
    expect(() => observe(runFolder(change), picture)).toThrow(message)
  })

  it('takes pixels without a value as dark, counts them, and warns of what else is doubtful', () => {
    const holed = images()
    holed.total[400] = Number.NaN
    const text = picture.replace('870 um', '2.2 um').replace('major: 2 arcsec, minor: 1.5 arcsec', 'major: 0.6 arcsec') + flux
    const warnings = observationWarnings(observe(runFolder({ fits: cameraFits(holed, exampleScene()) }), text))
    expect(warnings.some((warning) => warning.includes('1 values of the camera face are no numbers'))).toBe(true)
    expect(warnings.some((warning) => warning.includes('only 1.2 pixels'))).toBe(true)
    expect(warnings).toHaveLength(2)
  })
})
