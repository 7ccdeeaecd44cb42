import type { SphericalWalk } from '../grid/walk.js'
import { scatterHere, scatteringOf } from './scatter-launch.js'
import type { ScatterMedium } from './scatter-medium.js'

/** Below this share of its first weight a packet plays roulette. */
const ROULETTE_BELOW = 1e-3
const SURVIVAL = 0.1

/** Path to the surface of the star in the way, cm; infinite when there is none. */
export function pathToStar(walk: SphericalWalk, starRadius2: number): number {
  if (!(walk.s < 0 && walk.b2 < starRadius2)) return Number.POSITIVE_INFINITY
  return Math.max(0, -Math.sqrt(starRadius2 - walk.b2) - walk.s)
}

/** Weight after a collision in a cell: it loses what is absorbed; 0 when the roulette ends the packet. */
export function keepAfterCollision(
  medium: ScatterMedium,
  cell: number,
  weight: number,
  first: number,
  uniform: () => number
): number {
  const next = (weight * scatteringOf(medium, cell)) / medium.extinction[cell]
  if (next >= ROULETTE_BELOW * first) return next
  return uniform() < SURVIVAL ? next / SURVIVAL : 0
}

/** As `keepAfterCollision`, and the packet goes on in a new direction from `s` along its path. */
export function collide(
  walk: SphericalWalk,
  medium: ScatterMedium,
  s: number,
  weight: number,
  first: number,
  uniform: () => number,
  out: Float64Array
): number {
  const next = keepAfterCollision(medium, walk.cell, weight, first, uniform)
  if (next > 0) scatterHere(walk, medium, s, uniform, out)
  return next
}
