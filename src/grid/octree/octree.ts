/** Deepest level that corners can tell apart. */
export const LEVELS = 30

/**
 * Cubes divided into eight, as flat arrays. Nodes stand in the order of depth, the eight children of a node together, child
 * x + 2 y + 4 z with 1 for the upper half; leaves are the cells, numbered in the same order.
 */
export interface Octree {
  /** Least coordinates of the whole cube, cm. */
  origin: Float64Array
  /** Its side, cm. */
  side: number
  nodes: number
  cells: number
  /** RECORD numbers a node, together so that a step of a walk meets little memory. */
  records: Int32Array
  /** The node of each cell. */
  nodeOf: Int32Array
}

export const RECORD = 12
/** The first child, or -1 - cell for a leaf. */
export const CHILD = 0
/** Side in units of the whole side / 2^LEVELS, and least coordinates from `origin`: walls of neighbours agree to the last bit. */
export const SIZE = 1
export const CORNER = 2
/** Six: what lies beyond -x, +x, -y, +y, -z, +z: the node of the same size, or the larger cell there; -1 outside. */
export const NEIGHBOUR = 5

/** Middle (cm) and side (cm) of a cell, four numbers into `out`. */
export function cellCube({ origin, side, records, nodeOf }: Octree, cell: number, out: Float64Array): Float64Array {
  const at = RECORD * nodeOf[cell]
  const unit = side / 2 ** LEVELS
  const length = records[at + SIZE] * unit
  for (let a = 0; a < 3; a++) out[a] = origin[a] + records[at + CORNER + a] * unit + 0.5 * length
  out[3] = length
  return out
}

/** Side of the smallest cells, cm. */
export function smallestSide({ side, records, nodeOf, cells }: Octree): number {
  let smallest = 2 ** LEVELS
  for (let cell = 0; cell < cells; cell++) smallest = Math.min(smallest, records[RECORD * nodeOf[cell] + SIZE])
  return (smallest * side) / 2 ** LEVELS
}

/** Volume of every cell, cm3, into `out`. */
export function cubeVolumes({ side, records, nodeOf, cells }: Octree, out: Float64Array): Float64Array {
  const unit = side / 2 ** LEVELS
  for (let cell = 0; cell < cells; cell++) out[cell] = (records[RECORD * nodeOf[cell] + SIZE] * unit) ** 3
  return out
}
