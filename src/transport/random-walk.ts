import type { Walk } from '../grid/cells.js'
import { type SamplingTable, sampleBin } from '../math/cdf.js'
import { isotropicDirection } from './direction.js'
import type { EquilibriumMedium } from './equilibrium-medium.js'

/** Smallest optical depth of a sphere, by the mean free path of the light that walks. */
export const LEAST_DEPTH = 4
/** Radius of a sphere over the distance to the nearest wall: beyond the walls, where paths would be missed, things may differ. */
const INSIDE = 0.8
export const LEVEL_SIZE = 4

/**
 * Modified random walk (Min et al. 2009, A&A 497, 155; Robitaille 2010, A&A 520, A70): while a packet that was just absorbed is far
 * from every wall of its thick cell, it is moved to a point of a sphere about it. From emission to emission it goes the
 * square distance 2 / (kappa chi) on average, kappa and chi the absorption and transport extinction of its wavelength; over the
 * spectrum of the emission that is 2 / (kappa_P chi), with the Planck mean of kappa and the mean of 1/chi over the Planck function (not
 * its derivative: the temperatures with which packets are emitted are given). So a sphere of radius R costs R^2 chi kappa_P / 2
 * absorptions, or a path of R^2 chi / 2.
 * That holds for wavelengths to which the sphere is thick. Light of others, which few packets carry but far, flies as everywhere else: it
 * is emitted as often on the way as it should be, at the middle of a sphere.
 * Returns the bin of the last emission, `bin` where the packet is not moved; leaves its direction in the walk.
 */
export function diffuse(
  medium: EquilibriumMedium,
  walk: Walk,
  bin: number,
  energy: number,
  absorbed: Float64Array,
  uniform: () => number,
  out: Float64Array
): number {
  const { cells, components, planck } = medium
  const { first, levels } = medium.walk
  const { cell } = walk
  const end = LEVEL_SIZE * first[cell + 1]
  let { x, y, z } = walk
  let cut = -1
  for (;;) {
    const radius = INSIDE * walk.clearance(x, y, z)
    let at = LEVEL_SIZE * first[cell]
    while (at < end && levels[at] > radius) at += LEVEL_SIZE
    if (at === end || levels[at] === 0) break
    const area = radius * radius
    const flights = levels[at + 2] * area
    if (flights > 0 && uniform() * (1 + flights) < flights) {
      cut = levels[at + 3]
      break
    }
    cut = 0
    isotropicDirection(out, uniform(), uniform())
    x += radius * out[0]
    y += radius * out[1]
    z += radius * out[2]
    const path = energy * levels[at + 1] * area
    for (let c = 0; c < components; c++) absorbed[c * cells + cell] += path * planck[c * cells + cell]
  }
  if (cut < 0) return bin
  isotropicDirection(out, uniform(), uniform())
  walk.turn(x, y, z, out[0], out[1], out[2])
  return emittedBin(medium, cell, cut, uniform)
}

/** Bin, `cut` or later, of a packet emitted by the dust of a thick cell: by a component in proportion to its emission there. */
function emittedBin(medium: EquilibriumMedium, cell: number, cut: number, uniform: () => number): number {
  const { cells, components, density, planck, emission, emissionRow } = medium
  const power = (c: number) => {
    const at = c * cells + cell
    return density[at] * planck[at] * shareBeyond(emission[c], emissionRow[at], cut)
  }
  let total = 0
  for (let c = 0; c < components; c++) total += power(c)
  let pick = uniform() * total
  let c = 0
  while (c < components - 1 && pick >= power(c)) pick -= power(c++)
  const row = emissionRow[c * cells + cell]
  const low = Math.floor(row)
  const below = shareBeyond(emission[c], low, cut)
  const above = shareBeyond(emission[c], low + 1, cut)
  const upper = uniform() * ((1 - (row - low)) * below + (row - low) * above) < (row - low) * above
  const share = upper ? above : below
  return sampleBin(emission[c], upper ? low + 1 : low, Math.min(1 - share * uniform(), 1 - 1e-16))
}

/** Share of the emission in the bins from `cut` on; `row` may have a fraction. */
export function shareBeyond({ cumulative, bins, rows }: SamplingTable, row: number, cut: number): number {
  if (cut === 0) return 1
  const low = Math.min(Math.floor(row), rows - 2)
  const at = low * bins + cut - 1
  return 1 - cumulative[at] + (row - low) * (cumulative[at] - cumulative[at + bins])
}
