import { type Allocate, allocatePrivate } from '../../math/allocate.js'
import { LargestFirst } from '../../math/largest-first.js'
import type { DustLayer } from '../dust-layer.js'
import { CellError } from './cell-error.js'
import { DetailLists } from './detail-lists.js'
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
  /** Share of the light of all dust that the cells may get wrong. */
  tolerance: number
}

/**
 * Cubes about the dust. The one that may get most of the light wrong is divided first, until all together are within the tolerance
 * or the number of cells allowed is reached. Empty cells stay whole.
 */
export function growOctree(request: OctreeRequest, allocate: Allocate = allocatePrivate): Octree {
  const { layers, stars, finest, cellsAtMost, tolerance } = request
  const reach = Math.max(...layers.map(({ shape }) => shape.outerRadius))
  const side = request.width > 0 ? request.width : 2 * reach
  const builder = new OctreeBuilder([-0.5 * side, -0.5 * side, -0.5 * side], side)
  const points = new MassPoints(layers)
  const details = new DetailLists(layers)
  const cellError = new CellError(layers, stars, builder, points)
  const queue = new LargestFirst()
  const errors = new GrowingValues()
  let error = 0
  const consider = (node: number) => {
    const own = cellError.of(node, details.smallest(node))
    errors.set(node, own)
    error += own
    if (own > 0 && builder.level[node] < Math.min(finest, LEVELS - 1)) queue.push(node, own)
  }
  consider(0)
  while (builder.cells + 7 <= cellsAtMost && error > tolerance) {
    const node = queue.pop()
    if (node === undefined) break
    error -= errors.values[node]
    const first = builder.split(node)
    points.divide(node, first, builder)
    details.divide(node, first, builder)
    for (let k = 0; k < 8; k++) consider(first + k)
  }
  const octree = builder.finish(allocate)
  octree.error = error
  return octree
}

class GrowingValues {
  values = new Float64Array(1024)

  set(index: number, value: number): void {
    if (index >= this.values.length) {
      const larger = new Float64Array(2 * index)
      larger.set(this.values)
      this.values = larger
    }
    this.values[index] = value
  }
}
