import type { IntensityField } from './field.js'

/** A ring runs over several cells, as long as it is at most so many times as wide as the narrowest of them. */
const MERGED = 4
/** Where the inner rim shows within its own radius: at a slant, one sees it from within. Shares of that radius. */
const CAVITY = [1 / 2, 3 / 4, 7 / 8, 15 / 16, 31 / 32]

/** Radii between `from` and `to` (cm) at which a patch is first divided: projected walls of the cells. */
export function ringsBetween({ radii, innermost }: IntensityField, from: number, to: number): number[] {
  const rings = [from]
  for (const share of CAVITY) if (innermost * share > from && innermost < to) rings.push(innermost * share)
  const walls = radii.slice(firstAbove(radii, from), firstAbove(radii, to)).filter((radius) => radius < to)
  let last = rings[rings.length - 1]
  let narrowest = Number.POSITIVE_INFINITY
  walls.forEach((wall, i) => {
    const next = i + 1 < walls.length ? walls[i + 1] : to
    narrowest = Math.min(narrowest, wall - (i > 0 ? walls[i - 1] : last), next - wall)
    if (next - last > MERGED * narrowest) {
      rings.push(wall)
      last = wall
      narrowest = Number.POSITIVE_INFINITY
    }
  })
  rings.push(to)
  return rings
}

/** Number of cell walls between two radii. */
export function wallsBetween({ radii }: IntensityField, from: number, to: number): number {
  return firstAbove(radii, to) - firstAbove(radii, from)
}

function firstAbove(values: Float64Array, limit: number): number {
  let low = 0
  let high = values.length
  while (low < high) {
    const middle = (low + high) >> 1
    if (values[middle] > limit) high = middle
    else low = middle + 1
  }
  return low
}
