import type { DustLayer, PolarRange } from './dust-layer.js'

/** Ratio of successive distances from an edge. */
const RATIO = 1.25
/** Nearest node to an edge, as a fraction of the layer and of the radius: far above rounding, thin enough for tau = 1e8. */
const NEAREST_OF_LAYER = 1e-9
const NEAREST_OF_RADIUS = 1e-10

/**
 * Radii (cm) from a to b at which optical depths are tabulated: in geometric progression away from either end, and about
 * the radii where the vertical rim of a disk crosses the walls of polar cells.
 */
export function radialNodes(layers: DustLayer[], ranges: PolarRange[], a: number, b: number): Float64Array {
  const nodes = [a, b]
  const length = b - a
  for (let d = Math.max(NEAREST_OF_LAYER * length, NEAREST_OF_RADIUS * a); d < 0.5 * length; d *= RATIO) nodes.push(a + d, b - d)
  for (const { shape } of layers) {
    if (shape.symmetry !== 'axial') continue
    for (const R of shape.cylinderEdges) {
      for (const { from, to } of ranges) {
        for (let part = 1; part <= 4; part++) {
          const mu = from + (part / 4) * (to - from)
          nodes.push(R / Math.sqrt((1 - mu) * (1 + mu)))
        }
      }
    }
  }
  return distinct(
    nodes.filter((r) => r >= a && r <= b),
    NEAREST_OF_RADIUS
  )
}

/** Increasing values without those that follow another by less than a relative `gap`; the last value is always kept. */
export function distinct(values: number[], gap: number): Float64Array {
  const sorted = [...values].sort((x, y) => x - y)
  const kept: number[] = []
  for (const value of sorted) if (kept.length === 0 || value > kept[kept.length - 1] * (1 + gap)) kept.push(value)
  kept[kept.length - 1] = sorted[sorted.length - 1]
  return Float64Array.from(kept)
}
