import { CHILD, LEVELS, NEIGHBOUR, type Octree, RECORD, SIZE } from './octree.js'

/**
 * Calls `visit` for every wall that a cell shares with another: that cell, the area (cm2), and the paths (cm) from the middles of the
 * two cells to the wall.
 */
export function forEachCubeWall(
  { side, records, nodeOf }: Octree,
  cell: number,
  visit: (beyond: number, area: number, path: number, pathBeyond: number) => void
): void {
  const unit = side / 2 ** LEVELS
  const at = RECORD * nodeOf[cell]
  const own = records[at + SIZE] * unit
  /** Visits the cells of a node that touch its side number `face`. */
  const descend = (node: number, face: number): void => {
    const record = RECORD * node
    const first = records[record + CHILD]
    if (first < 0) {
      const length = records[record + SIZE] * unit
      const shared = Math.min(own, length)
      visit(-1 - first, shared * shared, 0.5 * own, 0.5 * length)
      return
    }
    const axis = face >> 1
    for (let k = 0; k < 8; k++) if (((k >> axis) & 1) === (face & 1)) descend(first + k, face)
  }
  for (let face = 0; face < 6; face++) {
    const beyond = records[at + NEIGHBOUR + face]
    if (beyond >= 0) descend(beyond, face ^ 1)
  }
}
