import { spreadPoint } from '../../math/spread-points.js'
import type { DustLayer } from '../dust-layer.js'
import { LEVELS } from './octree.js'
import type { OctreeBuilder } from './octree-builder.js'

/** Points for each component of the dust. */
const POINTS = 50_000

/**
 * Points that lie as the extinction of the dust does, sorted by the node they are in: they find dust that lies between the
 * samples of a large cube.
 */
export class MassPoints {
  private readonly x: Float64Array
  private readonly y: Float64Array
  private readonly z: Float64Array
  /** Extinction cross section that a point stands for, cm2. */
  private readonly weight: Float64Array
  private readonly order: Int32Array
  /** Range of `order` that lies in a node. */
  private starts = new Int32Array(1024)
  private ends = new Int32Array(1024)
  /** Of all dust, cm2. */
  readonly total: number

  constructor(layers: DustLayer[]) {
    const points: [number, number, number, number][] = []
    const p = new Float64Array(3)
    for (const { shape, scale, extinction } of layers) {
      const from = points.length
      let counted = 0
      for (let n = 0; n < POINTS; n++) {
        spreadPoint(n, p)
        shape.place(p[0], p[1], p[2], p)
        const share = shape.relativeDensity(p[0], p[1], p[2]) > 0 ? (shape.counts?.(p[0], p[1], p[2]) ?? 1) : 0
        if (share > 0) points.push([p[0], p[1], p[2], share])
        counted += share
      }
      for (let i = from; i < points.length; i++) points[i][3] *= (scale * extinction * shape.totalMass) / counted
    }
    this.x = Float64Array.from(points, ([x]) => x)
    this.y = Float64Array.from(points, ([, y]) => y)
    this.z = Float64Array.from(points, ([, , z]) => z)
    this.weight = Float64Array.from(points, ([, , , weight]) => weight)
    this.total = this.weight.reduce((sum, value) => sum + value, 0)
    this.order = Int32Array.from(points, (_, i) => i)
    this.ends[0] = points.length
  }

  /** Number of points in a node. */
  count(node: number): number {
    return this.ends[node] - this.starts[node]
  }

  /** Extinction cross section in a node, cm2. */
  crossSection(node: number): number {
    let sum = 0
    for (let k = this.starts[node]; k < this.ends[node]; k++) sum += this.weight[this.order[k]]
    return sum
  }

  /** Share of the light of a star at a place that dust takes out, at most: as if no dust stood before other dust. */
  caughtFrom([sx, sy, sz]: readonly [number, number, number]): number {
    const { x, y, z, weight } = this
    let sum = 0
    for (let i = 0; i < weight.length && sum < 1; i++)
      sum += weight[i] / (4 * Math.PI * ((x[i] - sx) ** 2 + (y[i] - sy) ** 2 + (z[i] - sz) ** 2))
    return Math.min(1, sum)
  }

  /** Shares the points of a node among its new children, the first of which is given. */
  divide(node: number, first: number, { origin, side, corner, level }: OctreeBuilder): void {
    if (first + 8 > this.starts.length) this.grow(first + 8)
    const { x, y, z, order, starts, ends } = this
    const unit = side / 2 ** LEVELS
    const half = 2 ** (LEVELS - level[first])
    const [mx, my, mz] = [0, 1, 2].map((a) => origin[a] + (corner[3 * node + a] + half) * unit)
    const inside = order.slice(starts[node], ends[node])
    const child = (i: number) => (x[i] >= mx ? 1 : 0) | (y[i] >= my ? 2 : 0) | (z[i] >= mz ? 4 : 0)
    let next = starts[node]
    for (let k = 0; k < 8; k++) {
      starts[first + k] = next
      for (const i of inside) if (child(i) === k) order[next++] = i
      ends[first + k] = next
    }
  }

  private grow(nodes: number): void {
    const [starts, ends] = [new Int32Array(2 * nodes), new Int32Array(2 * nodes)]
    starts.set(this.starts)
    ends.set(this.ends)
    this.starts = starts
    this.ends = ends
  }
}
