import type { IntensityField } from './field.js'

/** Radii between `from` and `to` (cm) at which a patch is first divided: the projected walls of the cells. */
export function ringsBetween({ radii, innermost }: IntensityField, from: number, to: number): number[] {
  const cavity = from === 0 && innermost < to ? [0.5 * innermost] : []
  return [from, ...cavity, ...radii.slice(firstAbove(radii, from), firstAbove(radii, to)).filter((radius) => radius < to), to]
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
