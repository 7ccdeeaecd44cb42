import type { Model } from '../model/model.js'
import type { CameraSpec, SpectrumSpec, ViewSpec } from '../scene/types.js'
import type { Detector } from '../transport/detector.js'
import type { PixelFrame } from './direct.js'
import { type ViewBasis, viewBasis } from './view.js'

/** The view with what the symmetry of the cells makes irrelevant set to zero: azimuth for cells symmetric about z. */
export function seenFrom(model: Model, view: ViewSpec): ViewBasis {
  return viewBasis(model.dimensions < 3 ? { ...view, azimuth: 0 } : view)
}

/** Pixels of a camera, with sizes in cm at the source. */
export function pixelFrame(camera: CameraSpec, distance: number): PixelFrame {
  const [width, height] = camera.pixels
  return {
    width,
    height,
    pixelWidth: (camera.field[0] * distance) / width,
    pixelHeight: (camera.field[1] * distance) / height
  }
}

/** Solid angle of a pixel, sr. */
export function pixelSolidAngle(camera: CameraSpec): number {
  return (camera.field[0] * camera.field[1]) / (camera.pixels[0] * camera.pixels[1])
}

/** A camera as single packets meet it. */
export function cameraDetector(model: Model, camera: CameraSpec): Detector {
  const { distance } = model.scene
  return {
    ...seenFrom(model, camera.view),
    width: camera.pixels[0],
    height: camera.pixels[1],
    halfWidth: 0.5 * camera.field[0] * distance,
    halfHeight: 0.5 * camera.field[1] * distance,
    round: false
  }
}

/** An aperture as single packets meet it. */
export function apertureDetector(model: Model, spectrum: SpectrumSpec): Detector {
  const radius = spectrum.aperture * model.scene.distance
  return { ...seenFrom(model, spectrum.view), width: 1, height: 1, halfWidth: radius, halfHeight: radius, round: true }
}
