import type { CameraImages } from '../../camera/types.js'
import type { Scene } from '../../scene/types.js'
import { AU } from '../../units/constants.js'
import { axisDepth } from '../draw/axis.js'
import { Canvas } from '../draw/canvas.js'
import { colourBar, colourBarWidth } from '../draw/colour-bar.js'
import type { ColourMap } from '../draw/colours.js'
import { drawing, outline, text } from '../draw/svg.js'
import type { Ticks } from '../draw/ticks.js'
import { headLines } from './caption.js'
import { resample } from './resample.js'
import { skyAxes, skyTicks } from './sky-axes.js'
import { compass, type SkyPanel, scaleBar } from './sky-marks.js'

const margin = 16
const headHeight = 62
const footHeight = 18
const leastWidth = 640

/** What a picture shows of a quantity on the sky. */
export interface SkyLayer {
  /** Width x height values of the image, row 0 the lowest, in any unit that `colour` knows. */
  values: Float64Array
  /** Size of the panel, pixels. */
  size: [width: number, height: number]
  map: ColourMap
  /** The map is light where there is little. */
  light?: boolean
  /** Place of a value in the colour map, 0 to 1. */
  colour: (value: number) => number
  /** Marks of the colour bar, its title, and where values of its unit lie, 0 to 1. */
  ticks: Ticks
  title: string
  fraction: (value: number) => number
  /** What is drawn on the panel. */
  marks?: (panel: SkyPanel) => string[]
  /** A line below. */
  note: string
}

/**
 * A picture (PNG) of wavelength number `k` of a camera, with axes in arcsec and au, colour bar, compass, scale, title and view.
 * North is up, east to the left; offsets count towards east and north.
 */
export function skyPicture(images: CameraImages, k: number, scene: Scene, layer: SkyLayer): Uint8Array {
  const { camera } = images
  const { map, colour, note } = layer
  const [width, height] = layer.size
  const values = northUp(resample(layer.values, images.width, images.height, width, height), width)
  const ticks = skyTicks(camera, scene.distance, width, height)

  const left = margin + axisDepth('left', ticks.left)
  const top = headHeight + axisDepth('top', ticks.top)
  const barLeft = left + width + axisDepth('right', ticks.right) + margin
  const canvas = new Canvas(
    Math.max(leastWidth, barLeft + colourBarWidth(layer.ticks) + margin),
    top + height + axisDepth('bottom', ticks.bottom) + footHeight + margin
  )
  const panel: SkyPanel = {
    left,
    top,
    width,
    height,
    auPerPixel: (camera.field[0] * scene.distance) / AU / width,
    light: layer.light ?? false
  }

  canvas.paint(panel, values.map(colour), map)
  canvas.overlay(
    drawing(canvas.width, canvas.height, [
      ...headLines(images, k, scene, margin, canvas.width),
      ...skyAxes(ticks, camera, scene.distance, panel),
      outline(left, top, width, height),
      ...(layer.marks?.(panel) ?? []),
      ...scaleBar(panel),
      ...compass(panel),
      ...colourBar(canvas, { ...layer, left: barLeft, top, height }),
      text(margin, canvas.height - margin, note, { size: 12, anchor: 'start', fill: '#555' })
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
