/**
 * An image of `width` x `height` values at another size, each new pixel the mean of what it covers: whole factors enlarge
 * by repetition and reduce by averaging. Covered areas are whole numbers (in units of 1/(old x new)), so no sliver of a
 * neighbour leaks in. Values that are not finite count as zero.
 */
export function resample(values: Float64Array, width: number, height: number, newWidth: number, newHeight: number): Float64Array {
  const across = new Float64Array(newWidth * height)
  for (let x = 0; x < newWidth; x++) {
    for (const [old, weight] of shares(x, width, newWidth)) {
      for (let y = 0; y < height; y++) {
        const value = values[y * width + old]
        if (Number.isFinite(value)) across[y * newWidth + x] += weight * value
      }
    }
  }
  const result = new Float64Array(newWidth * newHeight)
  for (let y = 0; y < newHeight; y++) {
    for (const [old, weight] of shares(y, height, newHeight)) {
      for (let x = 0; x < newWidth; x++) result[y * newWidth + x] += weight * across[old * newWidth + x]
    }
  }
  return result
}

/** The old pixels that new pixel `index` covers, with the part of it that each fills. */
function shares(index: number, oldCount: number, newCount: number): [number, number][] {
  const from = index * oldCount
  const to = from + oldCount
  const parts: [number, number][] = []
  for (let old = Math.floor(from / newCount); old * newCount < to; old++) {
    const covered = Math.min(to, (old + 1) * newCount) - Math.max(from, old * newCount)
    parts.push([old, covered / oldCount])
  }
  return parts
}
