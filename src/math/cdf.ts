import { type Allocate, allocatePrivate } from './allocate.js'

/**
 * Discrete distributions over the same bins, one a row, as flat arrays that can be shared between threads.
 * Sampling by inversion: a larger uniform never gives a smaller bin, so stratified and quasi-random uniforms keep their merit.
 */
export interface SamplingTable {
  rows: number
  bins: number
  /** A power of two, so that u x guideSize is exact and below guideSize for every u < 1. */
  guideSize: number
  /** rows x bins: probability of a bin up to and including this one. */
  cumulative: Float64Array
  /** rows x guideSize: the first bin that a uniform in [j / guideSize, (j + 1) / guideSize) can give (Chen & Asau 1974). */
  guide: Int32Array
}

/**
 * Table for rows x bins `weights` >= 0, of any scale; a bin without weight is never drawn.
 * A row without any weight is allowed but has nothing to draw: it gives its last bin.
 */
export function makeSamplingTable(
  weights: Float64Array,
  rows: number,
  bins: number,
  allocate: Allocate = allocatePrivate
): SamplingTable {
  const guideSize = 2 ** Math.ceil(Math.log2(bins))
  const cumulative = new Float64Array(allocate(8 * rows * bins))
  const guide = new Int32Array(allocate(4 * rows * guideSize))
  for (let row = 0; row < rows; row++) {
    const start = row * bins
    let total = 0
    let last = bins - 1
    for (let k = 0; k < bins; k++) {
      if (weights[start + k] > 0) last = k
      total += weights[start + k]
      cumulative[start + k] = total
    }
    for (let k = 0; k < last; k++) cumulative[start + k] = total > 0 ? Math.min(1, cumulative[start + k] / total) : 0
    cumulative.fill(1, start + last, start + bins)
    for (let j = 0, k = 0; j < guideSize; j++) {
      while (cumulative[start + k] <= j / guideSize) k++
      guide[row * guideSize + j] = k
    }
  }
  return { rows, bins, guideSize, cumulative, guide }
}

/** Bin drawn from a row by a uniform u in [0, 1). About one comparison on average. */
export function sampleBin(table: SamplingTable, row: number, u: number): number {
  const { bins, guideSize, cumulative, guide } = table
  const start = row * bins
  let k = guide[row * guideSize + ((u * guideSize) | 0)]
  while (cumulative[start + k] <= u) k++
  return k
}
