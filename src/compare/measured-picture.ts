import { DataError } from '../data/error.js'
import { imageValues } from '../data/fits/image.js'
import { type FitsUnit, firstImage, parseFits, unitNamed } from '../data/fits/read.js'
import { type SkyProjection, skyProjection } from '../data/fits/sky-projection.js'
import type { BeamSpec } from '../observe/types.js'
import { DEGREE } from '../units/angles.js'
import { canonicalUnit } from '../units/dimension.js'
import { type IntensityContext, intensityUnit, intensityUnits } from '../units/intensity.js'
import type { SpectralUnit } from '../units/spectral-unit.js'

/** An image as a FITS file has it, in its own unit. */
export interface MeasuredPicture {
  file: string
  units: FitsUnit[]
  image: FitsUnit
  width: number
  height: number
  values: Float64Array
  unit: SpectralUnit<IntensityContext>
  sky: SkyProjection
  /** Gaussian beam of the header. */
  beam?: BeamSpec
  errors?: Float64Array
  /** 1 sigma of all pixels, when it is one number in a unit. */
  level?: { number: number; unit: string }
  mask?: Float64Array
}

/** Reads the image of a FITS file with its coordinates and unit. Throws a DataError. */
export function parsePicture(bytes: Uint8Array, file: string): MeasuredPicture {
  const units = parseFits(bytes, file)
  const image = firstImage(units)
  const [width, height] = image.axes
  return {
    file,
    units,
    image,
    width,
    height,
    values: planeOf(image),
    unit: unitOf(image),
    sky: skyProjection(image),
    ...beamOf(image)
  }
}

/** The one plane of an image of that size in an extension. Throws a DataError. */
export function planeLike(unit: FitsUnit, { width, height }: { width: number; height: number }): Float64Array {
  if (unit.axes[0] !== width || unit.axes[1] !== height)
    throw new DataError(
      unit.file,
      `${unit.name} has ${unit.axes.slice(0, 2).join(' x ')} pixels; ${width} x ${height} are expected`
    )
  return planeOf(unit)
}

/** 1 sigma of an image in an extension of its file. */
export function errorsIn({ units, width, height }: MeasuredPicture, extension: string): Float64Array {
  return soundErrors(planeLike(unitNamed(units, extension), { width, height }), units[0].file, width)
}

/** Errors of which none is negative or 0. Throws a DataError. */
export function soundErrors(errors: Float64Array, file: string, width: number): Float64Array {
  const wrong = errors.reduce((count, value) => count + (value <= 0 ? 1 : 0), 0)
  if (wrong === 0) return errors
  const first = errors.findIndex((value) => value <= 0)
  const place = `pixel (${(first % width) + 1}, ${Math.floor(first / width) + 1})`
  throw new DataError(file, `${wrong} errors are not greater than 0, the first, ${errors[first]}, in ${place}`)
}

function planeOf(unit: FitsUnit): Float64Array {
  const planes = unit.axes.slice(2).reduce((product, length) => product * length, 1)
  if (planes !== 1) throw new DataError(unit.file, `${unit.name} has ${planes} planes; one image is expected`)
  return imageValues(unit)
}

function unitOf({ header, file, name }: FitsUnit): SpectralUnit<IntensityContext> {
  const written = header.text('BUNIT')
  const list = `one of ${intensityUnits.join(', ')} is expected`
  if (written === undefined || written.trim() === '') throw new DataError(file, `${name}: has no BUNIT; ${list}`)
  const unit = unitLike(written, intensityUnits.map(intensityUnit))
  if (!unit) throw new DataError(file, `${name}: BUNIT is ${written}; ${list}`)
  return unit
}

/** The unit that is written so, in FITS or here; `JY/BEAM` in capitals is common practice in radio astronomy. */
export function unitLike<Context>(written: string, units: SpectralUnit<Context>[]): SpectralUnit<Context> | undefined {
  const text = written.trim().replace(/^JY\/BEAM$/, 'Jy/beam')
  return units.find(({ name, fits }) => fits === text || name === text || name === canonicalUnit(text))
}

function beamOf({ header }: FitsUnit): { beam?: BeamSpec } {
  const major = header.number('BMAJ')
  const minor = header.number('BMIN') ?? major
  if (!(major! > 0) || !(minor! > 0)) return {}
  const positionAngle = (header.number('BPA') ?? 0) * DEGREE
  return { beam: { kind: 'gaussian', major: major! * DEGREE, minor: minor! * DEGREE, positionAngle } }
}
