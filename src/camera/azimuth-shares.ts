import { cosineAt, TABLE_STEPS } from '../dust/scattering-tables.js'
import { AZIMUTH_BINS, azimuthLookup } from '../transport/scatter-medium.js'

/**
 * What shares three azimuth bins have in the light at an azimuth: the bin it lies in and its neighbours, but no bins beyond the ends, whose
 * mirror images stand for them.
 */
export interface AzimuthShares {
  /** By step of `tablePosition`, the bin. */
  bins: Uint8Array
  /** By step, three shares in the parabola with the means of the three bins: of what is even about the observer's plane, of what is odd. */
  even: Float64Array
  odd: Float64Array
  /** By step, three shares in straight lines between the middles of bins, of what is even. */
  straight: Float64Array
  /** By bin, three shares at each of its edges in the parabola of what is even. */
  edges: Float64Array
}

/** The first of the three bins of a bin. */
export const startOf = (bin: number) => Math.max(0, Math.min(AZIMUTH_BINS - 3, bin - 1))

/** `narrow`: see azimuthLookup. */
export function azimuthShares(narrow: boolean): AzimuthShares {
  const azimuths = Array.from(azimuthLookup(narrow).edges, Math.acos)
  // With a mirrored bin beyond either end.
  const walls = [-azimuths[1], ...azimuths, 2 * Math.PI - azimuths[AZIMUTH_BINS - 1]]
  const table = () => new Float64Array(3 * TABLE_STEPS)
  const bins = new Uint8Array(TABLE_STEPS)
  const [even, odd, straight] = [table(), table(), table()]
  for (let step = 0; step < TABLE_STEPS; step++) {
    const azimuth = Math.acos(cosineAt(step + 0.5))
    while (bins[step] < AZIMUTH_BINS - 1 && azimuths[bins[step] + 1] <= azimuth) bins[step]++
    const around = walls.slice(bins[step], bins[step] + 4)
    const curve = onCurve(around, azimuth)
    even.set(folded(bins[step], curve, 1), 3 * step)
    odd.set(folded(bins[step], curve, -1), 3 * step)
    straight.set(folded(bins[step], onLine(around, azimuth), 1), 3 * step)
  }
  const edges = azimuths.slice(0, AZIMUTH_BINS).flatMap((low, bin) => {
    const around = walls.slice(bin, bin + 4)
    return [low, azimuths[bin + 1]].flatMap((azimuth) => folded(bin, onCurve(around, azimuth), 1))
  })
  return { bins, even, odd, straight, edges: Float64Array.from(edges) }
}

/** Shares of the bins before, at and after `bin` as those of its three bins; what lies beyond an end has that parity. */
function folded(bin: number, shares: number[], parity: 1 | -1): number[] {
  const out = [0, 0, 0]
  shares.forEach((share, j) => {
    const neighbour = bin - 1 + j
    const at = Math.max(0, Math.min(AZIMUTH_BINS - 1, neighbour))
    out[at - startOf(bin)] += at === neighbour ? share : parity * share
  })
  return out
}

/**
 * Shares of three bins between four walls in the parabola with their means. The integral of the light up to each wall is a cubic through
 * four points; the parabola is its slope (Lagrange).
 */
function onCurve(walls: number[], azimuth: number): number[] {
  return [0, 1, 2].map((j) => {
    let share = 0
    for (let k = j + 1; k < 4; k++) share += slopeOf(walls, k, azimuth)
    return share * (walls[j + 1] - walls[j])
  })
}

/** Slope at `at` of Lagrange's polynomial that is 1 at node `k` and 0 at the others. */
function slopeOf(nodes: number[], k: number, at: number): number {
  let slope = 0
  for (let m = 0; m < nodes.length; m++) {
    if (m === k) continue
    let term = 1 / (nodes[k] - nodes[m])
    for (let n = 0; n < nodes.length; n++) if (n !== k && n !== m) term *= (at - nodes[n]) / (nodes[k] - nodes[n])
    slope += term
  }
  return slope
}

/** Shares of three bins between four walls in the straight line between the two middles about an azimuth. */
function onLine(walls: number[], azimuth: number): number[] {
  const [a, b, c] = [0, 1, 2].map((j) => 0.5 * (walls[j] + walls[j + 1]))
  if (azimuth < b) return [(b - azimuth) / (b - a), (azimuth - a) / (b - a), 0]
  return [0, (c - azimuth) / (c - b), (azimuth - b) / (c - b)]
}
