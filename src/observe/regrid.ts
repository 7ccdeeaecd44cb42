import type { PixelGrid } from './blur.js'

/** As many whole pixels of those sides (rad) as the image has room for, about the same centre. Throws a RangeError for none. */
export function detectorGrid(image: PixelGrid, pixel: [number, number] | undefined): PixelGrid {
  if (!pixel) return image
  const room = (count: number, from: number, to: number) => Math.floor((count * from) / to + 1e-6)
  const width = room(image.width, image.pixel[0], pixel[0])
  const height = room(image.height, image.pixel[1], pixel[1])
  if (width < 1 || height < 1) throw new RangeError('the pixel is larger than the field of the camera')
  return { width, height, pixel }
}

/** Values in other pixels about the same centre: each the mean of what it covers, so that flux is kept. */
export function regridded(values: Float64Array, from: PixelGrid, to: PixelGrid): Float64Array {
  if (to === from) return values
  const columns = overlaps(from.width, from.pixel[0], to.width, to.pixel[0])
  const rows = overlaps(from.height, from.pixel[1], to.height, to.pixel[1])
  const across = new Float64Array(to.width * from.height)
  for (let y = 0; y < from.height; y++) {
    columns.forEach((parts, x) => {
      for (const [old, share] of parts) across[y * to.width + x] += share * values[y * from.width + old]
    })
  }
  const result = new Float64Array(to.width * to.height)
  rows.forEach((parts, y) => {
    for (const [old, share] of parts)
      for (let x = 0; x < to.width; x++) result[y * to.width + x] += share * across[old * to.width + x]
  })
  return result
}

/** For each new pixel of a line: the old ones under it, and the part of it that each fills. */
function overlaps(oldCount: number, oldSize: number, newCount: number, newSize: number): [number, number][][] {
  const ratio = newSize / oldSize
  const start = 0.5 * (oldCount - newCount * ratio)
  return Array.from({ length: newCount }, (_, i) => {
    const from = Math.max(0, start + i * ratio)
    const to = Math.min(oldCount, start + (i + 1) * ratio)
    const parts: [number, number][] = []
    for (let old = Math.floor(from); old < Math.min(oldCount, Math.ceil(to)); old++)
      parts.push([old, (Math.min(to, old + 1) - Math.max(from, old)) / ratio])
    return parts
  })
}
