import { type Allocate, allocatePrivate } from '../../math/allocate.js'
import { LargestFirst } from '../../math/largest-first.js'
import type { DustLayer } from '../dust-layer.js'
import { MassPoints } from './mass-points.js'
import { LEVELS, type Octree } from './octree.js'
import { OctreeBuilder } from './octree-builder.js'

export interface OctreeRequest {
  /** At least one. */
  layers: DustLayer[]
  /** Places of the stars, cm. */
  stars: readonly (readonly [number, number, number])[]
  /** Side of the cube about the origin, cm; 0: as the dust needs. */
  width: number
  /** Deepest level. */
  finest: number
  cellsAtMost: number
}

/** A cell is divided while its optical depth, its contrast (max - min)/(max + min), or its angle at a star (rad) is larger. */
const DEPTH = 0.5
const CONTRAST = 0.15
const ANGLE = 0.15
/** Share of the dust, or of the starlight, below which a cell matters less: with so many cells it would be the mean one. */
const TYPICAL = 1 / 50_000
/** Cells that hold details smaller than themselves come before all others: until they are divided nothing is known of them. */
const DETAIL = 1000
/** Samples along each side of a cube, at the middles of equal parts. */
const SAMPLES = 3
/** Corners, just inside. */
const INSIDE = 0.9999
/** Where a cube of side 1 is looked at: samples, then corners, three numbers each. */
const PLACES = Float64Array.from([
  ...Array.from({ length: SAMPLES ** 3 }, (_, k) => [
    k % SAMPLES,
    Math.floor(k / SAMPLES) % SAMPLES,
    Math.floor(k / SAMPLES ** 2)
  ])
    .flat()
    .map((digit) => (digit + 0.5) / SAMPLES),
  ...Array.from({ length: 8 }, (_, k) => [k & 1, k & 2, k & 4].map((upper) => (upper ? INSIDE : 1 - INSIDE))).flat()
])
/** Points that must lie in a cube before they count against its samples. */
const FEW = 4

/**
 * Cubes about the dust, divided where it varies, where it is opaque and near stars. The cell that exceeds its limits most, in
 * proportion to what it holds of the dust or catches of the starlight, is divided first, until none does or the number of cells
 * allowed is reached. Empty cells stay whole.
 */
export function growOctree(request: OctreeRequest, allocate: Allocate = allocatePrivate): Octree {
  const { layers, finest, cellsAtMost } = request
  const reach = Math.max(...layers.map(({ shape }) => shape.outerRadius))
  const side = request.width > 0 ? request.width : 2 * reach
  const builder = new OctreeBuilder([-0.5 * side, -0.5 * side, -0.5 * side], side)
  const points = new MassPoints(layers)
  const details = new DetailLists(layers)
  const judge = new Judge(request, builder, points)
  const queue = new LargestFirst()
  const consider = (node: number) => {
    if (builder.level[node] >= Math.min(finest, LEVELS - 1)) return
    const excess = judge.excess(node, details.smallest(node))
    if (excess > 1) queue.push(node, excess)
  }
  consider(0)
  while (builder.cells + 7 <= cellsAtMost) {
    const node = queue.pop()
    if (node === undefined) break
    const first = builder.split(node)
    points.divide(node, first, builder)
    details.divide(node, first, builder)
    for (let k = 0; k < 8; k++) consider(first + k)
  }
  return builder.finish(allocate)
}

/** Small details of the dust, by the nodes that are still too large for them. */
class DetailLists {
  private readonly lists = new Map<number, number[]>()
  private readonly spheres: [number, number, number, number][]

  constructor(layers: DustLayer[]) {
    this.spheres = layers.flatMap(({ shape: { details } }) =>
      Array.from(details.radius, (radius, i): [number, number, number, number] => [
        details.x[i],
        details.y[i],
        details.z[i],
        radius
      ])
    )
    if (this.spheres.length > 0) this.lists.set(0, Array.from(this.spheres.keys()))
  }

  /** Radius of the smallest detail in a node, cm; infinite without any. */
  smallest(node: number): number {
    return (this.lists.get(node) ?? []).reduce((least, i) => Math.min(least, this.spheres[i][3]), Number.POSITIVE_INFINITY)
  }

  divide(node: number, first: number, { origin, side, corner, level }: OctreeBuilder): void {
    const list = this.lists.get(node)
    if (!list) return
    this.lists.delete(node)
    const unit = side / 2 ** LEVELS
    const length = side / 2 ** level[first]
    for (let k = 0; k < 8; k++) {
      const low = [0, 1, 2].map((a) => origin[a] + corner[3 * (first + k) + a] * unit)
      const own = list.filter((i) => {
        const sphere = this.spheres[i]
        const radius = sphere[3]
        let distance2 = 0
        for (let a = 0; a < 3; a++) distance2 += Math.max(0, low[a] - sphere[a], sphere[a] - low[a] - length) ** 2
        return distance2 < radius * radius && length > radius
      })
      if (own.length > 0) this.lists.set(first + k, own)
    }
  }
}

/** Tells by how much a cell exceeds its limits. */
class Judge {
  private readonly unit: number

  constructor(
    private readonly request: OctreeRequest,
    private readonly builder: OctreeBuilder,
    private readonly points: MassPoints
  ) {
    this.unit = builder.side / 2 ** LEVELS
  }

  excess(node: number, detail: number): number {
    const { builder, unit, points, request } = this
    const { origin, corner, level, side } = builder
    const length = side / 2 ** level[node]
    const x = origin[0] + corner[3 * node] * unit
    const y = origin[1] + corner[3 * node + 1] * unit
    const z = origin[2] + corner[3 * node + 2] * unit
    let [sum, least, most] = [0, Number.POSITIVE_INFINITY, 0]
    for (let k = 0; k < PLACES.length; k += 3) {
      let chi = 0
      for (const { shape, scale, extinction } of request.layers) {
        const density = shape.relativeDensity(x + PLACES[k] * length, y + PLACES[k + 1] * length, z + PLACES[k + 2] * length)
        chi += scale * extinction * density
      }
      if (k < 3 * SAMPLES ** 3) sum += chi
      least = Math.min(least, chi)
      most = Math.max(most, chi)
    }
    const volume = length ** 3
    // Dust that shows in a corner alone fills a part of it.
    const known = Math.max(sum / SAMPLES ** 3, most / (2 * SAMPLES) ** 3) * volume
    const counted = points.count(node) >= FEW ? points.crossSection(node) : 0
    const dust = Math.max(known, counted)
    const hidden = detail < length ? (DETAIL * length) / detail : 0
    if (dust === 0) return hidden
    const depth = dust / (length * length)
    let [angle, lit] = [0, 0]
    for (const [sx, sy, sz] of request.stars) {
      const distance2 = (x + 0.5 * length - sx) ** 2 + (y + 0.5 * length - sy) ** 2 + (z + 0.5 * length - sz) ** 2
      const near = length / Math.sqrt(Math.max(distance2, 0.25 * length * length))
      angle = Math.max(angle, near)
      lit = Math.max(lit, (Math.min(1, depth) * near * near) / (4 * Math.PI))
    }
    const weight = Math.cbrt(Math.max(dust / points.total, lit) / TYPICAL)
    const contrast = counted > 2 * known ? 1 : (most - least) / (most + least)
    const worst = Math.max(Math.sqrt(depth / DEPTH), contrast / CONTRAST, angle / ANGLE)
    return Math.max(worst * weight, hidden)
  }
}
