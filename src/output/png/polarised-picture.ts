import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { inferno } from '../draw/colours.js'
import { stretchNote } from './caption.js'
import { cameraIntensity, intensityScale } from './intensity-scale.js'
import { panelSize } from './panel-size.js'
import { polarisationTicks } from './polarisation-ticks.js'
import { cameraView, skyPicture } from './sky-picture.js'
import { stretched } from './stretch.js'

/**
 * The picture (PNG) of polarised intensity sqrt(Q^2 + U^2) of wavelength number `k` of a camera that has Stokes parameters, with
 * ticks along the electric vector.
 */
export function polarisedPicture(images: CameraImages, k: number, scene: Scene): Uint8Array {
  const { q, u } = images.stokes!
  const view = cameraView(images, k, scene)
  const size = panelSize(view)
  const pixels = images.width * images.height
  const values = Float64Array.from({ length: pixels }, (_, i) => Math.hypot(q[k * pixels + i], u[k * pixels + i]))
  const scale = intensityScale(cameraIntensity(images, k, 'polarised intensity'), values, size[1])
  const { marks, note } = polarisationTicks(images, k)
  const colour = (value: number) => stretched(value, scale.stretch)
  const notes = [stretchNote(scale), ...(scale.stretch.empty ? [] : [note])].join('; ')
  return skyPicture(view, { values, size, map: inferno, colour, ...scale, marks, note: notes })
}
