/** Deepest level that corners can tell apart. */
export const LEVELS = 30

/**
 * Cubes divided into eight, as flat arrays. The eight children of a divided cube are a family, child x + 2 y + 4 z with 1 for the
 * upper half. Families stand in the order of depth; children that are not divided are the cells, numbered in the same order. So
 * what is near in space is near in memory, and a family has all that a walk through its cells reads in one line of a cache.
 */
export interface Octree {
  /** Least coordinates of the whole cube, cm. */
  origin: Float64Array
  /** Its side, cm. */
  side: number
  /** Side of its smallest cells, cm. */
  smallestSide: number
  families: number
  cells: number
  /** RECORD numbers a family. */
  records: Int32Array
  /** Least coordinates of every family from `origin` in units of the whole side / 2^LEVELS, three numbers each. */
  corners: Int32Array
  /** Where each cell stands: 8 family + child. */
  places: Int32Array
  /** How the density of the dust varies within each cell: see profile.ts; 0 where it does not. */
  profiles: Int32Array
  /** CUT numbers for each cell that the edge of the dust cuts. */
  cuts: Float32Array
  /** Share of the light of all dust that the cells may get wrong, where it is known. */
  error: number
}

export const RECORD = 16
/** Eight: the family of a divided child, or -1 - cell. */
export const CHILD = 0
/** Six: what lies beyond -x, +x, -y, +y, -z, +z: a family of the same size, -2 - place of a cell at least as large, or OUTSIDE. */
export const NEIGHBOUR = 8
/** Side of the children in units of the whole side / 2^LEVELS: walls of neighbours agree to the last bit. */
export const SIZE = 14

export const OUTSIDE = -1

/** Middle (cm) and side (cm) of a cell, four numbers into `out`. */
export function cellCube({ origin, side, records, corners, places }: Octree, cell: number, out: Float64Array): Float64Array {
  const place = places[cell]
  const family = place >> 3
  const unit = side / 2 ** LEVELS
  const size = records[RECORD * family + SIZE]
  for (let a = 0; a < 3; a++) {
    const corner = corners[3 * family + a] + ((place >> a) & 1) * size
    out[a] = origin[a] + corner * unit + 0.5 * size * unit
  }
  out[3] = size * unit
  return out
}

/** Side of a cell, cm. */
export function cellSide({ side, records, places }: Octree, cell: number): number {
  return (records[RECORD * (places[cell] >> 3) + SIZE] * side) / 2 ** LEVELS
}

/** Volume of every cell, cm3, into `out`. */
export function cubeVolumes(octree: Octree, out: Float64Array): Float64Array {
  for (let cell = 0; cell < octree.cells; cell++) out[cell] = cellSide(octree, cell) ** 3
  return out
}
