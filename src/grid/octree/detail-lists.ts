import type { DustLayer } from '../dust-layer.js'
import { LEVELS } from './octree.js'
import type { OctreeBuilder } from './octree-builder.js'

/** Small details of the dust, by the nodes that are still too large for them. */
export class DetailLists {
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
