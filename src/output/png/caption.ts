import { fitted, text } from '../draw/svg.js'
import type { IntensityScale } from './intensity-scale.js'

const titleStyle = { size: 17, anchor: 'start', bold: true } as const

/** Title, then subtitle, at the top of a picture `width` pixels wide. */
export function headLines({ title, subtitle }: Record<'title' | 'subtitle', string>, left: number, width: number): string[] {
  const room = width - 2 * left
  return [
    text(left, 28, fitted(title, room, titleStyle), titleStyle),
    text(left, 50, fitted(subtitle, room), { anchor: 'start' })
  ]
}

/** What the stretch is, and what it leaves out, in words. */
export function stretchNote({ stretch, brightest }: IntensityScale): string {
  if (stretch.empty) return 'nothing in this image'
  return `${stretch.kind} stretch${stretch.cut ? `; a few pixels exceed it, up to ${brightest}` : ''}`
}
