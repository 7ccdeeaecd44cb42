import type { Quantity } from '../units/quantity.js'
import { mostCameraValues, mostPixels } from './limits.js'
import type { CameraEntry, SpectrumEntry } from './schema/observer-schema.js'
import type { CameraSpec, SpectrumSpec } from './types.js'

/** Widest image or aperture radius, rad: the observer is far away, so rays are parallel. */
const widest = Math.PI / 2

/** Why a camera or spectrum cannot be used: at which of its keys. */
interface Refusal {
  key: string
  problem: string
}

/** A camera with its field as an angle and its pixels counted both ways. */
export function resolveCamera(entry: CameraEntry, distance: number): CameraSpec | Refusal {
  const sides = Array.isArray(entry.field) ? entry.field : [entry.field, entry.field]
  const [width, height] = sides.map((side) => angleAt(side, distance))
  if (Math.max(width, height) > widest) return { key: 'field', problem: 'wider than 90 deg at this distance' }
  const pixels: [number, number] = Array.isArray(entry.pixels)
    ? entry.pixels
    : [entry.pixels, Math.max(1, Math.round((entry.pixels * height) / width))]
  if (pixels[1] > mostPixels) return { key: 'pixels', problem: `${pixels[1]} pixels high; at most ${mostPixels} a side` }
  const values = pixels[0] * pixels[1] * entry.wavelengths.length
  if (values > mostCameraValues) {
    const product = `${pixels[0]} x ${pixels[1]} pixels x ${entry.wavelengths.length} wavelengths`
    return { key: 'pixels', problem: `${product} are ${values} values; at most ${mostCameraValues} a camera` }
  }
  return { ...entry, field: [width, height], pixels }
}

/** A spectrum with its aperture as an angle. */
export function resolveSpectrum(entry: SpectrumEntry, distance: number): SpectrumSpec | Refusal {
  const aperture = entry.aperture === 'all' ? Number.POSITIVE_INFINITY : angleAt(entry.aperture, distance)
  if (aperture > widest && aperture !== Number.POSITIVE_INFINITY)
    return { key: 'aperture', problem: 'wider than 90 deg at this distance; `all` takes everything' }
  return { ...entry, aperture }
}

/** A length seen from afar is an angle length / distance. */
function angleAt({ dimension, value }: Quantity, distance: number): number {
  return dimension === 'length' ? value / distance : value
}
