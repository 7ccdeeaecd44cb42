import { parsePicture } from '../../src/compare/measured-picture.js'
import type { PictureData } from '../../src/compare/types.js'
import { drawNormal } from '../../src/math/draw.js'
import { stream } from '../../src/math/random.js'
import type { LightWeights } from '../../src/observe/band.js'
import type { CameraSource } from '../../src/observe/run-source.js'
import { card, realCard } from '../../src/output/fits/card.js'
import { imageHdu } from '../../src/output/fits/image.js'
import { cameraSource, firstWavelength, MJY } from '../observe/sources.js'

/** Where the source of these tests is, deg. */
export const place = { raDeg: 152.25, decDeg: -41.5 }

/** An image of data: pixels of a side (arcsec), turned by an angle (deg), its reference point at an offset (arcsec) from `place`. */
export interface Layout {
  width: number
  height: number
  side: number
  turn?: number
  mirrored?: boolean
  east?: number
  north?: number
  projection?: string
}

/** Cards of the celestial coordinates of a layout. */
export function wcs({
  width,
  height,
  side,
  turn = 0,
  mirrored = false,
  east = 0,
  north = 0,
  projection = 'TAN'
}: Layout): string[] {
  const [sin, cos] = [Math.sin((turn * Math.PI) / 180), Math.cos((turn * Math.PI) / 180)]
  const deg = side / 3600
  const flip = mirrored ? 1 : -1
  return [
    card('CTYPE1', `RA---${projection}`),
    card('CTYPE2', `DEC--${projection}`),
    realCard('CRPIX1', width / 2 + 3.2),
    realCard('CRPIX2', height / 2 - 1.7),
    realCard('CRVAL1', place.raDeg + east / 3600 / Math.cos((place.decDeg * Math.PI) / 180)),
    realCard('CRVAL2', place.decDeg + north / 3600),
    realCard('CD1_1', flip * deg * cos),
    realCard('CD1_2', deg * sin),
    realCard('CD2_1', -flip * deg * sin),
    realCard('CD2_2', deg * cos)
  ]
}

/** The bytes of a FITS file. */
export function fits({ width, height }: Layout, values: Float64Array, cards: string[]): Uint8Array {
  return imageHdu('primary', [width, height], values, cards)
}

/** Data without values yet, in MJy/sr, with the same error in each pixel. */
export function pictureData(layout: Layout, values: Float64Array, level = 1, change: Partial<PictureData> = {}): PictureData {
  const bytes = fits(layout, values, [card('BUNIT', 'MJy/sr'), ...wcs(layout)])
  return {
    name: 'p',
    kind: 'picture',
    camera: 'sky',
    light: { kind: 'line', wavelength: 1e-3 },
    perBeam: false,
    picture: { ...parsePicture(bytes, 'p.fits'), level: { number: level, unit: 'MJy/sr' } },
    ...change
  }
}

/** An arc of a ring brighter on one side, with a blob in the north-east: nothing about it is symmetric. */
export function lopsided(
  options: { width?: number; height?: number; pixel?: number } = {}
): CameraSource & { light: LightWeights } {
  const source = cameraSource(
    (east, north) => {
      const radius = Math.hypot(east / 0.7, north)
      const ring = Math.exp(-(((radius - 1.2) / 0.25) ** 2)) * (1.3 + Math.cos(Math.atan2(east, north) - 1))
      const blob = 3 * Math.exp(-((east - 1) ** 2 + (north - 1.6) ** 2) / 0.08)
      return 100 * MJY * (ring + blob)
    },
    { width: 80, height: 80, pixel: 0.1, ...options }
  )
  return { ...source, sigma: source.sigma.fill(0), sky: place, light: firstWavelength(source) }
}

/** Values with seeded normal noise. */
export function noisy(values: ArrayLike<number>, sigma: number, seed: string): Float64Array {
  const random = stream(seed)
  return Float64Array.from(values, (value) => value + sigma * drawNormal(random))
}
