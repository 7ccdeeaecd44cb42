import { mean } from '../math/stats.js'
import { GROUPS } from '../solve/groups.js'
import type { CameraImages } from './types.js'

/**
 * The noise of an image as modes, one a group of packets: the group's deviation over sqrt(GROUPS (GROUPS - 1)), so that the squares of
 * all modes add up to that of 1 sigma. What is made linearly of an image has the 1 sigma that the same made of its modes adds up to.
 * A mode is kept as a whole number of steps of 1 sigma / MODE_STEPS: good to 1 % of itself.
 */
export const MODE_STEPS = 127

/** Writes the modes of a value with 1 sigma `sigma` and these estimates by group: at `at`, mode after mode `stride` apart. */
export function putModes(modes: Int8Array, at: number, stride: number, groups: Float64Array, sigma: number): void {
  const centre = mean(groups)
  const steps = sigma > 0 ? MODE_STEPS / (sigma * Math.sqrt(GROUPS * (GROUPS - 1))) : 0
  for (let g = 0; g < GROUPS; g++) modes[g * stride + at] = Math.round(steps * (groups[g] - centre))
}

/** 1 sigma of the sum over all pixels of a wavelength, the k-th, each times its weight. */
export function sigmaOfSum(
  { width, height, sigma, modes }: Pick<CameraImages, 'width' | 'height' | 'sigma' | 'modes'>,
  k: number,
  weights: Float64Array
): number {
  const pixels = width * height
  let variance = 0
  for (let g = 0; g < GROUPS; g++) {
    let sum = 0
    for (let i = 0; i < pixels; i++) sum += weights[i] * sigma[k * pixels + i] * modes[(k * GROUPS + g) * pixels + i]
    variance += (sum / MODE_STEPS) ** 2
  }
  return Math.sqrt(variance)
}
