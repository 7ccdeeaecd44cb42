import { fontFamily } from './rasterize.js'

interface TextStyle {
  size?: number
  anchor?: 'start' | 'middle' | 'end'
  bold?: boolean
  fill?: string
  /** Degrees clockwise about the point. */
  rotate?: number
  /** Colour of an outline that keeps the text readable on an image. */
  outline?: string
}

/** A text element; the point is on its baseline. */
export function text(x: number, y: number, content: string, style: TextStyle = {}): string {
  const { size = 13, anchor = 'middle', bold = false, fill = '#222', rotate, outline } = style
  const extras = [
    bold ? ' font-weight="bold"' : '',
    rotate === undefined ? '' : ` transform="rotate(${rotate} ${x} ${y})"`,
    outline ? ` stroke="${outline}" stroke-width="3" stroke-linejoin="round" paint-order="stroke"` : ''
  ].join('')
  return `<text x="${x}" y="${y}" font-family="${fontFamily}" font-size="${size}" text-anchor="${anchor}" fill="${fill}"${extras}>${escaped(content)}</text>`
}

/** A straight line. */
export function line(x1: number, y1: number, x2: number, y2: number, stroke = '#222', width = 1): string {
  return `<line x1="${x1}" y1="${y1}" x2="${x2}" y2="${y2}" stroke="${stroke}" stroke-width="${width}"/>`
}

/** The outline of a rectangle. */
export function outline(x: number, y: number, width: number, height: number): string {
  return `<rect x="${x}" y="${y}" width="${width}" height="${height}" fill="none" stroke="#222" stroke-width="1"/>`
}

/** A whole drawing. */
export function drawing(width: number, height: number, parts: string[]): string {
  return `<svg xmlns="http://www.w3.org/2000/svg" width="${width}" height="${height}">${parts.join('')}</svg>`
}

/** Text cut, with an ellipsis, to what fits into `width` pixels, by the mean width of a character of this font. */
export function fitted(content: string, width: number, { size = 13, bold = false }: TextStyle = {}): string {
  const most = Math.floor(width / ((bold ? 0.63 : 0.55) * size))
  return content.length <= most ? content : `${content.slice(0, most - 1).trimEnd()}…`
}

function escaped(content: string): string {
  return content
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
    .replace(/\p{Cc}/gu, ' ')
}
