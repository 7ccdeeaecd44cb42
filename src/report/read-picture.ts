import { DataError } from '../data/error.js'
import { imageValues } from '../data/fits/image.js'
import { pixelMatrix } from '../data/fits/pixel-matrix.js'
import { type FitsUnit, readFits, unitNamed } from '../data/fits/read.js'
import { tableColumn } from '../data/fits/table.js'
import { spacedWavelength, wavelengthLabels } from '../output/wavelength-label.js'
import { ARCSECOND } from '../units/angles.js'
import { AU, LIGHT_SPEED, PARSEC } from '../units/constants.js'
import { intensityUnit, intensityUnits } from '../units/intensity.js'
import { reportUnits } from './report-units.js'
import type { PictureData } from './types.js'

/** Numbers that the pictures of one page hold at most, 5.4 bytes each. */
const MOST_VALUES = 3e6

/** A FITS file of images: where it is, its name on the page, what to call it there, and which of its planes to show if not all. */
export interface PictureFile {
  path: string
  file: string
  heading: string
  planes?: PictureData['planes']
}

/**
 * The pictures of a page, each with its share of the numbers that a page may hold; `leftOut` are remarks on those of which not even
 * one image with its error fits. Throws a DataError.
 */
export function readPictures(files: PictureFile[]): { pictures: PictureData[]; leftOut: string[] } {
  const pictures: PictureData[] = []
  const leftOut: string[] = []
  let left = MOST_VALUES
  files.forEach((from, i) => {
    const picture = readPicture(from, Math.floor(left / (files.length - i)))
    if (!picture) {
      leftOut.push(`Not on this page, to keep it small: the images of ${from.file}.`)
      return
    }
    left -= picture.planes.length * picture.wavelengths.length * picture.width * picture.height
    pictures.push(picture)
  })
  return { pictures, leftOut }
}

/** Whether the images of a FITS file that this program wrote show offsets on the sky, not directions about a place. */
export function isFlat(path: string): boolean {
  return readFits(path)[0].header.text('CTYPE1') === 'RA---TAN'
}

const meanings: Record<string, string> = {
  TOTAL: 'total',
  OBSERVED: 'observed',
  EXPECTED: 'without noise',
  SIGMA: '1 sigma, Monte Carlo',
  NOISE: '1 sigma, instrument',
  DIRECT: 'direct',
  EMITTED: 'emitted by dust',
  SCATTERED: 'scattered by dust',
  DEFICIT: 'ambient light missing',
  Q: 'Stokes Q',
  U: 'Stokes U',
  V: 'Stokes V',
  SIGMA_Q: '1 sigma of Q',
  SIGMA_U: '1 sigma of U',
  SIGMA_V: '1 sigma of V'
}

/**
 * The images of a FITS file that this program wrote, at most `most` numbers. The first plane and its SIGMA come first, at as many
 * wavelengths as fit, evenly spread, then the others at the same ones; an image without wavelengths is one. Undefined when not even one image fits.
 */
function readPicture({ path, file, heading, planes }: PictureFile, most: number): PictureData | undefined {
  const units = readFits(path)
  const first = planes ? unitNamed(units, planes[0].name) : units[0]
  const distance = units[0].header.number('DIST_PC')
  if (distance === undefined) throw new DataError(path, 'has no DIST_PC')
  const [width, height] = first.axes
  const pixels = width * height
  const cube = first.axes.length > 2
  const all = !cube
    ? [Number.NaN]
    : Array.from(tableColumn(unitNamed(units, 'WAVELENGTH'), 'WAVELENGTH').values, (metres) => 100 * metres)
  const fits = Math.min(all.length, Math.floor(most / (2 * pixels)))
  if (fits === 0) return undefined
  const kept = spread(all.length, fits)
  const images = units.filter(
    ({ kind, axes, name }) =>
      kind === 'image' &&
      axes.length === first.axes.length &&
      axes[0] === width &&
      axes[1] === height &&
      (!planes || planes.some((plane) => plane.name === name))
  )
  const notes: string[] = []
  if (fits < all.length)
    notes.push(`${fits} of ${all.length} wavelengths, evenly spread, to keep this page small; all are in ${file}.`)
  const ordered = [
    ...images.slice(0, 1),
    ...images.filter(({ name }) => name === 'SIGMA'),
    ...images.slice(1).filter(({ name }) => name !== 'SIGMA')
  ]
  const shown = ordered.slice(0, Math.floor(most / (kept.length * pixels)))
  const missing = ordered.slice(shown.length)
  if (missing.length > 0)
    notes.push(`Not on this page, to keep it small: ${missing.map(({ name }) => name).join(', ')}; they are in ${file}.`)
  const wavelengths = kept.map((k) => all[k])
  const matrix = pixelMatrix(first)
  if (!matrix) throw new DataError(path, 'has no scale of its pixels')
  const { perEast, perNorth, pixelSr } = matrix
  const side = ([x, y]: [number, number]) => 1 / Math.hypot(x, y) / ARCSECOND
  const beamSr = first.header.number('BEAMSR')
  const contexts = wavelengths.map((wavelength) => ({
    frequencyHz: LIGHT_SPEED / wavelength,
    pixelSr,
    ...(beamSr && { beamSr })
  }))
  const names = new Set(shown.map(({ name }) => name))
  // Magnitudes of observations and data may count from a zero point of their own, which the file does not hold: they are not converted.
  const observed = ['OBSERVED', 'COMPARED'].some((keyword) => units[0].header.has(keyword))
  const candidates = intensityUnits
    .filter((name) => (beamSr || !name.endsWith('/beam')) && !(observed && name.startsWith('mag')))
    .map(intensityUnit)
  const beam = beamOf(first)
  return {
    heading,
    file,
    width,
    height,
    pixel: [side(perEast), side(perNorth)],
    auPerArcsec: (distance * PARSEC * ARCSECOND) / AU,
    wavelengths: cube ? wavelengthLabels(wavelengths).map(spacedWavelength) : [''],
    planes: shown.map(({ name }) => {
      const given = planes?.find((plane) => plane.name === name)
      if (given) return given
      const sigma = errorOf(name, names)
      return { name, meaning: meanings[name] ?? name, ...(sigma && { sigma }) }
    }),
    values: Object.fromEntries(
      shown.map((image) => {
        const values = imageValues(image)
        return [image.name, kept.map((k) => base64Of(values.subarray(k * pixels, (k + 1) * pixels)))]
      })
    ),
    units: reportUnits(first.header.text('BUNIT') ?? '', candidates, contexts),
    ...(beam && { beam }),
    notes
  }
}

/** The name of the plane that holds 1 sigma of another: instrument's noise where there is any. */
function errorOf(name: string, names: Set<string>): string | undefined {
  const candidates =
    name === 'OBSERVED' ? ['NOISE', 'SIGMA'] : name === 'TOTAL' || name === 'EXPECTED' ? ['SIGMA'] : [`SIGMA_${name}`]
  return candidates.find((candidate) => names.has(candidate))
}

function spread(count: number, kept: number): number[] {
  if (kept === 1) return [0]
  return Array.from({ length: kept }, (_, i) => Math.round((i * (count - 1)) / (kept - 1)))
}

function base64Of(values: Float64Array): string {
  const bytes = Buffer.alloc(4 * values.length)
  for (let i = 0; i < values.length; i++) bytes.writeFloatLE(values[i], 4 * i)
  return bytes.toString('base64')
}

function beamOf({ header }: FitsUnit): PictureData['beam'] {
  const [major, minor, positionAngle] = ['BMAJ', 'BMIN', 'BPA'].map((keyword) => header.number(keyword))
  if (major === undefined || minor === undefined || positionAngle === undefined) return undefined
  return { major: major * 3600, minor: minor * 3600, positionAngle }
}
