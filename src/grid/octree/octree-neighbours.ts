import { CHILD, cellSide, NEIGHBOUR, type Octree, OUTSIDE, RECORD } from './octree.js'

/**
 * Calls `visit` for every wall of a cell: the cell beyond, or -1 for none, the area (cm2), and the paths (cm) from the middles of the
 * two cells to the wall.
 */
export function forEachCubeWall(
  octree: Octree,
  cell: number,
  visit: (beyond: number, area: number, path: number, pathBeyond: number) => void
): void {
  const { records, places } = octree
  const place = places[cell]
  const own = cellSide(octree, cell)
  /** Visits the cells of a child of a family that touch its side number `face`. */
  const descend = (family: number, child: number, face: number): void => {
    const within = records[RECORD * family + CHILD + child]
    if (within < 0) {
      const beyond = -1 - within
      const length = cellSide(octree, beyond)
      const shared = Math.min(own, length)
      visit(beyond, shared * shared, 0.5 * own, 0.5 * length)
      return
    }
    const axis = face >> 1
    for (let k = 0; k < 8; k++) if (((k >> axis) & 1) === (face & 1)) descend(within, k, face)
  }
  const family = place >> 3
  for (let face = 0; face < 6; face++) {
    const across = (place & 7) ^ (1 << (face >> 1))
    if (((across >> (face >> 1)) & 1) === (face & 1)) {
      descend(family, across, face ^ 1)
      continue
    }
    const beyond = records[RECORD * family + NEIGHBOUR + face]
    if (beyond >= 0) descend(beyond, across, face ^ 1)
    else if (beyond === OUTSIDE) visit(-1, own * own, 0.5 * own, 0)
    else descend((-2 - beyond) >> 3, (-2 - beyond) & 7, face ^ 1)
  }
}
