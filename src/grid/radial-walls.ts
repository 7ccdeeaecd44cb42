import { edgeRadii } from '../shapes/shape.js'
import { type DustLayer, extinctionAt, type PolarRange } from './dust-layer.js'
import { equalSteps, shareOut } from './equal-steps.js'
import { distinct, radialNodes } from './radial-nodes.js'

/** Optical depth at which the refinement of an edge begins. */
const TAU_EDGE = 0.12
/** Weight of the optical depth counted from outside against that from inside. */
const OUTSIDE = 0.5
/** Weight of the polar cell next to the midplane; the others that are not transparent share the rest. */
const MIDPLANE = 0.5
/** Optical depth of a dusty core, and its radius as a fraction of the smallest dust edge. */
const TAU_CORE = 0.1
const CORE_FRACTIONS = { least: 1e-6, most: 1e-2 }
const CELLS = { spherical: { step: 0.12, fewest: 120, most: 200 }, axial: { step: 0.2, fewest: 90, most: 130 } }

/**
 * Radial walls (cm): 0, the core, then cells in equal steps of
 *   ln r + sum over polar cells of w (ln(1 + tau/TAU_EDGE) + OUTSIDE ln(1 + tau'/TAU_EDGE)),
 * tau and tau' being the optical depths from inside and from outside: thin where an edge is lit, in geometric progression
 * behind it. Edges of the dust are walls; where there is no dust a cell reaches from edge to edge. `count`: number of
 * cells with the core (0: chosen), raised when there are more edges.
 */
export function radialWalls(layers: DustLayer[], ranges: PolarRange[], count: number): Float64Array {
  const core = coreRadius(layers)
  const edges = distinct([core, ...layers.flatMap(({ shape }) => edgeRadii(shape)).filter((r) => r > core)], 1e-10)
  const parts = Array.from({ length: edges.length - 1 }, (_, i) => radialNodes(layers, ranges, edges[i], edges[i + 1]))
  const sums = stepSums(layers, ranges, parts)
  const totals = sums.map((sum) => sum[sum.length - 1])
  const { step, fewest, most } = ranges.length > 1 ? CELLS.axial : CELLS.spherical
  const wanted = totals.reduce((sum, total) => sum + total, 0) / step
  const chosen = count > 0 ? count - 1 : Math.round(Math.min(most, Math.max(fewest, wanted)))
  const shares = shareOut(totals, chosen)
  const walls = [0]
  parts.forEach((nodes, i) => {
    walls.push(...equalSteps(nodes, sums[i], shares[i]).subarray(0, shares[i]))
  })
  return Float64Array.from([...walls, edges[edges.length - 1]])
}

/** Inner edge of the dust; where dust reaches the origin, the radius of a core that is transparent if it can be. */
function coreRadius(layers: DustLayer[]): number {
  const inner = Math.min(...layers.map(({ shape }) => shape.innerRadius))
  if (inner > 0) return inner
  const smallest = Math.min(...layers.flatMap(({ shape }) => edgeRadii(shape)))
  let r = CORE_FRACTIONS.most * smallest
  while (r > CORE_FRACTIONS.least * smallest && r * extinctionAt(layers, r, { from: 0, to: 1 }) > TAU_CORE) r *= 0.5
  return r
}

/** For each part, the running sum of the steps at its nodes. */
function stepSums(layers: DustLayer[], ranges: PolarRange[], parts: Float64Array[]): Float64Array[] {
  const depths = ranges.map((range) => opticalDepths(layers, range, parts))
  const totals = depths.map((depth) => depth[depth.length - 1])
  const opaque = totals.filter((total, j) => j > 0 && total > TAU_EDGE).length
  const sums = parts.map((nodes) => new Float64Array(nodes.length))
  let first = 0
  parts.forEach((nodes, part) => {
    const last = first + nodes.length - 1
    const dusty = layers.some(({ shape }) => shape.innerRadius < nodes[nodes.length - 1] && shape.outerRadius > nodes[0])
    for (let i = 1; dusty && i < nodes.length; i++) {
      let step = Math.log(nodes[i] / nodes[i - 1])
      depths.forEach((depth, j) => {
        if (totals[j] <= TAU_EDGE && j > 0) return
        const weight = j > 0 ? (1 - MIDPLANE) / opaque : opaque > 0 ? MIDPLANE : 1
        const a = depth[first + i - 1]
        const b = depth[first + i]
        step += weight * Math.log1p((b - a) / (TAU_EDGE + a))
        step += weight * OUTSIDE * Math.log1p((b - a) / (TAU_EDGE + totals[j] - b))
      })
      sums[part][i] = sums[part][i - 1] + step
    }
    first = last + 1
  })
  return sums
}

/** Optical depth from the core to every node of every part in turn, for one range of polar angle. */
function opticalDepths(layers: DustLayer[], range: PolarRange, parts: Float64Array[]): Float64Array {
  const depths = new Float64Array(parts.reduce((sum, nodes) => sum + nodes.length, 0))
  let k = 0
  let tau = 0
  for (const nodes of parts) {
    depths[k++] = tau
    for (let i = 1; i < nodes.length; i++) {
      const middle = 0.5 * (nodes[i - 1] + nodes[i])
      const half = (nodes[i] - nodes[i - 1]) / (2 * Math.sqrt(3))
      const length = nodes[i] - nodes[i - 1]
      tau += 0.5 * length * (extinctionAt(layers, middle - half, range) + extinctionAt(layers, middle + half, range))
      depths[k++] = tau
    }
  }
  return depths
}
