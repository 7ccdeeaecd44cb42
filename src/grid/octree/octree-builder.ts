import { type Allocate, allocatePrivate } from '../../math/allocate.js'
import { CHILD, LEVELS, NEIGHBOUR, type Octree, OUTSIDE, RECORD, SIZE } from './octree.js'

const FIRST_CAPACITY = 1024

/** An octree while it grows. Nodes keep their numbers until `finish` puts them in order. */
export class OctreeBuilder {
  nodes = 1
  cells = 1
  private deepest = 0
  /** The first child of a node, 0 for a leaf. */
  child = new Int32Array(FIRST_CAPACITY)
  level = new Uint8Array(FIRST_CAPACITY)
  corner = new Uint32Array(3 * FIRST_CAPACITY)

  /** `origin`: least coordinates of the whole cube, `side`: its length, cm. */
  constructor(
    readonly origin: readonly [number, number, number],
    readonly side: number
  ) {}

  /** Divides a leaf; returns its first child. */
  split(node: number): number {
    const first = this.nodes
    this.reserve(first + 8)
    const { level, corner } = this
    const half = 2 ** (LEVELS - 1 - level[node])
    this.deepest = Math.max(this.deepest, level[node] + 1)
    for (let k = 0; k < 8; k++) {
      level[first + k] = level[node] + 1
      for (let a = 0; a < 3; a++) corner[3 * (first + k) + a] = corner[3 * node + a] + ((k >> a) & 1) * half
    }
    this.child[node] = first
    this.nodes += 8
    this.cells += 7
    return first
  }

  /** The octree in the order of depth, in memory of `allocate`; the whole cube is divided at least once. */
  finish(allocate: Allocate = allocatePrivate): Octree {
    if (this.child[0] === 0) this.split(0)
    const { nodes, cells, origin, side } = this
    const families = (nodes - 1) / 8
    const octree: Octree = {
      origin: new Float64Array(allocate(24)),
      side,
      smallestSide: side / 2 ** this.deepest,
      families,
      cells,
      records: new Int32Array(allocate(4 * RECORD * families)),
      corners: new Int32Array(allocate(12 * families)),
      places: new Int32Array(allocate(4 * cells)),
      profiles: new Int32Array(allocate(4 * cells)),
      cuts: new Float32Array(),
      error: 0
    }
    octree.origin.set(origin)
    this.putInOrder(octree)
    findNeighbours(octree)
    return octree
  }

  private putInOrder({ records, corners, places }: Octree): void {
    // Nodes that wait, each with its place: at most seven at each level.
    const stack = new Int32Array(2 * (7 * LEVELS + 8))
    let depth = 0
    let [families, cells] = [0, 0]
    const found = (node: number) => {
      const family = families++
      const first = this.child[node]
      records[RECORD * family + SIZE] = 2 ** (LEVELS - this.level[first])
      for (let a = 0; a < 3; a++) corners[3 * family + a] = this.corner[3 * node + a]
      for (let k = 7; k >= 0; k--) {
        stack[depth++] = first + k
        stack[depth++] = 8 * family + k
      }
      return family
    }
    found(0)
    while (depth > 0) {
      depth -= 2
      const [node, place] = [stack[depth], stack[depth + 1]]
      const entry = RECORD * (place >> 3) + CHILD + (place & 7)
      if (this.child[node] > 0) records[entry] = found(node)
      else {
        records[entry] = -1 - cells
        places[cells++] = place
      }
    }
  }

  private reserve(nodes: number): void {
    if (nodes <= this.child.length) return
    const capacity = Math.ceil(1.5 * nodes)
    const grown = <Values extends Int32Array | Uint8Array | Uint32Array>(values: Values, larger: Values): Values => {
      larger.set(values)
      return larger
    }
    this.child = grown(this.child, new Int32Array(capacity))
    this.level = grown(this.level, new Uint8Array(capacity))
    this.corner = grown(this.corner, new Uint32Array(3 * capacity))
  }
}

/** Families stand behind those of their parents, whose neighbours are known then. */
function findNeighbours({ families, records }: Octree): void {
  const entryOf = (family: number, child: number) => {
    const within = records[RECORD * family + CHILD + child]
    return within >= 0 ? within : -2 - (8 * family + child)
  }
  records.fill(OUTSIDE, NEIGHBOUR, NEIGHBOUR + 6)
  for (let family = 0; family < families; family++) {
    for (let k = 0; k < 8; k++) {
      const own = records[RECORD * family + CHILD + k]
      if (own < 0) continue
      for (let face = 0; face < 6; face++) {
        const bit = 1 << (face >> 1)
        const upper = (face & 1) === 1
        const beyond = records[RECORD * family + NEIGHBOUR + face]
        // A sibling, or across the side of the family into a child of the next one, or into the cell there.
        let found = beyond
        if (((k & bit) !== 0) !== upper) found = entryOf(family, k ^ bit)
        else if (beyond >= 0) found = entryOf(beyond, k ^ bit)
        records[RECORD * own + NEIGHBOUR + face] = found
      }
    }
  }
}
