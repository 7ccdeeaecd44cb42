import type { Walk } from '../grid/cells.js'
import { sampleBin } from '../math/cdf.js'
import { deflect, isotropicDirection } from './direction.js'
import type { EquilibriumMedium } from './equilibrium.js'

/**
 * Smallest optical depth (Rosseland mean) from a packet to the nearest wall of its cell for which the modified random walk takes
 * it to a sphere of that radius at once, and smallest radius of a step.
 */
export const LEAST_DEPTH = 6

/**
 * Modified random walk (Min et al. 2009, A&A 497, 155; Robitaille 2010, A&A 520, A70): while a packet is far from every wall of
 * its thick cell, it is moved to a point of the largest sphere that fits. On average that takes a path of
 * R^2 / (6 D) with the diffusion coefficient D = 1 / (3 chi), chi the Rosseland mean (first passage of diffusion from the centre
 * of a sphere), along which the dust absorbs with its Planck mean. Leaves the walk at the last point with a direction outwards
 * from the last sphere by the cosine law; returns the number of steps.
 */
export function diffuse(
  medium: EquilibriumMedium,
  walk: Walk,
  energy: number,
  absorbed: Float64Array,
  uniform: () => number,
  out: Float64Array
): number {
  const { cells, components, rosseland, planck } = medium
  const { cell } = walk
  const chi = rosseland[cell]
  let { x, y, z } = walk
  let steps = 0
  for (;;) {
    const radius = walk.clearance(x, y, z)
    if (radius * chi < LEAST_DEPTH) break
    isotropicDirection(out, uniform(), uniform())
    x += radius * out[0]
    y += radius * out[1]
    z += radius * out[2]
    const path = energy * 0.5 * chi * radius * radius
    for (let c = 0; c < components; c++) absorbed[c * cells + cell] += path * planck[c * cells + cell]
    steps++
  }
  if (steps > 0) {
    const [nx, ny, nz] = out
    deflect(out, nx, ny, nz, Math.sqrt(uniform()), uniform())
    walk.turn(x, y, z, out[0], out[1], out[2])
  }
  return steps
}

/** Bin of a packet emitted by the dust of a thick cell: by a component in proportion to its emission at the same temperature. */
export function emittedBin(medium: EquilibriumMedium, cell: number, uniform: () => number): number {
  const { cells, components, density, planck, emission, emissionRow } = medium
  let total = 0
  for (let c = 0; c < components; c++) total += density[c * cells + cell] * planck[c * cells + cell]
  let pick = uniform() * total
  let c = 0
  while (c < components - 1 && pick >= density[c * cells + cell] * planck[c * cells + cell]) {
    pick -= density[c * cells + cell] * planck[c * cells + cell]
    c++
  }
  const row = emissionRow[c * cells + cell]
  const low = Math.floor(row)
  return sampleBin(emission[c], low + (uniform() < row - low ? 1 : 0), uniform())
}
