import type { Model } from '../model/model.js'
import { isFromPlace } from '../scene/is-from-place.js'
import type { CameraSpec, CameraView, SpectrumSpec, ViewSpec } from '../scene/types.js'
import type { Detector } from '../transport/detector.js'
import { placeView, solidAngleOf } from './place-view.js'
import type { View } from './sight.js'
import { type ViewBasis, viewBasis } from './view.js'

/** The pixels of a picture between their edges, in the coordinates of the field that it shows. */
export interface PixelFrame {
  /** From left to right, one more than pixels. */
  columns: Float64Array
  /** From the lowest up, one more than pixels. */
  rows: Float64Array
  /** The right edge is the left one again, and the lowest and highest row end in a point each. */
  round: boolean
}

/**
 * The view with what the symmetry of the cells makes irrelevant set to zero: azimuth for cells symmetric about z, of the observer or of the
 * place where he stands.
 */
export function seenFrom(model: Model, view: ViewSpec): ViewBasis
export function seenFrom(model: Model, view: CameraView): View
export function seenFrom(model: Model, view: CameraView): View {
  const symmetric = model.dimensions < 3
  if (isFromPlace(view)) return placeView(view, symmetric ? -Math.atan2(view.from[1], view.from[0]) : 0)
  return viewBasis(symmetric ? { ...view, azimuth: 0 } : view)
}

/** Pixels of a camera: in cm at the source of one far away, in the coordinates of `directionAt` of one at a place. */
export function pixelFrame({ view, field, pixels }: CameraSpec, distance: number): PixelFrame {
  const [width, height] = pixels
  if (!isFromPlace(view)) {
    const [across, up] = field.map((side) => 0.5 * side * distance)
    return { columns: edges(width, across, 0), rows: edges(height, up, 0), round: false }
  }
  const { origin, allSky } = placeView(view)
  const [across, up] = field.map((side) => (allSky ? 0.5 * side : Math.tan(0.5 * side)))
  const rows = allSky ? edges(height, up, 0).map((latitude) => Math.sin(latitude) - origin[1]) : edges(height, up, origin[1])
  return { columns: edges(width, across, origin[0]), rows, round: allSky }
}

function edges(count: number, half: number, origin: number): Float64Array {
  return Float64Array.from({ length: count + 1 }, (_, i) => ((2 * i - count) / count) * half - origin)
}

/** Solid angle of every pixel of a camera, sr; row 0 the lowest. */
export function pixelSolidAngles(camera: CameraSpec): Float64Array {
  const { view, field, pixels } = camera
  const [width, height] = pixels
  if (!isFromPlace(view)) return new Float64Array(width * height).fill((field[0] * field[1]) / (width * height))
  const { columns, rows } = pixelFrame(camera, 1)
  const seen = placeView(view)
  return Float64Array.from({ length: width * height }, (_, i) => {
    const [column, row] = [i % width, Math.floor(i / width)]
    return solidAngleOf(seen, columns[column], columns[column + 1], rows[row], rows[row + 1])
  })
}

/** A camera far away as single packets meet it. */
export function cameraDetector(model: Model, camera: CameraSpec): Detector {
  const { distance } = model.scene
  return {
    ...farView(model, camera),
    width: camera.pixels[0],
    height: camera.pixels[1],
    halfWidth: 0.5 * camera.field[0] * distance,
    halfHeight: 0.5 * camera.field[1] * distance,
    round: false
  }
}

/** The view of a camera that is known to be far away. */
export function farView(model: Model, { view }: CameraSpec | SpectrumSpec): ViewBasis {
  if (isFromPlace(view)) throw new TypeError('an observer far away is expected')
  return seenFrom(model, view)
}

/** An aperture as single packets meet it. */
export function apertureDetector(model: Model, spectrum: SpectrumSpec): Detector {
  const radius = spectrum.aperture * model.scene.distance
  return { ...seenFrom(model, spectrum.view), width: 1, height: 1, halfWidth: radius, halfHeight: radius, round: true }
}
