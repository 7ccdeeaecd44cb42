import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { StarOnSky } from '../camera/types.js'
import { ecsvNumbers, readEcsv } from '../data/ecsv.js'
import { DataError } from '../data/error.js'
import { imageValues, imageValuesInto, valueCount } from '../data/fits/image.js'
import { type FitsUnit, readFits, unitNamed } from '../data/fits/read.js'
import { tableColumn } from '../data/fits/table.js'
import { recordName } from '../run/run-folder.js'
import type { RunRecord } from '../run/run-record.js'
import { ARCSECOND, DEGREE } from '../units/angles.js'
import { JANSKY, LIGHT_SPEED, PARSEC } from '../units/constants.js'
import { fluxUnit, fluxUnits } from '../units/flux.js'
import { intensityUnit, intensityUnits } from '../units/intensity.js'
import type { SpectralUnit } from '../units/spectral-unit.js'
import type { PixelGrid } from './blur.js'

/** Images and spectra of a model, wherever they are: their names, and how each is had. */
export interface ModelLight {
  cameras: string[]
  spectra: string[]
  /** Undefined for a camera at a place of the scene, whose lines of sight are not parallel. */
  camera: (name: string) => CameraSource | undefined
  spectrum: (name: string) => SpectrumSource
}

/** A finished run in a folder. Its images and spectra are read when asked for; what cannot be used is a DataError. */
export interface RunSource extends ModelLight {
  path: string
  record: RunRecord
}

/** Images of a camera of a run, cgs; planes of wavelengths x height x width values, rows from south to north. */
export interface CameraSource extends PixelGrid {
  name: string
  wavelengths: number[]
  total: Float64Array
  sigma: Float64Array
  /** wavelengths x modes x height x width: the noise in units of sigma, mode by mode; absent where the run did not keep it. */
  modes?: Float32Array
  direct: Float64Array
  stars: StarOnSky[]
  /** Values that were no numbers, taken as dark. */
  blanks: number
  /** Distance, cm. */
  distance: number
  /** Place of the centre (ICRS, deg), when the scene gave it. */
  sky?: { raDeg: number; decDeg: number }
}

/** A spectrum of a run, cgs. */
export interface SpectrumSource {
  name: string
  wavelengths: number[]
  total: Float64Array
  sigma: Float64Array
}

/** Opens the folder of a run. Throws a DataError for one that holds no finished run. */
export function openRun(path: string): RunSource {
  if (!existsSync(path)) throw new DataError(path, 'does not exist; the folder of a run is expected')
  const file = join(path, recordName)
  let record: RunRecord
  try {
    record = JSON.parse(readFileSync(file, 'utf8')) as RunRecord
  } catch (error) {
    const unsound = error instanceof SyntaxError
    throw new DataError(path, unsound ? `holds an unsound ${recordName}` : 'holds no run (there is no run.json in it)')
  }
  if (record.program !== 'motelight' || !Array.isArray(record.files)) throw new DataError(path, 'holds no run')
  if (record.state === 'writing') throw new DataError(path, 'holds a run whose files were never finished; run it again')
  const named = (folder: string, ending: string) =>
    record.files.flatMap((name) =>
      name.startsWith(folder) && name.endsWith(ending) ? [name.slice(folder.length, -ending.length)] : []
    )
  return {
    path,
    record,
    cameras: named('images/', '.fits'),
    spectra: named('spectra/', '.ecsv'),
    camera: (name) => readCamera(join(path, 'images', `${name}.fits`), name),
    spectrum: (name) => readSpectrum(join(path, 'spectra', `${name}.ecsv`), name)
  }
}

function readCamera(file: string, name: string): CameraSource | undefined {
  const units = readFits(file)
  const total = units[0]
  if (total.header.text('CTYPE1') !== 'RA---TAN') return undefined
  const [width, height] = total.axes
  const wavelengths = Array.from(tableColumn(unitNamed(units, 'WAVELENGTH'), 'WAVELENGTH').values, (metres) => 100 * metres)
  const number = (keyword: string) => {
    const value = total.header.number(keyword)
    if (value === undefined) throw new DataError(file, `has no ${keyword}`)
    return value
  }
  const pixel: [number, number] = [Math.abs(number('CDELT1')) * DEGREE, Math.abs(number('CDELT2')) * DEGREE]
  const unit = unitOfFits(total.header.text('BUNIT'), intensityUnits.map(intensityUnit), file)
  const contexts = wavelengths.map((wavelength) => ({ frequencyHz: LIGHT_SPEED / wavelength, pixelSr: pixel[0] * pixel[1] }))
  const plane = (hdu: FitsUnit) => imageValues(hdu)
  const given = plane(total)
  const pixels = width * height
  if (given.length !== pixels * wavelengths.length) throw new DataError(file, 'the image and its wavelengths do not agree')
  const cgs = (values: Float64Array) => values.map((value, i) => unit.toCgs(value, contexts[Math.floor(i / pixels)]))
  const sigmas = plane(unitNamed(units, 'SIGMA'))
  const modes = units.find(({ name: extension }) => extension === 'MODES')
  const values = cgs(given)
  const sigma = sigmas.map((value, i) => unit.sigmaToCgs(values[i], value, contexts[Math.floor(i / pixels)]))
  const blanks = unit.name.startsWith('mag') ? 0 : given.reduce((count, value) => count + (Number.isFinite(value) ? 0 : 1), 0)
  const placeholder = total.header.comments.some((comment) => comment.includes('CRVAL2 are placeholders'))
  return {
    name,
    width,
    height,
    pixel,
    wavelengths,
    total: values.map(orDark),
    sigma: sigma.map(orDark),
    ...(modes && { modes: imageValuesInto(new Float32Array(valueCount(modes)), modes) }),
    direct: cgs(plane(unitNamed(units, 'DIRECT'))).map(orDark),
    stars: starsOf(units, wavelengths.length),
    blanks,
    distance: number('DIST_PC') * PARSEC,
    ...(!placeholder && { sky: { raDeg: number('CRVAL1'), decDeg: number('CRVAL2') } })
  }
}

function readSpectrum(file: string, name: string): SpectrumSource {
  const table = readEcsv(file)
  const unit = unitOfFits(table.columns.get('flux')?.unit, fluxUnits.map(fluxUnit), file)
  const [wavelengthUm, flux, sigma] = ['wavelength', 'flux', 'sigma'].map((column) => ecsvNumbers(table, column))
  return spectrumSource(name, unit, { wavelengthUm, flux, sigma })
}

/** A spectrum from its numbers in a unit; what is no number is dark. */
export function spectrumSource(
  name: string,
  unit: SpectralUnit<{ frequencyHz: number }>,
  { wavelengthUm, flux, sigma }: Record<'wavelengthUm' | 'flux' | 'sigma', ArrayLike<number>>
): SpectrumSource {
  const wavelengths = Array.from(wavelengthUm, (um) => um * 1e-4)
  const contexts = wavelengths.map((wavelength) => ({ frequencyHz: LIGHT_SPEED / wavelength }))
  const total = Float64Array.from(flux, (value, k) => orDark(unit.toCgs(value, contexts[k])))
  const errors = Float64Array.from(sigma, (value, k) => orDark(unit.sigmaToCgs(total[k], value, contexts[k])))
  return { name, wavelengths, total, sigma: errors }
}

const orDark = (value: number) => (Number.isFinite(value) ? value : 0)

function unitOfFits<Context>(fits: string | undefined, units: SpectralUnit<Context>[], file: string): SpectralUnit<Context> {
  const unit = units.find((candidate) => candidate.fits === fits)
  if (!unit) throw new DataError(file, fits === undefined ? 'has no unit' : `has a unit not known here: ${fits}`)
  return unit
}

function starsOf(units: FitsUnit[], wavelengths: number): StarOnSky[] {
  const table = units.find(({ name }) => name === 'STARS')
  if (!table) return []
  const column = (name: string) => tableColumn(table, name).values
  const [east, north, radius] = ['east', 'north', 'radius'].map((name) => column(name).map((value) => value * ARCSECOND))
  const limbDarkening = column('limb_darkening')
  const flux = column('flux').map((value) => value * JANSKY)
  return Array.from(east, (_, i) => ({
    name: table.header.text(`STAR${i + 1}`) ?? String(i + 1),
    east: east[i],
    north: north[i],
    radius: radius[i],
    limbDarkening: limbDarkening[i],
    flux: flux.slice(i * wavelengths, (i + 1) * wavelengths)
  }))
}
