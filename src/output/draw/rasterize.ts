import { createRequire } from 'node:module'
import { dirname, join } from 'node:path'
import { type RenderedImage, Resvg } from '@resvg/resvg-js'

/** The font family of every drawing. */
export const fontFamily = 'DejaVu Sans'

const fontFolder = join(dirname(createRequire(import.meta.url).resolve('dejavu-fonts-ttf/package.json')), 'ttf')
const font = {
  loadSystemFonts: false,
  fontFiles: ['DejaVuSans.ttf', 'DejaVuSans-Bold.ttf'].map((file) => join(fontFolder, file)),
  defaultFontFamily: fontFamily,
  sansSerifFamily: fontFamily
}

/** Draws an SVG with the fonts of this program only, `zoom` pixels a unit. Its `pixels` are RGBA, multiplied by alpha. */
export function rasterize(svg: string, zoom = 1): RenderedImage {
  return new Resvg(svg, { font, fitTo: { mode: 'zoom', value: zoom } }).render()
}
