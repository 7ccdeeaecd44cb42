import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { expect, it } from 'vitest'
import { cameraFits } from '../../src/output/fits/camera-fits.js'
import { readPictures } from '../../src/report/read-picture.js'
import { parseScene } from '../../src/scene/read.js'
import { sceneWith } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'

/** The FITS file of a camera of that many pixels a side, whose value is the wavelength's number plus a hundredth of the pixel's. */
function cameraFile(pixels: number, wavelengths: number) {
  const list = Array.from({ length: wavelengths }, (_, k) => `${k + 1} um`).join(', ')
  const scene = parseScene(sceneWith(['pixels: 8', `pixels: ${pixels}`], ['[2.2 um, 60 um]', `[${list}]`]), 'scene.yaml')
  const count = pixels * pixels
  const total = Float64Array.from({ length: count * wavelengths }, (_, i) => 1e-17 * (Math.floor(i / count) + 1))
  const dark = new Float64Array(total.length)
  const images = {
    camera: scene.cameras[0],
    width: pixels,
    height: pixels,
    total,
    sigma: dark,
    direct: dark,
    emitted: dark,
    scattered: total
  }
  const path = join(folderWith(), 'face.fits')
  writeFileSync(
    path,
    cameraFits({ ...images, modes: new Int8Array(16 * images.total.length), stars: [], samplingError: [], beyond: [] }, scene)
  )
  return { path, file: 'images/face.fits', heading: 'Camera face' }
}

const firstValue = (base64: string) => Buffer.from(base64, 'base64').readFloatLE(0)

it('keeps what fits: all of a small camera; of a large one planes, then wavelengths evenly spread; and says what is missing', () => {
  const small = readPictures([cameraFile(8, 3)]).pictures[0]
  expect([small.planes.length, small.wavelengths, small.notes]).toEqual([5, ['1 µm', '2 µm', '3 µm'], []])

  const { pictures } = readPictures([cameraFile(300, 20)])
  const [large] = pictures
  // 3e6 / (2 x 300^2) = 16 wavelengths of image and error.
  expect(large.planes.map(({ name }) => name)).toEqual(['TOTAL', 'SIGMA'])
  expect([large.wavelengths.length, large.wavelengths[0], large.wavelengths.at(-1)]).toEqual([16, '1 µm', '20 µm'])
  expect(large.notes).toEqual([
    '16 of 20 wavelengths, evenly spread, to keep this page small; all are in images/face.fits.',
    'Not on this page, to keep it small: DIRECT, EMITTED, SCATTERED; they are in images/face.fits.'
  ])
  // 1e-17 erg/s/cm2/Hz/sr is 1 MJy/sr.
  expect(large.values.TOTAL.map(firstValue)).toEqual(large.wavelengths.map((text) => Number.parseFloat(text)))
})

it('shares the room between pictures, and says which one is too large altogether', () => {
  const { pictures, leftOut } = readPictures([cameraFile(900, 1), cameraFile(8, 1)])
  expect(pictures.map(({ planes }) => planes.length)).toEqual([5])
  expect(leftOut).toEqual(['Not on this page, to keep it small: the images of images/face.fits.'])
})
