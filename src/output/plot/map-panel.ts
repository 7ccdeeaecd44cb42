import { AU } from '../../units/constants.js'
import { axis } from '../draw/axis.js'
import type { Canvas } from '../draw/canvas.js'
import { colourBar } from '../draw/colour-bar.js'
import type { ColourMap } from '../draw/colours.js'
import { outline, text } from '../draw/svg.js'
import { linearTicks, logTicks } from '../draw/ticks.js'
import { cellEdges } from './cell-edges.js'
import { type MeridianView, meridianCells } from './meridian.js'
import type { MeridionalStructure } from './structure.js'

/** Size of a panel, and the room it takes with its axes and colour bar. */
export const panel = { width: 380, height: 270, leftRoom: 76, rightRoom: 130, pitch: 330 }

/** A map of positive values; NaN where there is nothing to show. */
export interface MapContent {
  values: Float64Array
  map: ColourMap
  title: string
  /** The edges of the cells show. */
  edges: boolean
}

/** Paints one map of the meridional plane with its upper left corner at (left, top), and returns its axes and bar. */
export function mapPanel(
  canvas: Canvas,
  structure: MeridionalStructure,
  view: MeridianView,
  content: MapContent,
  [left, top]: [number, number]
): string[] {
  const { width, height } = panel
  const cells = meridianCells(structure, view, width, height)
  return [...paintMap(canvas, cells, content, { left, top, width, height }), ...meridianAxes(view, left, top)]
}

/** Paints the cells (-1: none) of a map, row by row from the top, colours logarithmic, and returns its outline and bar. */
export function paintMap(
  canvas: Canvas,
  cells: Int32Array,
  { values, map, title, edges }: MapContent,
  { left, top, width, height }: { left: number; top: number; width: number; height: number }
): string[] {
  const frame = outline(left, top, width, height)
  const [low, high] = positiveRange(values)
  if (!(high > 0)) return [frame, text(left + width / 2, top + height / 2, 'does not emit', { fill: '#777' })]
  // Values that differ by rounding alone are one value.
  const floor = low < high * (1 - 1e-6) ? low : high / 2
  const fraction = (value: number): number => Math.log(value / floor) / Math.log(high / floor)
  canvas.paint(
    { left, top, width },
    Float64Array.from(cells, (cell) => (cell < 0 ? Number.NaN : fraction(values[cell]))),
    map
  )
  if (edges) canvas.trace({ left, top, width }, cellEdges(cells, width))
  return [
    frame,
    ...colourBar(canvas, { left: left + width + 14, top, height, map, ticks: logTicks(floor, high, 6), title, fraction })
  ]
}

function meridianAxes({ inner, outer, height }: MeridianView, left: number, top: number): string[] {
  const [low, high] = [inner / AU, outer / AU]
  return [
    ...axis({
      side: 'bottom',
      at: top + panel.height,
      middle: left + panel.width / 2,
      position: (au) => left + (panel.width * Math.log(au / low)) / Math.log(high / low),
      ticks: logTicks(low, high, 7),
      title: 'R (au)'
    }),
    ...axis({
      side: 'left',
      at: left,
      middle: top + panel.height / 2,
      position: (slope) => top + (panel.height * (1 - slope / height)) / 2,
      ticks: linearTicks(-height, height, 6),
      title: 'z/R'
    })
  ]
}

function positiveRange(values: Float64Array): [number, number] {
  let [low, high] = [Number.POSITIVE_INFINITY, 0]
  for (const value of values) {
    if (!(value > 0)) continue
    if (value < low) low = value
    if (value > high) high = value
  }
  return [low, high]
}
