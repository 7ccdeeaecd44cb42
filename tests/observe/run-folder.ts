import { mkdirSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import type { CameraImages } from '../../src/camera/types.js'
import { cameraFits } from '../../src/output/fits/camera-fits.js'
import { spectrumEcsv } from '../../src/output/spectrum-ecsv.js'
import { exampleImages, exampleScene, exampleSpectrum } from '../output/examples.js'
import { folderWith } from '../support/folder-with.js'

/** Flux of a grey source of 2 Jy at every wavelength. */
export const spectrum = exampleSpectrum([1e-4, 1.5e-4, 2e-4, 3e-4, 5e-4], [2e-23, 2e-23, 2e-23, 2e-23, 2e-23])

/** 24 x 16 pixels of 0.5 arcsec, a bright quarter in the north-east, at 2.2 and 870 um, with a star at the centre. */
export function images(unit = 'MJy/sr'): CameraImages {
  const made = exampleImages((x, y, k) => (x >= 6 && x < 12 && y >= 8 && y < 12 ? 2e-17 : 0) * (k + 1), {
    pixels: [24, 16],
    fieldArcsec: [12, 8],
    wavelengths: [2.2e-4, 870e-4],
    unit
  })
  const flux = new Float64Array([3e-26, 4e-27])
  made.stars = [{ name: 'star', east: 0, north: 0, radius: 0, limbDarkening: 0, flux }]
  const pixelSr = (0.5 * (Math.PI / 648000)) ** 2
  for (let k = 0; k < 2; k++) {
    for (const at of [7 * 24 + 11, 7 * 24 + 12, 8 * 24 + 11, 8 * 24 + 12]) {
      made.direct[k * 384 + at] = flux[k] / pixelSr / 4
      made.total[k * 384 + at] += made.direct[k * 384 + at]
    }
  }
  return made
}

/** A folder that holds what `observe` reads of a run: camera `face` and spectrum `sed`. */
export function runFolder(change: { fits?: Uint8Array; record?: object } = {}): string {
  const folder = join(folderWith(), 'run')
  for (const name of ['images', 'spectra']) mkdirSync(join(folder, name), { recursive: true })
  const record = {
    program: 'motelight',
    version: '0.1.0',
    state: 'done',
    title: 'Example source',
    seed: '1',
    inputs: [],
    estimator: 'emissivity',
    files: ['run.json', 'images/face.fits', 'images/face-2.2um.png', 'spectra/sed.ecsv'],
    ...change.record
  }
  writeFileSync(join(folder, 'run.json'), JSON.stringify(record))
  writeFileSync(join(folder, 'images', 'face.fits'), change.fits ?? cameraFits(images(), exampleScene()))
  writeFileSync(join(folder, 'spectra', 'sed.ecsv'), spectrumEcsv(spectrum, exampleScene()))
  return folder
}
