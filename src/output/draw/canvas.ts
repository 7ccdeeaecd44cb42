import { PNG } from 'pngjs'
import { type ColourMap, colourIndex } from './colours.js'
import { rasterize } from './rasterize.js'

/** Share of black or white in a line through pixels. */
const LINE = 0.4
/** Such a line is white where colours are darker than this, 0 to 255. */
const DARK = 60

/** A white picture to draw on: pixels first, then lines and text from an SVG of the same size. */
export class Canvas {
  private readonly png: PNG

  constructor(
    readonly width: number,
    readonly height: number
  ) {
    this.png = new PNG({ width, height, colorType: 2 })
    this.png.data.fill(255)
  }

  /**
   * Paints a panel: fractions (0 to 1) of the colour map, row by row from the top; NaN becomes grey of the level `blank`, white
   * unless given.
   */
  paint(
    { left, top, width }: { left: number; top: number; width: number },
    fractions: ArrayLike<number>,
    map: ColourMap,
    blank = 255
  ): void {
    for (let i = 0; i < fractions.length; i++) {
      const at = 4 * ((top + Math.floor(i / width)) * this.width + left + (i % width))
      if (Number.isNaN(fractions[i])) {
        this.png.data.fill(blank, at, at + 3)
        continue
      }
      const colour = 3 * colourIndex(fractions[i])
      for (let channel = 0; channel < 3; channel++) this.png.data[at + channel] = map[colour + channel]
    }
  }

  /** Draws a line through the pixels of a panel that are marked by 1: lighter on dark colours, darker on light ones. */
  trace({ left, top, width }: { left: number; top: number; width: number }, marked: Uint8Array): void {
    const { data } = this.png
    marked.forEach((mark, i) => {
      if (mark === 0) return
      const at = 4 * ((top + Math.floor(i / width)) * this.width + left + (i % width))
      const light = 0.3 * data[at] + 0.6 * data[at + 1] + 0.1 * data[at + 2]
      const ink = light > DARK ? 0 : 255
      for (let channel = 0; channel < 3; channel++) data[at + channel] = Math.round((1 - LINE) * data[at + channel] + LINE * ink)
    })
  }

  /** Lays an SVG over what is there. */
  overlay(svg: string): void {
    const { pixels } = rasterize(svg)
    const { data } = this.png
    for (let i = 0; i < data.length; i += 4) {
      const below = 1 - pixels[i + 3] / 255
      if (below === 1) continue
      for (let channel = 0; channel < 3; channel++) {
        data[i + channel] = Math.min(255, Math.round(pixels[i + channel] + below * data[i + channel]))
      }
    }
  }

  /** The picture as a PNG file. */
  encode(): Uint8Array {
    // One filter for all rows (Paeth): as small as the best of five for each, in two thirds of the time.
    return PNG.sync.write(this.png, { colorType: 2, filterType: 4, deflateLevel: 6 })
  }
}
