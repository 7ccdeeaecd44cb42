import type { MeridionalStructure } from './structure.js'

/** The part of the meridional plane that a map shows: R from `inner` to `outer` (cm, logarithmic), z/R from -`height` to `height`. */
export interface MeridianView {
  inner: number
  outer: number
  height: number
}

const leastHeight = 0.05
const mostHeight = 2

/** The view that holds the cells marked by `shown`, up to |z/R| = 2. */
export function meridianView({ rWalls, cosThetaWalls }: MeridionalStructure, shown: (cell: number) => boolean): MeridianView {
  const polar = cosThetaWalls.length - 1
  let [first, last, height] = [rWalls.length - 2, 0, leastHeight]
  for (let ir = 0; ir < rWalls.length - 1; ir++) {
    for (let it = 0; it < polar; it++) {
      if (!shown(ir * polar + it)) continue
      first = Math.min(first, ir)
      last = Math.max(last, ir)
      const cosine = Math.max(Math.abs(cosThetaWalls[it]), Math.abs(cosThetaWalls[it + 1]))
      height = Math.max(height, cosine / Math.sqrt(Math.max(1 - cosine * cosine, 1e-9)))
    }
  }
  height = Math.min(height, mostHeight)
  const innermost = rWalls[first] > 0 ? rWalls[first] : rWalls[first + 1] / 10
  return { inner: innermost / Math.hypot(1, height), outer: rWalls[Math.max(first, last) + 1], height }
}

/**
 * For each pixel of a map of `width` x `height` pixels, row by row from the top, the cell that holds its middle, or -1
 * outside all cells.
 */
export function meridianCells(
  { rWalls, cosThetaWalls }: MeridionalStructure,
  view: MeridianView,
  width: number,
  height: number
): Int32Array {
  const polar = cosThetaWalls.length - 1
  const cells = new Int32Array(width * height)
  for (let py = 0; py < height; py++) {
    const slope = view.height * (1 - (2 * (py + 0.5)) / height)
    const stretch = Math.hypot(1, slope)
    const it = interval(cosThetaWalls, slope / stretch)
    for (let px = 0; px < width; px++) {
      const cylindrical = view.inner * (view.outer / view.inner) ** ((px + 0.5) / width)
      const ir = interval(rWalls, cylindrical * stretch)
      cells[py * width + px] = ir < 0 || it < 0 ? -1 : ir * polar + it
    }
  }
  return cells
}

/** The interval between walls, in rising or falling order, that holds a value; -1 when none does. */
function interval(walls: Float64Array, value: number): number {
  const rising = walls[walls.length - 1] > walls[0] ? 1 : -1
  let [low, high] = [0, walls.length - 1]
  if ((value - walls[low]) * rising < 0 || (value - walls[high]) * rising >= 0) return -1
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if ((value - walls[middle]) * rising >= 0) low = middle
    else high = middle
  }
  return low
}
