/**
 * Density within a cube over its mean, the same for all dust there. p is the place in sides from the middle. Most cells have 1 + g p: the
 * profile holds g, eight bits each for x, y and z, in units of 1 / SLOPE. A cell that the edge of the dust cuts has a + g p where
 * n p > d and none elsewhere: its profile is odd and holds the number of its CUT numbers n, d, a, g.
 */
export const SLOPE = 63
export const CUT = 8
/** Most that the numbers of g may add up to in size: no corner is below nothing, after rounding too. */
export const STEEPEST = 1.97

export function slopeProfile(gx: number, gy: number, gz: number): number {
  const byte = (g: number) => Math.round(SLOPE * g) & 255
  return (byte(gx) << 24) | (byte(gy) << 16) | (byte(gz) << 8)
}

export function cutProfile(index: number): number {
  return (index << 8) | 1
}

/** Density over the mean at a place of a cell. */
export function densityIn(profile: number, cuts: Float32Array, x: number, y: number, z: number): number {
  if ((profile & 1) === 0) return 1 + ((profile >> 24) * x + ((profile << 8) >> 24) * y + ((profile << 16) >> 24) * z) / SLOPE
  const at = CUT * (profile >>> 8)
  if (cuts[at] * x + cuts[at + 1] * y + cuts[at + 2] * z < cuts[at + 3]) return 0
  return Math.max(0, cuts[at + 4] + cuts[at + 5] * x + cuts[at + 6] * y + cuts[at + 7] * z)
}

/** No place of a cell has more than this. */
export function mostIn(profile: number, cuts: Float32Array): number {
  if ((profile & 1) === 0)
    return 1 + (0.5 * (Math.abs(profile >> 24) + Math.abs((profile << 8) >> 24) + Math.abs((profile << 16) >> 24))) / SLOPE
  const at = CUT * (profile >>> 8)
  return cuts[at + 4] + 0.5 * (Math.abs(cuts[at + 5]) + Math.abs(cuts[at + 6]) + Math.abs(cuts[at + 7]))
}
