import type { Quantity } from '../units/quantity.js'
import { mostCameraValues, mostPixels } from './limits.js'
import type { CameraEntry, SpectrumEntry } from './schema/observer-schema.js'
import type { CameraSpec, PlaceViewSpec, ScenePath, SpectrumSpec, Vector, ViewSpec } from './types.js'

/** Widest image or aperture radius, rad: the observer is far away, so rays are parallel. */
const widest = Math.PI / 2

/** Why a camera or spectrum cannot be used: at which of its keys. */
interface Refusal {
  path: ScenePath
  problem: string
}

/** A camera with its field as an angle and its pixels counted both ways. */
export function resolveCamera(entry: CameraEntry, distance: number): CameraSpec | Refusal {
  const seen = entry.view.from ? fromPlace(entry, entry.view.from) : fromAfar(entry, distance)
  if ('problem' in seen) return seen
  const pixels: [number, number] = Array.isArray(entry.pixels)
    ? entry.pixels
    : [entry.pixels, Math.max(1, Math.round(entry.pixels * seen.aspect))]
  if (pixels[1] > mostPixels) return { path: ['pixels'], problem: `${pixels[1]} pixels high; at most ${mostPixels} a side` }
  const values = pixels[0] * pixels[1] * entry.wavelengths.length
  if (values > mostCameraValues) {
    const product = `${pixels[0]} x ${pixels[1]} pixels x ${entry.wavelengths.length} wavelengths`
    return { path: ['pixels'], problem: `${product} are ${values} values; at most ${mostCameraValues} a camera` }
  }
  const { name, wavelengths, unit } = entry
  return { name, view: seen.view, field: seen.field, pixels, wavelengths, unit }
}

/** A view, its full width and height (rad), and how high its picture is beside its width. */
interface Seen<View> {
  view: View
  field: [number, number]
  aspect: number
}

function fromAfar({ view, field }: CameraEntry, distance: number): Seen<ViewSpec> | Refusal {
  for (const key of ['toward', 'field'] as const)
    if (view[key] !== undefined)
      return { path: ['view', key], problem: 'belongs to an observer at a place of the scene; give `from` too' }
  if (field === undefined)
    return {
      path: ['field'],
      problem: 'the key is missing; the full width as an angle such as `12 arcsec` or a length such as `4000 au` is expected'
    }
  const [width, height] = bothSides(field).map((side) => angleAt(side, distance))
  if (Math.max(width, height) > widest) return { path: ['field'], problem: 'wider than 90 deg at this distance' }
  const { inclination = 0, azimuth = 0, roll = 0 } = view
  return { view: { inclination, azimuth, roll }, field: [width, height], aspect: height / width }
}

function fromPlace({ view, field, unit }: CameraEntry, from: Vector): Seen<PlaceViewSpec> | Refusal {
  for (const key of ['inclination', 'azimuth'] as const)
    if (view[key] !== undefined)
      return { path: ['view', key], problem: 'belongs to an observer far away; with `from`, `toward` says where he looks' }
  if (field !== undefined)
    return {
      path: ['field'],
      problem: 'belongs to an observer far away; with `view.from`, `view.field` is the angle of the picture'
    }
  if (unit.endsWith('/pixel'))
    return {
      path: ['unit'],
      problem: 'pixels of this view differ in solid angle; a unit of intensity such as MJy/sr is expected'
    }
  if (view.field === undefined)
    return {
      path: ['view', 'field'],
      problem: 'the key is missing; an angle such as `90 deg`, [width, height], or `all-sky` is expected'
    }
  const { toward = [0, 0, 0] as Vector, roll = 0 } = view
  if (view.field === 'all-sky') {
    if (roll !== 0) return { path: ['view', 'roll'], problem: 'an all-sky map has the +z axis up; leave it out' }
    return { view: { from, toward, roll, allSky: true }, field: [2 * Math.PI, Math.PI], aspect: 0.5 }
  }
  if (toward.every((component, i) => component === from[i]))
    return {
      path: ['view', view.toward ? 'toward' : 'from'],
      problem: 'the observer stands at what he looks at; give another `toward`'
    }
  const [width, height] = bothSides(view.field)
  return {
    view: { from, toward, roll, allSky: false },
    field: [width, height],
    aspect: Math.tan(height / 2) / Math.tan(width / 2)
  }
}

function bothSides<Side>(field: Side | [Side, Side]): [Side, Side] {
  return Array.isArray(field) ? field : [field, field]
}

/** A spectrum with its aperture as an angle. */
export function resolveSpectrum(entry: SpectrumEntry, distance: number): SpectrumSpec | Refusal {
  const aperture = entry.aperture === 'all' ? Number.POSITIVE_INFINITY : angleAt(entry.aperture, distance)
  if (aperture > widest && aperture !== Number.POSITIVE_INFINITY)
    return { path: ['aperture'], problem: 'wider than 90 deg at this distance; `all` takes everything' }
  return { ...entry, aperture }
}

/** A length seen from afar is an angle length / distance. */
function angleAt({ dimension, value }: Quantity, distance: number): number {
  return dimension === 'length' ? value / distance : value
}
