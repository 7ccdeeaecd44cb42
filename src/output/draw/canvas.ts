import { PNG } from 'pngjs'
import { type ColourMap, colourIndex } from './colours.js'
import { rasterize } from './rasterize.js'

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
    return PNG.sync.write(this.png, { colorType: 2 })
  }
}
