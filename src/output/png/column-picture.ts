import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { viridis } from '../draw/colours.js'
import { stretchNote } from './caption.js'
import { intensityScale } from './intensity-scale.js'
import { panelSize } from './panel-size.js'
import { skyPicture, viewOf } from './sky-picture.js'
import { stretched } from './stretch.js'

const asGiven = { name: 'g/cm2', fromCgs: (value: number) => value }

/** The picture (PNG) of the column density of the dust that a camera looks through. */
export function columnPicture(images: CameraImages, density: Float64Array, scene: Scene): Uint8Array {
  const view = viewOf(images, 'dust', scene)
  const size = panelSize(view)
  const scale = intensityScale({ quantity: 'column density of dust', unit: asGiven }, density, size[1])
  const colour = (value: number) => stretched(value, scale.stretch)
  return skyPicture(view, { values: density, size, map: viridis, colour, ...scale, note: stretchNote(scale) })
}
