import { DataError } from '../data/error.js'
import { imageValues } from '../data/fits/image.js'
import { type FitsUnit, readFits, unitNamed } from '../data/fits/read.js'
import { tableColumn } from '../data/fits/table.js'
import { spacedWavelength, wavelengthLabels } from '../output/wavelength-label.js'
import { AU, LIGHT_SPEED, PARSEC } from '../units/constants.js'
import { intensityUnit, intensityUnits } from '../units/intensity.js'
import { reportUnits } from './report-units.js'
import type { PictureData } from './types.js'

const MOST_VALUES = 2.5e6

/** Numbers that the pictures of one page hold at most, 5.4 bytes each; what does not fit is left out, and the page says so. */
export class ValueBudget {
  left = MOST_VALUES

  /** Takes so many numbers if they are there. */
  take(count: number): boolean {
    if (count > this.left) return false
    this.left -= count
    return true
  }
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
 * The images of a FITS file that this program wrote, `path`; `file` is its name on the page. The first plane and its SIGMA come
 * first at as many wavelengths as the budget allows, evenly spread, then the others at the same ones. Undefined when not even one
 * image fits. Throws a DataError.
 */
export function readPicture(path: string, file: string, heading: string, budget: ValueBudget): PictureData | undefined {
  const units = readFits(path)
  const first = units[0]
  const number = (keyword: string) => {
    const value = first.header.number(keyword)
    if (value === undefined) throw new DataError(path, `has no ${keyword}`)
    return value
  }
  const [width, height] = first.axes
  const pixels = width * height
  const all = Array.from(tableColumn(unitNamed(units, 'WAVELENGTH'), 'WAVELENGTH').values, (metres) => 100 * metres)
  const fits = Math.min(all.length, Math.floor(budget.left / (2 * pixels)))
  if (fits === 0) return undefined
  const kept = spread(all.length, fits)
  const images = units.filter(({ kind, axes }) => kind === 'image' && axes[0] === width && axes[1] === height)
  const notes: string[] = []
  if (fits < all.length)
    notes.push(`${fits} of ${all.length} wavelengths, evenly spread, to keep this page small; all are in ${file}.`)
  const ordered = [
    ...images.slice(0, 1),
    ...images.filter(({ name }) => name === 'SIGMA'),
    ...images.slice(1).filter(({ name }) => name !== 'SIGMA')
  ]
  const shown = ordered.filter(({ axes }) => budget.take(pixels * Math.min(kept.length, axes[2] ?? 1)))
  const missing = ordered.filter((image) => !shown.includes(image))
  if (missing.length > 0)
    notes.push(`Not on this page, to keep it small: ${missing.map(({ name }) => name).join(', ')}; they are in ${file}.`)
  const wavelengths = kept.map((k) => all[k])
  const pixel: [number, number] = [Math.abs(number('CDELT1')), Math.abs(number('CDELT2'))]
  const pixelSr = pixel[0] * pixel[1] * (Math.PI / 180) ** 2
  const beamSr = first.header.number('BEAMSR')
  const contexts = wavelengths.map((wavelength) => ({
    frequencyHz: LIGHT_SPEED / wavelength,
    pixelSr,
    ...(beamSr && { beamSr })
  }))
  const names = new Set(shown.map(({ name }) => name))
  // Magnitudes of an observation may count from a zero point of their own, which the file does not hold: they are not converted.
  const observed = first.header.has('OBSERVED')
  const candidates = intensityUnits
    .filter((name) => (beamSr || !name.endsWith('/beam')) && !(observed && name.startsWith('mag')))
    .map(intensityUnit)
  const beam = beamOf(first)
  return {
    heading,
    file,
    width,
    height,
    pixel: [pixel[0] * 3600, pixel[1] * 3600],
    auPerArcsec: (number('DIST_PC') * PARSEC * Math.PI) / 180 / 3600 / AU,
    wavelengths: wavelengthLabels(wavelengths).map(spacedWavelength),
    planes: shown.map(({ name }) => {
      const sigma = errorOf(name, names)
      return { name, meaning: meanings[name] ?? name, ...(sigma && { sigma }) }
    }),
    values: Object.fromEntries(shown.map((image) => [image.name, kept.map((k) => base64Of(imageValues(image), pixels, k))])),
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

function base64Of(values: Float64Array, pixels: number, k: number): string {
  const bytes = Buffer.alloc(4 * pixels)
  for (let i = 0; i < pixels; i++) bytes.writeFloatLE(values[k * pixels + i], 4 * i)
  return bytes.toString('base64')
}

function beamOf({ header }: FitsUnit): PictureData['beam'] {
  const [major, minor, positionAngle] = ['BMAJ', 'BMIN', 'BPA'].map((keyword) => header.number(keyword))
  if (major === undefined || minor === undefined || positionAngle === undefined) return undefined
  return { major: major * 3600, minor: minor * 3600, positionAngle }
}
