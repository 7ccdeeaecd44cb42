import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { AU } from '../../units/constants.js'
import { axisDepth } from '../draw/axis.js'
import { Canvas } from '../draw/canvas.js'
import { colourBar, colourBarWidth } from '../draw/colour-bar.js'
import { inferno } from '../draw/colours.js'
import { drawing, outline, text } from '../draw/svg.js'
import { headLines, stretchNote } from './caption.js'
import { intensityScale } from './intensity-scale.js'
import { panelSize } from './panel-size.js'
import { resample } from './resample.js'
import { skyAxes, skyTicks } from './sky-axes.js'
import { compass, type SkyPanel, scaleBar } from './sky-marks.js'
import { stretched } from './stretch.js'

const margin = 16
const headHeight = 62
const footHeight = 18
const leastWidth = 640

/**
 * The picture (PNG) of wavelength number `k` of a camera: total intensity with axes in arcsec and au, colour bar, compass,
 * scale, title and view. North is up, east to the left; offsets count towards east and north.
 */
export function cameraPicture(images: CameraImages, k: number, scene: Scene): Uint8Array {
  const { camera } = images
  const [width, height] = panelSize(images)
  const plane = images.total.subarray(k * images.width * images.height, (k + 1) * images.width * images.height)
  const values = northUp(resample(plane, images.width, images.height, width, height), width)
  const scale = intensityScale(images, k, plane, height)
  const ticks = skyTicks(camera, scene.distance, width, height)

  const left = margin + axisDepth('left', ticks.left)
  const top = headHeight + axisDepth('top', ticks.top)
  const barLeft = left + width + axisDepth('right', ticks.right) + margin
  const canvas = new Canvas(
    Math.max(leastWidth, barLeft + colourBarWidth(scale.ticks) + margin),
    top + height + axisDepth('bottom', ticks.bottom) + footHeight + margin
  )
  const panel: SkyPanel = { left, top, width, height, auPerPixel: (camera.field[0] * scene.distance) / AU / width }

  canvas.paint(
    panel,
    values.map((value) => stretched(value, scale.stretch)),
    inferno
  )
  canvas.overlay(
    drawing(canvas.width, canvas.height, [
      ...headLines(images, k, scene, margin, canvas.width),
      ...skyAxes(ticks, camera, scene.distance, panel),
      outline(left, top, width, height),
      ...scaleBar(panel),
      ...compass(panel),
      ...colourBar(canvas, { left: barLeft, top, height, map: inferno, ...scale }),
      text(margin, canvas.height - margin, stretchNote(scale), { size: 12, anchor: 'start', fill: '#555' })
    ])
  )
  return canvas.encode()
}

/** Rows from the bottom (south) up become rows from the top (north) down. */
function northUp(values: Float64Array, width: number): Float64Array {
  const flipped = new Float64Array(values.length)
  for (let at = 0; at < values.length; at += width) flipped.set(values.subarray(at, at + width), values.length - width - at)
  return flipped
}
