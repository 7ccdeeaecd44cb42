import type { IntensityField } from './field.js'

/** Where the inner rim shows within its own radius: at a slant, one sees it from within. Shares of that radius. */
const CAVITY = [1 / 2, 3 / 4, 7 / 8, 15 / 16, 31 / 32]

/** Radii between `from` and `to` (cm) at which a patch is first divided: projected walls of the cells. */
export function ringsBetween({ radii, innermost }: IntensityField, from: number, to: number): number[] {
  const rings = [from]
  for (const share of CAVITY) if (innermost * share > from && innermost < to) rings.push(innermost * share)
  for (const wall of radii.subarray(firstAbove(radii, from), firstAbove(radii, to))) if (wall < to) rings.push(wall)
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
