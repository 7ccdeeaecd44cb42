import { Random } from './random'

/** The most cells that a scene may ask for. */
const MOST_CELLS = 10_000

/** A radial cell as the loop needs it: squared inner radius (cm2), extinction (cm-1), albedo, importance. A last one is the outer wall. */
@unmanaged
export class Cell {
  square: f64
  extinction: f64
  albedo: f64
  importance: f64
}
export const CELL = 32
export const CELLS = memory.data(CELL * (MOST_CELLS + 1))
/** cells x 64 bins of direction. */
export const TALLY = memory.data(MOST_CELLS * 512)

/** What a batch needs besides; places in memory are doubles too, so that the caller writes doubles alone. */
@unmanaged
export class Medium {
  packets: f64
  cells: f64
  /** Squared radius of a sphere at the centre, cm2. */
  starRadius2: f64
  /** Radii of the walls, cm. */
  radii: f64
  /** Scattering laws: how many, their asymmetries, and laws x cells scattering coefficients (cm-1). */
  laws: f64
  asymmetry: f64
  scattering: f64
  /** Where records of sources begin, and the table that chooses among them: cumulative, guide and size of the guide. */
  sources: f64
  cumulative: f64
  guide: f64
  guideSize: f64
}

/** Bin of a sampling table by a uniform number: see math/cdf.ts. */
export function sampleBin(cumulative: usize, guide: usize, guideSize: f64, u: f64): i32 {
  let k = load<i32>(guide + ((<usize>(u * guideSize)) << 2))
  while (load<f64>(cumulative + (k << 3)) <= u) k++
  return k
}

/** Asymmetry of the scattering law drawn in a cell, where there are several. */
export function drawAsymmetry(medium: Medium, cell: i32): f64 {
  const last = <i32>medium.laws - 1
  const rows = <usize>medium.scattering + (cell << 3)
  const row = (<i32>medium.cells) << 3
  let total: f64 = 0
  for (let law = 0; law <= last; law++) total += load<f64>(rows + law * row)
  let pick = Random.uniform() * total
  let law = 0
  while (law < last && pick >= load<f64>(rows + law * row)) {
    pick -= load<f64>(rows + law * row)
    law++
  }
  return load<f64>(<usize>medium.asymmetry + (law << 3))
}
