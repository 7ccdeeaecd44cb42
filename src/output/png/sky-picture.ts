import { forwardOf } from '../../camera/place-view.js'
import type { CameraImages } from '../../camera/types.js'
import { isFromPlace } from '../../scene/is-from-place.js'
import type { CameraSpec, PlaceViewSpec, Scene } from '../../scene/types.js'
import { AU, PARSEC } from '../../units/constants.js'
import { axisDepth } from '../draw/axis.js'
import { Canvas } from '../draw/canvas.js'
import { colourBar, colourBarWidth } from '../draw/colour-bar.js'
import type { ColourMap } from '../draw/colours.js'
import { shortNumber } from '../draw/numbers.js'
import { drawing, outline, text } from '../draw/svg.js'
import type { Ticks } from '../draw/ticks.js'
import type { FieldOfView } from '../fits/wcs.js'
import { inDegrees } from '../in-degrees.js'
import { spacedWavelength, wavelengthLabels } from '../wavelength-label.js'
import { headLines } from './caption.js'
import { placeSides } from './place-axes.js'
import { resample } from './resample.js'
import { type PictureSides, pictureAxes, skySides } from './sky-axes.js'
import { compass, type SkyPanel, scaleBar } from './sky-marks.js'

const margin = 16
const headHeight = 62
const footHeight = 18
const leastWidth = 640
const hiddenGrey = 140

/** What is seen, and the words above it. */
export interface SkyView extends FieldOfView {
  /** cm; of a picture from a place there is none, but what its sides tell. */
  distance?: number
  sides?: (width: number, height: number) => PictureSides
  title: string
  subtitle: string
}

/** What a picture shows of a quantity on the sky. */
export interface SkyLayer {
  /** Width x height values of the image, row 0 the lowest, in any unit that `colour` knows; NaN where nothing is known. */
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

/** Wavelength number `k` of a camera, with its view. */
export function cameraView(images: CameraImages, k: number, scene: Scene): SkyView {
  return viewOf(images, spacedWavelength(wavelengthLabels(images.camera.wavelengths)[k]), scene)
}

/** What a camera sees, `what` in a word or two. */
export function viewOf({ camera, width, height }: CameraImages, what: string, scene: Scene): SkyView {
  if (isFromPlace(camera.view)) return placePictureView(camera, camera.view, what, scene)
  const { inclination, azimuth, roll } = camera.view
  const [i, a, r] = [inclination, azimuth, roll].map((angle) => `${shortNumber(inDegrees(angle))}°`)
  const view = `inclination ${i}, azimuth ${a}, roll ${r} east of north`
  const subtitle = `camera ${camera.name} · ${what} · ${view} · ${shortNumber(scene.distance / PARSEC)} pc`
  return { width, height, field: camera.field, distance: scene.distance, title: scene.title, subtitle }
}

/** Width and height of a picture as it is drawn: angles, rad, in a perspective one their tangents. */
export function flatField({ view, field }: CameraSpec): [number, number] {
  return isFromPlace(view) && !view.allSky ? (field.map((angle) => 2 * Math.tan(angle / 2)) as [number, number]) : field
}

function placePictureView(camera: CameraSpec, view: PlaceViewSpec, wavelength: string, { title }: Scene): SkyView {
  const { from, toward, roll, allSky } = view
  const { name, field } = camera
  const [width, height] = camera.pixels
  const place = (at: number[]) => `(${at.map((component) => shortNumber(component / AU)).join(', ')}) au`
  const turned = roll === 0 ? '' : `, roll ${shortNumber(inDegrees(roll))}°`
  const seen = allSky ? `all sky from ${place(from)}` : `from ${place(from)} towards ${place(toward)}${turned}`
  const middle = allSky ? inDegrees(forwardOf(view).longitude) : undefined
  return {
    width,
    height,
    field: flatField(camera),
    title,
    subtitle: `camera ${name} · ${wavelength} · ${seen}`,
    sides: (across, up) => placeSides(field, middle, across, up)
  }
}

/**
 * A picture (PNG) of the sky, with axes in arcsec and au, colour bar, compass, scale and title. North is up, east to the left; offsets
 * count towards east and north. Pixels without a value are grey.
 */
export function skyPicture(view: SkyView, layer: SkyLayer): Uint8Array {
  const { map, colour, note } = layer
  const [width, height] = layer.size
  const inPanel = (values: Float64Array) => northUp(resample(values, view.width, view.height, width, height), width)
  const values = inPanel(layer.values)
  const hidden = inPanel(layer.values.map((value) => (Number.isNaN(value) ? 1 : 0)))
  const { distance = 0 } = view
  const sides = view.sides?.(width, height) ?? skySides({ ...view, distance }, width, height)

  const left = margin + axisDepth('left', sides.left.ticks)
  const top = headHeight + axisDepth('top', sides.top.ticks)
  const barLeft = left + width + axisDepth('right', sides.right.ticks) + margin
  const canvas = new Canvas(
    Math.max(leastWidth, barLeft + colourBarWidth(layer.ticks) + margin),
    top + height + axisDepth('bottom', sides.bottom.ticks) + footHeight + margin
  )
  const panel: SkyPanel = {
    left,
    top,
    width,
    height,
    auPerPixel: (view.field[0] * distance) / AU / width,
    light: layer.light ?? false
  }

  canvas.paint(
    panel,
    values.map((value, i) => (hidden[i] > 0.5 ? Number.NaN : colour(value))),
    map,
    hiddenGrey
  )
  canvas.overlay(
    drawing(canvas.width, canvas.height, [
      ...headLines(view, margin, canvas.width),
      ...pictureAxes(sides, panel),
      outline(left, top, width, height),
      ...(layer.marks?.(panel) ?? []),
      ...(view.sides ? [] : [...scaleBar(panel), ...compass(panel)]),
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
