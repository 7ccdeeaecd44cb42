import type { PixelGrid } from '../observe/blur.js'

/** An image in other pixels: what falls into each, and the part of each pixel that the old image covers. */
export interface Reprojected {
  planes: Float64Array[]
  coverage: Float64Array
}

/**
 * Intensities of one grid in the pixels of another. Every pixel is a quadrilateral, cut along the borders of the new pixels; its flux is
 * shared by area, so that the sum of flux is kept to rounding. `place` gives where an offset (towards east and north, rad) from the
 * centre of the old image lies in the new one: pixels from 0, the centre of the first at 0. The new pixels hold `pixelSr` each.
 */
export function reprojected(
  planes: Float64Array[],
  from: PixelGrid,
  to: { width: number; height: number; pixelSr: number },
  place: (east: number, north: number) => [number, number]
): Reprojected {
  const { width, height, pixel } = from
  const corners = new Float64Array(2 * (width + 1) * (height + 1))
  for (let j = 0, at = 0; j <= height; j++) {
    for (let i = 0; i <= width; i++, at += 2) {
      const [x, y] = place((width / 2 - i) * pixel[0], (j - height / 2) * pixel[1])
      corners[at] = x + 0.5
      corners[at + 1] = y + 0.5
    }
  }
  const pixelSr = pixel[0] * pixel[1]
  const sums = planes.map(() => new Float64Array(to.width * to.height))
  const coverage = new Float64Array(to.width * to.height)
  const shape = new Float64Array(16)
  const quad = new Float64Array(8)
  for (let j = 0; j < height; j++) {
    for (let i = 0; i < width; i++) {
      const lower = 2 * (j * (width + 1) + i)
      const upper = lower + 2 * (width + 1)
      quad.set(corners.subarray(lower, lower + 4))
      quad.set(corners.subarray(upper + 2, upper + 4), 4)
      quad.set(corners.subarray(upper, upper + 2), 6)
      const [x0, x1] = ends(quad, 0)
      const [y0, y1] = ends(quad, 1)
      if (!(x1 > 0 && y1 > 0 && x0 < to.width && y0 < to.height)) continue
      const area = areaOf(quad, 4)
      if (area === 0) continue
      const [left, right] = [Math.max(0, Math.floor(x0)), Math.min(to.width, Math.ceil(x1))]
      const [bottom, top] = [Math.max(0, Math.floor(y0)), Math.min(to.height, Math.ceil(y1))]
      const inside = x0 >= left && x1 <= right && y0 >= bottom && y1 <= top && right - left === 1 && top - bottom === 1
      for (let y = bottom; y < top; y++) {
        for (let x = left; x < right; x++) {
          const part = inside ? area : overlap(quad, x, y, shape)
          if (part === 0) continue
          const at = y * to.width + x
          coverage[at] += part
          const share = (part / area) * (pixelSr / to.pixelSr)
          for (let plane = 0; plane < planes.length; plane++) sums[plane][at] += share * planes[plane][j * width + i]
        }
      }
    }
  }
  return { planes: sums, coverage }
}

function ends(quad: Float64Array, axis: number): [number, number] {
  const [a, b, c, d] = [quad[axis], quad[2 + axis], quad[4 + axis], quad[6 + axis]]
  return [Math.min(a, b, c, d), Math.max(a, b, c, d)]
}

/** Area of a polygon of `count` corners (x, y, x, y, ...). */
function areaOf(corners: Float64Array, count: number): number {
  let sum = 0
  for (let i = 0; i < count; i++) {
    const k = i + 1 === count ? 0 : i + 1
    sum += corners[2 * i] * corners[2 * k + 1] - corners[2 * k] * corners[2 * i + 1]
  }
  return 0.5 * Math.abs(sum)
}

const cut = new Float64Array(16)

/** Area of a quadrilateral within the square that begins at (x, y): cut by its four borders (Sutherland & Hodgman 1974, CACM 17, 32). */
function overlap(quad: Float64Array, x: number, y: number, shape: Float64Array): number {
  shape.set(quad)
  let count = clip(shape, 4, cut, 0, 1, x)
  count = clip(cut, count, shape, 0, -1, -x - 1)
  count = clip(shape, count, cut, 1, 1, y)
  count = clip(cut, count, shape, 1, -1, -y - 1)
  return count < 3 ? 0 : areaOf(shape, count)
}

/** The part of a convex polygon where `sign` times a coordinate is at least `border`; each cut adds one corner at most. */
function clip(from: Float64Array, count: number, to: Float64Array, axis: number, sign: number, border: number): number {
  let made = 0
  for (let i = 0; i < count; i++) {
    const k = i + 1 === count ? 0 : i + 1
    const here = sign * from[2 * i + axis] - border
    const next = sign * from[2 * k + axis] - border
    if (here >= 0) {
      to[2 * made] = from[2 * i]
      to[2 * made + 1] = from[2 * i + 1]
      made++
    }
    if (here >= 0 !== next >= 0) {
      const share = here / (here - next)
      to[2 * made] = from[2 * i] + share * (from[2 * k] - from[2 * i])
      to[2 * made + 1] = from[2 * i + 1] + share * (from[2 * k + 1] - from[2 * i + 1])
      made++
    }
  }
  return made
}
