import { PNG } from 'pngjs'
import { describe, expect, it } from 'vitest'
import { cameraPicture } from '../../../src/output/png/camera-picture.js'
import { exampleImages, exampleScene } from '../examples.js'

type Pixels = { width: number; height: number; rgb: (x: number, y: number) => number }

function decoded(bytes: Uint8Array): Pixels {
  const { width, height, data } = PNG.sync.read(Buffer.from(bytes))
  return {
    width,
    height,
    rgb: (x, y) => (data[4 * (y * width + x)] << 16) | (data[4 * (y * width + x) + 1] << 8) | data[4 * (y * width + x) + 2]
  }
}

/** Pixels of a colour: how many, and their mean place, within x below `limit`. */
function spot(picture: Pixels, colour: number, limit: number): { count: number; x: number; y: number } {
  let [count, sumX, sumY] = [0, 0, 0]
  for (let y = 0; y < picture.height; y++) {
    for (let x = 0; x < limit; x++) {
      if (picture.rgb(x, y) !== colour) continue
      count++
      sumX += x
      sumY += y
    }
  }
  return { count, x: sumX / count, y: sumY / count }
}

const brightest = 0xfcffa4
const darkest = 0x000004
const white = 0xffffff

describe('cameraPicture', () => {
  // One bright pixel in column 1 of 16 (east) and row 13 of 16 (north).
  const images = exampleImages((x, y) => (x === 1 && y === 13 ? 1e-15 : 1e-17), { pixels: [16, 16], fieldArcsec: [8, 8] })
  images.total.fill(0, 0, 256)
  images.total[13 * 16 + 1] = 1e-15
  const picture = decoded(cameraPicture(images, 0, exampleScene()))
  const panel = 16 * 45
  const left = [...Array(picture.width).keys()].find((x) => picture.rgb(x, picture.height >> 1) === darkest) ?? 0

  it('enlarges each pixel to a whole square of its colour, north up and east to the left', () => {
    const limit = left + panel
    const star = spot(picture, brightest, limit)
    const sky = spot(picture, darkest, limit)
    expect(star.count).toBe(45 * 45)
    expect(sky.count).toBeGreaterThan(0.97 * (panel * panel - 45 * 45))
    expect(star.x).toBeLessThan(sky.x - 200)
    expect(star.y).toBeLessThan(sky.y - 200)
  })

  it('has marks on every side and cuts nothing off at the edges', () => {
    const inked = (fromX: number, toX: number, fromY: number, toY: number): number => {
      let count = 0
      for (let y = fromY; y < toY; y++) for (let x = fromX; x < toX; x++) if (picture.rgb(x, y) !== white) count++
      return count
    }
    const { width, height } = picture
    expect(inked(0, left - 2, 0, height)).toBeGreaterThan(100)
    expect(inked(left, left + panel, 0, 60)).toBeGreaterThan(500)
    expect(inked(left, left + panel, height - 80, height)).toBeGreaterThan(500)
    expect(inked(left + panel + 2, width, 0, height)).toBeGreaterThan(1000)
    expect(inked(0, 4, 0, height) + inked(width - 4, width, 0, height)).toBe(0)
    expect(inked(0, width, 0, 4) + inked(0, width, height - 4, height)).toBe(0)
  })

  it('repeats for the same input', () => {
    expect(cameraPicture(images, 1, exampleScene())).toEqual(cameraPicture(images, 1, exampleScene()))
  })

  it('keeps the aspect of the field, draws dark images and any unit', () => {
    const strip = exampleImages(() => 0, { pixels: [40, 40], fieldArcsec: [20, 5] })
    const { width, height } = decoded(cameraPicture(strip, 0, exampleScene()))
    expect(width).toBeGreaterThan(2 * height)
    for (const unit of ['mag/arcsec2', 'K', 'Jy/pixel', 'erg/s/cm2/Hz/sr']) {
      const ramp = exampleImages((x, y) => 10 ** (x - y - 15), { unit })
      expect(decoded(cameraPicture(ramp, 0, exampleScene())).width).toBeGreaterThan(600)
    }
  })
})
