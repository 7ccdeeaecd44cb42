import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { compareRun } from '../../src/compare/compare-run.js'
import { comparisonRecord } from '../../src/compare/comparison-record.js'
import { readData } from '../../src/compare/read-data.js'
import { card } from '../../src/output/fits/card.js'
import { SceneError } from '../../src/scene/error.js'
import { runFolder } from '../observe/run-folder.js'
import { folderWith } from '../support/folder-with.js'
import { fits, type Layout, wcs } from './measured.js'

const layout: Layout = { width: 16, height: 12, side: 0.5 }
const count = layout.width * layout.height
const unit = card('BUNIT', 'MJy/sr')
const even = (value: number) => new Float64Array(count).fill(value)
const head = 'data:\n'
const pictureEntry =
  '  - {name: map, kind: picture, file: map.fits, camera: face, wavelength: 2.2 um, errors: {level: 1 MJy/sr}, centre: {ra: 152.25 deg, dec: -41.5 deg}}\n'
const fluxEntry = '  - {name: fluxes, kind: photometry, file: fluxes.csv, spectrum: sed}\n'

/** What comparing with these files says, or the problems that refuse it. */
function compared(data: string, files: Record<string, string | Uint8Array>) {
  const folder = folderWith({ 'data.yaml': head + data, ...files })
  return comparisonRecord(compareRun(runFolder(), readData(join(folder, 'data.yaml'))), [])
}

function refusal(data: string, files: Record<string, string | Uint8Array>): string {
  try {
    compared(data, files)
  } catch (error) {
    if (error instanceof SceneError)
      return error.problems.map(({ location, key, message }) => `${location.line} ${key}: ${message}`).join('\n')
    throw error
  }
  return 'accepted'
}

describe('photometry', () => {
  it('is compared at wavelengths and through bands; an upper limit counts as one', () => {
    const table = `name, wavelength [um], flux [mJy], sigma [mJy], limit
a, 1.5, 2200, 100, 0
b, 3, 1900, 100, 0
c, 4, 3000, 300, 1
d, 2.4, , 100, 0
wide, 1.9, 2.1e3, 100, 0
`
    const data = fluxEntry.replace('}', ', bands: {wide: {from: 1.2 um, to: 2.8 um}}}')
    const { sets, warnings } = compared(data, { 'fluxes.csv': table })
    // The model is 2 Jy with a 1 sigma of 0.2 Jy: (0.04 + 0.01 + 0.01) / 0.05, and the limit adds -2 ln P(x < 1/0.36055) = 0.00555.
    const [{ chiSquared, values, limits, leftOut, degreesOfFreedom }] = sets
    expect([values, limits, leftOut, degreesOfFreedom]).toEqual([4, 1, { blank: 1 }, 3])
    expect(chiSquared).toBeCloseTo(1.20555, 4)
    expect(warnings).toEqual([expect.stringMatching(/68 % of the variance is the Monte Carlo noise of the run/)])
  })

  it('is refused where wavelengths, errors or units are not sound', () => {
    const csv = (rows: string) => ({ 'fluxes.csv': `wavelength [um], flux [Jy], sigma [Jy]\n${rows}\n` })
    expect(refusal(fluxEntry, csv('2, 1, 0.1\n7, 1, 0.1'))).toMatch(
      /row 2: the wavelength 7um is outside the model, which reaches from 1um to 5um/
    )
    expect(refusal(fluxEntry, csv('2, 1, -0.1'))).toMatch(/row 1: sigma is -0.1; it must be greater than 0/)
    expect(refusal(fluxEntry, csv('2, faint, 0.1'))).toMatch(/row 1: flux is `faint`; a number is expected/)
    expect(refusal(fluxEntry, { 'fluxes.csv': 'wavelength [um], flux, sigma [Jy]\n2, 1, 1\n' })).toMatch(
      /flux has no unit; accepted: Jy/
    )
    expect(refusal(fluxEntry, { 'fluxes.csv': 'wavelength [um], flux [Jy]\n2, 1\n' })).toMatch(
      /has no column sigma; there are wavelength, flux/
    )
    expect(refusal(fluxEntry.replace('sed', 'other'), csv('2, 1, 0.1'))).toMatch(/2 data.0.spectrum.*there are sed/)
  })
})

describe('pictures', () => {
  it('count what is blank, masked or outside the model', () => {
    const values = even(1)
    values.fill(Number.NaN, 0, 5)
    const mask = even(0)
    mask.fill(1, 3, 9)
    const data = pictureEntry.replace('centre', 'mask: mask.fits, centre')
    const { sets } = compared(data, {
      'map.fits': fits(layout, values, [unit, ...wcs(layout)]),
      'mask.fits': fits(layout, mask, [])
    })
    expect(sets[0].leftOut).toMatchObject({ blank: 3, masked: 6 })
    const left = Object.values(sets[0].leftOut).reduce((sum, value) => sum + value, 0)
    expect(sets[0].values + left).toBe(count)
  })

  it.each([
    ['no BUNIT', fits(layout, even(1), wcs(layout)), /has no BUNIT; one of .*MJy\/sr.* is expected/],
    ['another BUNIT', fits(layout, even(1), [card('BUNIT', 'DN'), ...wcs(layout)]), /BUNIT is DN; one of/],
    ['no coordinates', fits(layout, even(1), [unit]), /has no celestial coordinates \(no WCS\)/],
    [
      'galactic coordinates',
      fits(layout, even(1), [unit, card('CTYPE1', 'GLON-TAN'), card('CTYPE2', 'GLAT-TAN')]),
      /axes are GLON-TAN/
    ],
    [
      'flux a beam without beam',
      fits(layout, even(1), [card('BUNIT', 'Jy/beam'), ...wcs(layout)]),
      /neither its header \(BMAJ, BMIN, BPA\) nor this entry/
    ],
    [
      'an old equinox',
      fits(layout, even(1), [unit, ...wcs(layout), card('RADESYS', 'FK4')]),
      /coordinates are FK4 of 2000; ICRS or FK5 of 2000/
    ],
    ['only blanks', fits(layout, even(Number.NaN), [unit, ...wcs(layout)]), /no pixel can be compared: 192 blank/],
    [
      'another place',
      fits(layout, even(1), [unit, ...wcs({ ...layout, north: 900 })]),
      /192 outside the model; is the source there\?/
    ],
    ['no FITS', 'text', /is not FITS/]
  ])('are refused with %s', (_, bytes, message) => {
    expect(refusal(pictureEntry, { 'map.fits': bytes })).toMatch(message)
  })

  it('are refused with errors that are not greater than 0, or of another size', () => {
    const errors = even(1)
    errors[17] = -2
    const data = pictureEntry.replace('{level: 1 MJy/sr}', '{file: sigma.fits}')
    const map = { 'map.fits': fits(layout, even(1), [unit, ...wcs(layout)]) }
    expect(refusal(data, { ...map, 'sigma.fits': fits(layout, errors, []) })).toMatch(
      /1 errors are not greater than 0, the first, -2, in pixel \(2, 2\)/
    )
    const small = { ...layout, height: 6 }
    expect(refusal(data, { ...map, 'sigma.fits': fits(small, new Float64Array(96), []) })).toMatch(
      /16 x 6 pixels; 16 x 12 are expected/
    )
  })

  it('are refused at a wavelength that the model does not have', () => {
    const map = { 'map.fits': fits(layout, even(1), [unit, ...wcs(layout)]) }
    expect(refusal(pictureEntry.replace('2.2 um', '3 um'), map)).toMatch(
      /2 data.0.wavelength: not a wavelength of the model; there are 2.2um, 870um/
    )
  })
})

describe('visibilities', () => {
  const entry = '  - {name: v, kind: visibilities, file: v.csv, camera: face, wavelength: 870 um, free: [centre]}\n'

  it('are compared with amplitude and phase, or amplitude alone', () => {
    const [without, whole] = ['', ', phase [deg]'].map((phase) => {
      const rows = [10, 30, 60].map((east) => `${east}, 20, 0.5, 0.1${phase && ', 12'}`)
      return `east [m], north [m], amplitude [Jy], sigma [Jy]${phase}\n${rows.join('\n')}\n`
    })
    expect(refusal(entry, { 'v.csv': without })).toMatch(/centre cannot be fitted to these data; what can be is flux, rotation/)
    expect(compared(entry, { 'v.csv': whole }).sets[0]).toMatchObject({ values: 6, degreesOfFreedom: 4 })
    expect(compared(entry.replace(', free: [centre]', ''), { 'v.csv': without }).sets[0]).toMatchObject({ values: 3 })
  })
})

it('the example of two telescopes is sound', () => {
  const file = new URL('../../examples/two-telescopes/data.yaml', import.meta.url).pathname
  const data = readData(file)
  expect(data.sets.map(({ name }) => name)).toEqual(['infrared', 'millimetre', 'baselines', 'fluxes'])
  expect(data.text).toBe(readFileSync(file, 'utf8'))
})
