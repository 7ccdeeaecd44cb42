import type { Walk } from '../grid/cells.js'
import type { Polarisation } from './polarisation.js'
import { scatterHere } from './scatter-launch.js'
import { type ScatterMedium, scatteringOf } from './scatter-medium.js'

/** Below this share of its first weight a packet plays roulette. */
export const ROULETTE_BELOW = 1e-3
export const SURVIVAL = 0.1
/**
 * Where flights light cells all along it may play sooner: on a disk of albedo 0.6 this is worth 1.6 to 1.9 times the figure of merit
 * of the above. For peel-off and exit bins, which count single events, it is not.
 */
export const EARLY_BELOW = 0.3
export const EARLY_SURVIVAL = 0.4

/**
 * What happens at the end of a flight inside a cell, `s` along the path: the weight loses what is absorbed, and the packet
 * goes on in a new direction. Below the `least` weight it plays roulette with that chance of `survival`. Returns the new weight, 0 when
 * the roulette ends the packet.
 */
export function collide(
  walk: Walk,
  medium: ScatterMedium,
  s: number,
  weight: number,
  least: number,
  survival: number,
  uniform: () => number,
  out: Float64Array,
  polarisation?: Polarisation
): number {
  let next = (weight * scatteringOf(medium, walk.cell)) / medium.extinction[walk.cell]
  if (next < least) next = uniform() < survival ? next / survival : 0
  if (next > 0) scatterHere(walk, medium, s, uniform, out, polarisation)
  return next
}
