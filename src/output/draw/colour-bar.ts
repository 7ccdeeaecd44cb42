import { type AxisSide, axis, axisDepth } from './axis.js'
import type { Canvas } from './canvas.js'
import type { ColourMap } from './colours.js'
import { outline } from './svg.js'
import type { Ticks } from './ticks.js'

const barWidth = 18

/** A vertical colour bar: its place, its map, and its marks. */
export interface ColourBar {
  left: number
  top: number
  height: number
  map: ColourMap
  ticks: Ticks
  title: string
  /** Where a value lies between the bottom (0) and the top (1). */
  fraction: (value: number) => number
}

/** Paints the bar and returns its frame, marks and title. */
export function colourBar(canvas: Canvas, { left, top, height, map, ticks, title, fraction }: ColourBar): string[] {
  const fractions = Float64Array.from({ length: barWidth * height }, (_, i) => 1 - (Math.floor(i / barWidth) + 0.5) / height)
  canvas.paint({ left, top, width: barWidth }, fractions, map)
  const right: AxisSide = {
    side: 'right',
    at: left + barWidth,
    middle: top + height / 2,
    position: (value) => top + height * (1 - fraction(value)),
    ticks,
    title
  }
  return [outline(left, top, barWidth, height), ...axis(right)]
}

/** Pixels that a bar takes with its marks and title. */
export function colourBarWidth(ticks: Ticks): number {
  return barWidth + axisDepth('right', ticks)
}
