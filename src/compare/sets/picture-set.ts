import { type Direction, frameAt } from '../../data/fits/sky-projection.js'
import type { LightWeights } from '../../observe/band.js'
import { makeBeam } from '../../observe/beam.js'
import { sigmaOf } from '../../observe/noise-planes.js'
import type { Refuse } from '../../observe/observe-run.js'
import { type BlurredLight, throughBeam } from '../../observe/optics.js'
import type { CameraSource } from '../../observe/run-source.js'
import { intensityOf, pictureUnit } from '../../observe/unit.js'
import { LIGHT_SPEED } from '../../units/constants.js'
import { reprojected } from '../reproject.js'
import type { PictureData } from '../types.js'
import { type ComparedSet, inPlace, type Placement } from './compared-set.js'
import { addPoints, moved, offsetsOf, type Place } from './place.js'

/** Part of a pixel that the model must cover. */
const COVERED = 0.999

/** A picture with the camera that sees the same. */
export function pictureSet(spec: PictureData, source: CameraSource, light: LightWeights, refuse: Refuse): ComparedSet {
  const { picture } = spec
  const { width, height, sky } = picture
  const beam = spec.beam && makeBeam(spec.beam, light.wavelength)
  const inUnit = pictureUnit(picture.unit.name, spec.zeroMagnitude)
  if (!beam && (inUnit.name.endsWith('/beam') || picture.level?.unit.endsWith('/beam')))
    refuse('beam', 'the picture is in flux a beam, but neither its header (BMAJ, BMIN, BPA) nor this entry gives the beam')
  if (!beam && spec.perBeam) refuse('errors', 'errors correlated over the beam need a `beam`')
  const context = { frequencyHz: LIGHT_SPEED / light.wavelength, pixelSr: sky.pixelSr, ...(beam && { beamSr: beam.solidAngle }) }
  const values = picture.values.map((value) => inUnit.toCgs(value, context))
  const level = picture.level && intensityOf(picture.level, context)
  const { errors } = picture
  const sigma = values.map((value, i) => (errors ? inUnit.sigmaToCgs(value, errors[i], context) : level!))
  const centre = spec.centre ?? source.sky
  const frame = frameAt(centre?.raDeg ?? sky.raDeg, centre?.decDeg ?? sky.decDeg)
  const onSky: Place = (east, north) =>
    sky.toPixel(frame.centre.map((value, i) => value + east * frame.east[i] + north * frame.north[i]) as Direction)
  const optics = { ...(spec.beam && { beam: spec.beam }), ...(spec.core && { core: spec.core }) }
  const behindBeam = lastOf((turn) => throughBeam(optics, source, light, turn))
  const target = { width, height, pixelSr: sky.pixelSr }
  const whole = (placement: Placement) => {
    const seen = behindBeam(-placement.rotation)
    const place = moved(onSky, placement)
    return { seen, place, ...reprojected([seen.image, ...seen.noise], source, target, place) }
  }
  const start = whole(inPlace)
  const offsets = offsetsOf(onSky, width, height)
  const leftOut = { blank: 0, masked: 0, 'outside the model': 0 }
  const pixels = Int32Array.from(values.keys()).filter((i) => {
    if (picture.mask && picture.mask[i] !== 0) leftOut.masked++
    else if (spec.core && Math.hypot(offsets.east[i], offsets.north[i]) < spec.core.radius) leftOut.masked++
    else if (!Number.isFinite(values[i]) || !Number.isFinite(sigma[i])) leftOut.blank++
    else if (start.coverage[i] < COVERED) leftOut['outside the model']++
    else return true
    return false
  })
  if (pixels.length === 0) refuse('file', nothingLeft(leftOut, centre !== undefined))
  const take = (all: Float64Array) => Float64Array.from(pixels, (i) => all[i])
  return {
    spec,
    data: { values: take(values), sigma: take(sigma) },
    independent: spec.perBeam ? Math.min(1, sky.pixelSr / beam!.solidAngle) : 1,
    step: 0.1 * Math.sqrt(sky.pixelSr),
    scalings: ['flux', 'centre', 'rotation'],
    leftOut,
    warnings: warningsOf(spec, source, centre !== undefined, leftOut, pixels.length),
    wavelength: light.wavelength,
    model: (placement) => {
      const { seen, place, planes, coverage } = whole(placement)
      const covered = (plane: Float64Array) => Float64Array.from(pixels, (i) => (coverage[i] > 0 ? plane[i] / coverage[i] : 0))
      const [image, ...noise] = planes.map(covered)
      addPoints(image, seen, place, pixels, width)
      return { values: image, sigma: sigmaOf(noise) }
    },
    shown: {
      kind: 'picture',
      pixels,
      width,
      height,
      east: take(offsets.east),
      north: take(offsets.north),
      place: onSky,
      unit: inUnit.name,
      inUnit: (value) => inUnit.fromCgs(value, context),
      sigmaInUnit: (value, sigma) => inUnit.sigmaFromCgs(value, sigma, context),
      distance: source.distance
    }
  }
}

/** Keeps the last result: of the many models of a fit, few have another turn. */
function lastOf(make: (turn: number) => BlurredLight): (turn: number) => BlurredLight {
  let last: { turn: number; made: BlurredLight } | undefined
  return (turn) => {
    if (last?.turn !== turn) last = { turn, made: make(turn) }
    return last.made
  }
}

function nothingLeft(leftOut: Record<string, number>, placed: boolean): string {
  const counts = Object.entries(leftOut).map(([reason, count]) => `${count} ${reason}`)
  const advice = placed ? '; is the source there?' : '; `centre` says where the source is'
  return `no pixel can be compared: ${counts.join(', ')}${leftOut['outside the model'] > 0 ? advice : ''}`
}

function warningsOf(
  { name, picture }: PictureData,
  source: CameraSource,
  placed: boolean,
  leftOut: Record<string, number>,
  used: number
): string[] {
  const outside = leftOut['outside the model']
  return [
    ...(placed
      ? []
      : [
          `${name}: neither the scene (sky) nor the data (centre) says where the source is; it is taken to be at the reference point of ${picture.file}`
        ]),
    ...(outside > used
      ? [`${name}: ${outside} pixels lie outside the field of the camera ${source.name} and are not compared`]
      : []),
    ...(source.blanks > 0 ? [`${name}: ${source.blanks} values of the camera ${source.name} are no numbers, taken as dark`] : [])
  ]
}
