import { line, text } from './svg.js'
import type { Ticks } from './ticks.js'

const tickLength = 6
const labelSize = 12
const characterWidth = 0.64 * labelSize
const titleHeight = 13

/** One side of a panel: where its marks go and how a value becomes a pixel along it. */
export interface AxisSide {
  side: 'bottom' | 'top' | 'left' | 'right'
  /** Pixel of the side itself: y of a bottom or top axis, x of a left or right one. */
  at: number
  /** Pixel of the middle of the side, under which the title stands. */
  middle: number
  position: (value: number) => number
  ticks: Ticks
  title: string
}

/** The marks, labels and title of one side, outside the panel. */
export function axis({ side, at, middle, position, ticks, title }: AxisSide): string[] {
  const outward = side === 'bottom' || side === 'right' ? 1 : -1
  const horizontal = side === 'bottom' || side === 'top'
  const mark = (value: number, length: number): string => {
    const p = position(value)
    return horizontal ? line(p, at, p, at + outward * length) : line(at, p, at + outward * length, p)
  }
  const label = (value: number, content: string): string => {
    const p = position(value)
    if (horizontal) return text(p, at + (side === 'bottom' ? tickLength + 13 : -tickLength - 4), content, { size: labelSize })
    return text(at + outward * (tickLength + 3), p + 4.3, content, { size: labelSize, anchor: side === 'left' ? 'end' : 'start' })
  }
  const gap = axisDepth(side, ticks) - (outward === 1 ? 3 : titleHeight)
  return [
    ...ticks.minor.map((value) => mark(value, tickLength / 2)),
    ...ticks.major.map(({ value }) => mark(value, tickLength)),
    ...ticks.major.map(({ value, label: content }) => label(value, content)),
    horizontal ? text(middle, at + outward * gap, title) : text(at + outward * gap, middle, title, { rotate: -90 })
  ]
}

/**
 * The most marks (at most eight labelled) whose labels keep apart along a side of `pixels`; `choose` makes marks for a count.
 */
export function roomyTicks(pixels: number, span: number, horizontal: boolean, choose: (count: number) => Ticks): Ticks {
  for (let count = 8; count > 2; count--) {
    const ticks = choose(count)
    const longest = Math.max(...ticks.major.map(({ label }) => label.length))
    const [first, second] = ticks.major.map(({ value }) => value)
    const needed = horizontal ? longest * characterWidth + 14 : 40
    if ((pixels * (second - first)) / span >= needed) return ticks
  }
  return choose(2)
}

/** Pixels that the marks, labels and title of a side take outside the panel. */
export function axisDepth(side: AxisSide['side'], ticks: Ticks): number {
  if (side === 'bottom' || side === 'top') return tickLength + 16 + titleHeight + 4
  const longest = Math.max(1, ...ticks.major.map(({ label }) => label.length))
  return tickLength + 3 + Math.ceil(longest * characterWidth) + 8 + titleHeight
}
