import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { inferno } from '../draw/colours.js'
import { stretchNote } from './caption.js'
import { cameraIntensity, intensityScale } from './intensity-scale.js'
import { panelSize } from './panel-size.js'
import { cameraView, skyPicture } from './sky-picture.js'
import { stretched } from './stretch.js'

/** The picture (PNG) of wavelength number `k` of a camera: total intensity. */
export function cameraPicture(images: CameraImages, k: number, scene: Scene): Uint8Array {
  const view = cameraView(images, k, scene)
  const size = panelSize(view)
  const values = images.total.subarray(k * images.width * images.height, (k + 1) * images.width * images.height)
  const scale = intensityScale(cameraIntensity(images, k), values, size[1])
  const colour = (value: number) => stretched(value, scale.stretch)
  return skyPicture(view, { values, size, map: inferno, colour, ...scale, note: stretchNote(scale) })
}
