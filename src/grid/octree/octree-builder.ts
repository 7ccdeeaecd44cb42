import { type Allocate, allocatePrivate } from '../../math/allocate.js'
import { CHILD, CORNER, LEVELS, NEIGHBOUR, type Octree, RECORD, SIZE } from './octree.js'

const FIRST_CAPACITY = 1024

/** An octree while it grows. Nodes keep their numbers until `finish` puts them in order. */
export class OctreeBuilder {
  nodes = 1
  cells = 1
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
    for (let k = 0; k < 8; k++) {
      level[first + k] = level[node] + 1
      for (let a = 0; a < 3; a++) corner[3 * (first + k) + a] = corner[3 * node + a] + ((k >> a) & 1) * half
    }
    this.child[node] = first
    this.nodes += 8
    this.cells += 7
    return first
  }

  /** The octree in the order of depth, in memory of `allocate`. */
  finish(allocate: Allocate = allocatePrivate): Octree {
    const { nodes, cells, origin, side } = this
    const octree: Octree = {
      origin: new Float64Array(allocate(24)),
      side,
      nodes,
      cells,
      records: new Int32Array(allocate(4 * RECORD * nodes)),
      nodeOf: new Int32Array(allocate(4 * cells))
    }
    octree.origin.set(origin)
    this.putInOrder(octree)
    findNeighbours(octree)
    return octree
  }

  private putInOrder(octree: Octree): void {
    const { records, nodeOf } = octree
    // Nodes of which the own and the new number are known and the children not yet placed: at most seven wait at each level.
    const stack = new Int32Array(2 * (7 * LEVELS + 8))
    let depth = 2
    let [next, cell] = [1, 0]
    while (depth > 0) {
      depth -= 2
      const [own, at] = [stack[depth], stack[depth + 1]]
      const record = RECORD * at
      records[record + SIZE] = 2 ** (LEVELS - this.level[own])
      for (let a = 0; a < 3; a++) records[record + CORNER + a] = this.corner[3 * own + a]
      const first = this.child[own]
      if (first === 0) {
        records[record + CHILD] = -1 - cell
        nodeOf[cell++] = at
        continue
      }
      records[record + CHILD] = next
      for (let k = 7; k >= 0; k--) {
        stack[depth++] = first + k
        stack[depth++] = next + k
      }
      next += 8
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

/** Parents stand before their children, so that theirs are known. */
function findNeighbours({ nodes, records }: Octree): void {
  records.fill(-1, NEIGHBOUR, NEIGHBOUR + 6)
  for (let node = 0; node < nodes; node++) {
    const first = records[RECORD * node + CHILD]
    if (first < 0) continue
    for (let k = 0; k < 8; k++) {
      for (let face = 0; face < 6; face++) {
        const bit = 1 << (face >> 1)
        const upper = (face & 1) === 1
        const sibling = k ^ bit
        // Within the parent, or across its own side into a child of its neighbour, or into that neighbour itself.
        let found = first + sibling
        if (((k & bit) !== 0) === upper) {
          const beyond = records[RECORD * node + NEIGHBOUR + face]
          const theirs = beyond >= 0 ? records[RECORD * beyond + CHILD] : -1
          found = theirs >= 0 ? theirs + sibling : beyond
        }
        records[RECORD * (first + k) + NEIGHBOUR + face] = found
      }
    }
  }
}
