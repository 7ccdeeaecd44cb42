import { join } from 'node:path'
import { describe, expect, it, test } from 'vitest'
import { instrumentJsonSchema, readInstrument } from '../../src/observe/read-instrument.js'
import { realCard } from '../../src/output/fits/card.js'
import { imageHdu } from '../../src/output/fits/image.js'
import { SceneError, type SceneProblem } from '../../src/scene/error.js'
import { ARCSECOND, DEGREE, MILLIARCSECOND } from '../../src/units/angles.js'
import { folderWith } from '../support/folder-with.js'

const text = `title: Test bench
observations:
  - name: map
    kind: picture
    camera: face
    wavelength: 870 um
    beam: {kind: gaussian, major: 1 arcsec, minor: 600 mas, position-angle: 30 deg}
    noise: {kind: rms, level: 25 uJy/beam, per: beam}
    unit: Jy/beam
  - name: frame
    kind: picture
    camera: face
    band: {response: filter.csv}
    zero-magnitude: 640 Jy
    beam: {kind: kernel, file: psf.fits}
    pixel: [0.2 arcsec, 0.1 arcsec]
    core: {radius: 0.5 arcsec, starlight: 2 %}
    background: {level: 14 mag/arcsec2, subtracted: true}
    noise: {kind: exposure, time: 5 min, zero-point: 24 mag, read-noise: 5}
    unit: counts
  - {name: flux, kind: photometry, spectrum: sed, band: {from: 2 um, to: 2.4 um}, noise: {kind: relative, level: 3 %}, unit: mag}
  - name: array
    kind: visibilities
    camera: face
    wavelength: 345 GHz
    baselines: stations.csv
`
const filter = 'wavelength [um],response\n2.4,0\n2.3,0.8\n2.1,0.9\n2.0,0\n'
const stations = 'east [m],north [km]\n10,0.02\n-5,0\n'
const psf = (...cards: string[]) => imageHdu('primary', [3, 3], new Float64Array([0, 1, 0, 1, 4, 1, 0, 1, 0]), cards)
const scaled = psf(realCard('CDELT1', -1e-4), realCard('CDELT2', 1e-4))

function place(content: string, files: Record<string, string | Uint8Array> = {}): string {
  const all = { 'filter.csv': filter, 'stations.csv': stations, 'psf.fits': scaled, 'night.yaml': content, ...files }
  return join(folderWith(all), 'night.yaml')
}

function problems(from: string, to: string, files = {}): SceneProblem[] {
  if (!text.includes(from)) throw new Error(`no ${from}`)
  try {
    readInstrument(place(text.replace(from, to), files))
  } catch (error) {
    expect(error).toBeInstanceOf(SceneError)
    return (error as SceneError).problems
  }
  throw new Error('the instrument was accepted')
}

describe('an instrument file', () => {
  it('is read in cgs and rad, with its files', () => {
    const { title, seed, observations, inputs } = readInstrument(place(text))
    expect([title, seed, inputs.length]).toEqual(['Test bench', '1', 4])
    expect(observations[0]).toEqual({
      name: 'map',
      kind: 'picture',
      camera: 'face',
      light: { kind: 'line', wavelength: 870 * 1e-4 },
      beam: { kind: 'gaussian', major: ARCSECOND, minor: 600 * MILLIARCSECOND, positionAngle: 30 * DEGREE },
      noise: { kind: 'rms', level: { number: 25, unit: 'uJy/beam' }, per: 'beam' },
      unit: 'Jy/beam'
    })
    expect(observations[1]).toMatchObject({
      light: { kind: 'band', response: new Float64Array([0, 0.9, 0.8, 0]), weighting: 'photon' },
      zeroMagnitude: 640 * 1e-23,
      beam: { kind: 'kernel', kernel: { width: 3, height: 3, centre: [1, 1] } },
      core: { starlight: 0.02 },
      noise: { kind: 'exposure', time: 300, zeroPoint: { number: 24, unit: 'mag' }, readNoise: 5 }
    })
    expect(observations[3]).toMatchObject({
      baselines: [
        [10 * 100, 0.02 * 1e5],
        [-5 * 100, 0]
      ]
    })
    expect(readInstrument(place(text), { seed: 'other' }).seed).toBe('other')
  })

  test.each([
    ['kind: picture', 'kind: image', 4, 'observations.0.kind', /accepted: picture, photometry, visibilities/],
    ['870 um', '870', 6, 'observations.0.wavelength', /number with its unit/],
    ['    wavelength: 870 um\n', '', 3, 'observations.0', /exactly one of `wavelength` and `band`/],
    [
      '    wavelength: 870 um\n',
      '    wavelength: 870 um\n    band: {from: 1 um, to: 2 um}\n',
      3,
      'observations.0',
      /exactly one/
    ],
    ['{from: 2 um, to: 2.4 um}', '{from: 2.5 um, to: 2.4 um}', 21, 'observations.2.band.to', /greater than `from`/],
    ['kind: gaussian', 'kind: gausian', 7, 'observations.0.beam.kind', /did you mean `gaussian`/],
    ['major: 1 arcsec', 'major: 1 mm', 7, 'observations.0.beam.major', /unit of length/],
    [
      '    beam: {kind: gaussian, major: 1 arcsec, minor: 600 mas, position-angle: 30 deg}\n',
      '',
      8,
      'observations.0.unit',
      /without a `beam`/
    ],
    ['25 uJy/beam', '25 uJy/baem', 8, 'observations.0.noise.level', /did you mean `uJy\/beam`/],
    ['25 uJy/beam', '-2 uJy/beam', 8, 'observations.0.noise.level', /greater than 0/],
    ['per: beam', 'per: sky', 8, 'observations.0.noise.per', /accepted: beam, pixel/],
    ['starlight: 2 %', 'starlight: 3', 17, 'observations.1.core.starlight', /from 0 to 1/],
    ['time: 5 min', 'time: 5 m', 19, 'observations.1.noise.time', /units: s, min, h/],
    ['read-noise: 5}\n    unit: counts', 'read-noise: 5}\n    unit: count', 20, 'observations.1.unit', /did you mean `counts`/],
    ['unit: Jy/beam', 'unit: counts', 9, 'observations.0.unit', /only by noise of the kind `exposure`/],
    ['640 Jy', '640 mag', 14, 'observations.1.zero-magnitude', /units: Jy, mJy/],
    ['name: frame', 'name: MAP', 10, 'observations.1.name', /used twice/],
    ['baselines: stations.csv', 'baselines: [[1 m, 2]]', 26, 'observations.3.baselines.0.1', /number with its unit/],
    ['  - name: array', '  - colour: red\n    name: array', 22, 'observations.3.colour', /unknown key/],
    ['filter.csv', 'none.csv', 13, 'observations.1.band.response', /does not exist/]
  ] as [string, string, number, string, RegExp][])('with %j as %j is refused where it stands', (from, to, line, key, message) => {
    const found = problems(from, to)
    const problem = found.find((candidate) => candidate.key === key)
    expect(problem, JSON.stringify(found)).toBeDefined()
    expect(problem!.location.line).toBe(line)
    expect(problem!.message).toMatch(message)
  })

  test.each([
    ['filter.csv', 'wavelength,response\n2,1\n3,1\n', /unit is missing/],
    ['filter.csv', 'wavelength [um],response\n2,1\n3,-1\n', /must not be negative/],
    ['filter.csv', 'wavelength [um],response\n2,0\n3,0\n', /every value/],
    ['stations.csv', 'east [m],north [s]\n1,2\n3,4\n', /unit is not accepted/],
    ['psf.fits', 'hello', /not FITS/],
    ['psf.fits', psf(), /no pixel scale/],
    [
      'psf.fits',
      imageHdu('primary', [2, 2], new Float64Array([1, Number.NaN, 1, 1]), [realCard('CDELT1', 1e-4), realCard('CDELT2', 1e-4)]),
      /1 of 4 pixels of the beam have no value/
    ],
    ['psf.fits', imageHdu('primary', [2, 1, 2], new Float64Array(4), []), /is a cube/],
    ['psf.fits', imageHdu('primary', [2, 2], new Float64Array(4), [realCard('CDELT1', 1e-4), realCard('CDELT2', 1e-4)]), /add up/]
  ] as [string, string | Uint8Array, RegExp][])('with a wrong %s is refused', (name, bytes, message) => {
    const [problem] = problems('title', 'title', { [name]: bytes })
    expect(problem.message).toMatch(message)
  })

  it('has a JSON Schema that describes its keys', () => {
    const schema = JSON.stringify(instrumentJsonSchema())
    for (const word of ['zero-magnitude', 'obstruction', 'read-noise', 'baselines', 'uJy/beam']) expect(schema).toContain(word)
  })
})
