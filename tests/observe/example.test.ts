import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { expect, it } from 'vitest'
import { ecsvNumbers, readEcsv } from '../../src/data/ecsv.js'
import { imageValues } from '../../src/data/fits/image.js'
import { readFits, unitNamed } from '../../src/data/fits/read.js'
import { readInstrument } from '../../src/observe/read-instrument.js'
import { readScene } from '../../src/scene/read.js'

const folder = fileURLToPath(new URL('../../examples/two-telescopes/', import.meta.url))

it('the example is sound, and its data are what its instrument asks for, scattered as their noise says', () => {
  const scene = readScene(`${folder}scene.yaml`)
  const { observations } = readInstrument(`${folder}night.yaml`)
  for (const spec of observations) {
    const names = (spec.kind === 'photometry' ? scene.spectra : scene.cameras).map(({ name }) => name)
    expect(names).toContain(spec.kind === 'photometry' ? spec.spectrum : spec.camera)
  }
  expect(readdirSync(`${folder}data`).sort()).toEqual([
    'infrared.fits',
    'millimetre.fits',
    'photometry.ecsv',
    'visibilities.ecsv'
  ])
  // Reduced chi-squared of independent pixels: five sigma of so many.
  const units = readFits(`${folder}data/infrared.fits`)
  const [observed, noise, expected] = ['OBSERVED', 'NOISE', 'EXPECTED'].map((name) => imageValues(unitNamed(units, name)))
  const shown = Array.from(observed.keys()).filter((i) => Number.isFinite(observed[i]))
  const chi = shown.reduce((sum, i) => sum + ((observed[i] - expected[i]) / noise[i]) ** 2, 0) / shown.length
  expect(Math.abs(chi - 1)).toBeLessThan(5 * Math.sqrt(2 / shown.length))
  const table = readEcsv(`${folder}data/photometry.ecsv`)
  expect(ecsvNumbers(table, 'flux')).toHaveLength(observations.filter(({ kind }) => kind === 'photometry').length)
})
