import { shortNumber } from '../draw/numbers.js'
import { line, text } from '../draw/svg.js'
import { niceBelow } from '../draw/ticks.js'

const white = '#fff'
const dark = '#000'
const inset = 16

/** A panel on the sky: its place in the picture and the length of a pixel, au. */
export interface SkyPanel {
  left: number
  top: number
  width: number
  height: number
  auPerPixel: number
}

/** A bar of a round length with its label, in the lower left corner. */
export function scaleBar({ left, top, width, height, auPerPixel }: SkyPanel): string[] {
  const length = niceBelow(0.25 * width * auPerPixel)
  const pixels = length / auPerPixel
  const y = top + height - inset
  const x = left + inset
  return [
    line(x - 1, y, x + pixels + 1, y, dark, 4),
    line(x, y, x + pixels, y, white, 2),
    text(x, y - 8, `${shortNumber(length)} au`, { anchor: 'start', fill: white, outline: dark })
  ]
}

/** Arrows to north (up) and east (left), in the upper right corner. */
export function compass({ left, top, width }: SkyPanel): string[] {
  const length = 32
  const x = left + width - inset
  const y = top + inset + length + 14
  const arrow = (dx: number, dy: number): string[] => {
    const [tipX, tipY] = [x + dx * length, y + dy * length]
    const wing = (side: number): string => `${tipX - 7 * dx + 4 * side * dy},${tipY - 7 * dy + 4 * side * dx}`
    return [
      line(x, y, tipX, tipY, dark, 4),
      `<polygon points="${tipX},${tipY} ${wing(1)} ${wing(-1)}" fill="${white}" stroke="${dark}" stroke-width="2" paint-order="stroke"/>`,
      line(x, y, tipX - 4 * dx, tipY - 4 * dy, white, 2)
    ]
  }
  return [
    ...arrow(0, -1),
    ...arrow(-1, 0),
    text(x, y - length - 5, 'N', { fill: white, outline: dark }),
    text(x - length - 10, y + 4.5, 'E', { fill: white, outline: dark })
  ]
}
