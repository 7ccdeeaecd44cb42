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
  /** What is painted on it is mostly light: marks are dark. */
  light: boolean
}

/** A bar of a round length with its label, in the lower left corner. */
export function scaleBar({ left, top, width, height, auPerPixel, light }: SkyPanel): string[] {
  const [ink, halo] = inks(light)
  const length = niceBelow(0.25 * width * auPerPixel)
  const pixels = length / auPerPixel
  const y = top + height - inset
  const x = left + inset
  return [
    line(x - 1, y, x + pixels + 1, y, halo, 4),
    line(x, y, x + pixels, y, ink, 2),
    text(x, y - 8, `${shortNumber(length)} au`, { anchor: 'start', fill: ink, outline: halo })
  ]
}

/** Arrows to north (up) and east (left), in the upper right corner. */
export function compass({ left, top, width, light }: SkyPanel): string[] {
  const [ink, halo] = inks(light)
  const length = 32
  const x = left + width - inset
  const y = top + inset + length + 14
  const arrow = (dx: number, dy: number): string[] => {
    const [tipX, tipY] = [x + dx * length, y + dy * length]
    const wing = (side: number): string => `${tipX - 7 * dx + 4 * side * dy},${tipY - 7 * dy + 4 * side * dx}`
    return [
      line(x, y, tipX, tipY, halo, 4),
      `<polygon points="${tipX},${tipY} ${wing(1)} ${wing(-1)}" fill="${ink}" stroke="${halo}" stroke-width="2" paint-order="stroke"/>`,
      line(x, y, tipX - 4 * dx, tipY - 4 * dy, ink, 2)
    ]
  }
  return [
    ...arrow(0, -1),
    ...arrow(-1, 0),
    text(x, y - length - 5, 'N', { fill: ink, outline: halo }),
    text(x - length - 10, y + 4.5, 'E', { fill: ink, outline: halo })
  ]
}

/** Colours of marks and of the halo that keeps them readable. */
function inks(light: boolean): [ink: string, halo: string] {
  return light ? [dark, white] : [white, dark]
}

/** Full widths at half maximum (rad) and position angle of the major axis, east of north. */
export interface BeamEllipse {
  major: number
  minor: number
  positionAngle: number
}

/** The ellipse at half maximum of a beam, in the lower right corner; none where it is larger than a fifth of the panel. */
export function beamMark({ left, top, width, height }: SkyPanel, beam: BeamEllipse, field: [number, number]): string[] {
  const pixelsPerRad = [width / field[0], height / field[1]]
  const [major, minor] = [beam.major, beam.minor].map((axis) => (axis * pixelsPerRad[1]) / 2)
  if (2 * major > height / 5 || 2 * major > width / 5) return []
  const [x, y] = [left + width - inset - major, top + height - inset - major]
  const degrees = (-beam.positionAngle * 180) / Math.PI
  const shape = `rx="${Math.max(1, minor)}" ry="${Math.max(1, major)}" transform="translate(${x} ${y}) scale(${pixelsPerRad[0] / pixelsPerRad[1]} 1) rotate(${degrees})"`
  return [
    `<ellipse ${shape} fill="${white}" fill-opacity="0.6" stroke="${dark}" stroke-width="3" paint-order="stroke"/>`,
    `<ellipse ${shape} fill="none" stroke="${white}" stroke-width="1.5"/>`
  ]
}
