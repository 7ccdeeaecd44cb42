import type { IntensityField } from './field.js'
import type { Sector } from './patch.js'

/**
 * Where the inner rim shows within its own radius: at a slant one sees it from within, and from the pole a thin edge of it, which high
 * cells make. Shares of that radius.
 */
const CAVITY = Array.from({ length: 10 }, (_, k) => 1 - 2 ** -(k + 1))

/** Inverse of the plastic number: its multiples modulo 1 are spread evenly. */
const PLASTIC = 0.754_877_666_246_693

/** Radii between `from` and `to` (cm) at which a patch is first divided: projected walls of the cells. */
export function ringsBetween({ radii, innermost }: IntensityField, from: number, to: number): number[] {
  const rings = [from]
  for (const share of CAVITY) if (innermost * share > from && innermost < to) rings.push(innermost * share)
  for (const wall of radii.subarray(firstAbove(radii, from), firstAbove(radii, to))) if (wall < to) rings.push(wall)
  rings.push(to)
  return rings
}

/**
 * A radius between two others, at another share of the area between them for each `index`: a disk seen from the pole looks alike in all
 * directions, and rays at the same places between two walls would all be wrong by the same amount.
 */
function between(from: number, to: number, index: number): number {
  const share = 0.3 + 0.4 * ((index * PLASTIC) % 1)
  return Math.sqrt(from * from + share * (to * to - from * from))
}

/** Every ring in two. */
export function halvedRings(rings: number[]): number[] {
  return rings.flatMap((from, i) => (i + 1 < rings.length ? [from, between(from, rings[i + 1], i)] : [from]))
}

/** The inner and the outer part of a sector. */
export function cutInTwo({ from, to, start, end }: Sector, index: number): Sector[] {
  const half = between(from, to, index)
  return [
    { from, to: half, start, end },
    { from: half, to, start, end }
  ]
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
