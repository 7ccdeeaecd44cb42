import type { ScatteringTables } from '../dust/scattering-tables.js'
import type { Cells } from '../grid/cells.js'
import type { SamplingTable } from '../math/cdf.js'
import type { Vector } from '../scene/types.js'

/** What the temperature phase needs to know, as flat arrays that all threads share. Component c, cell i, bin k. */
export interface EquilibriumMedium {
  walls: Cells
  cells: number
  components: number
  bins: number
  /** components x cells, g/cm3. */
  density: Float64Array
  /** components x bins, cm2/g. */
  absorption: Float64Array
  extinction: Float64Array
  asymmetry: Float64Array
  /** components x bins: scattering law among `tables`; -1 for Henyey-Greenstein with the asymmetry. */
  lawOf: Int32Array
  tables?: ScatteringTables
  /** For each component, the bins of its emission: one row for each tabulated temperature. */
  emission: SamplingTable[]
  /** components x cells: row of `emission` at the present temperature, with a fraction. Negative: absorbs for good. */
  emissionRow: Float64Array
  walk: WalkLevels
  /** components x cells: Planck mean absorption opacity, cm2/g, in cells where packets walk. */
  planck: Float64Array
  sources: EquilibriumSource[]
  /** One row, one entry a source: its share of the packets. */
  sourceTable: SamplingTable
  /** Energy of a packet of each source, in units of the mean. */
  sourceEnergy: Float64Array
}

export type EquilibriumSource =
  | { kind: 'star'; at: Vector; radius: number; bins: SamplingTable }
  /** Point stars at the centre of spherical cells of one or two dimensions: packets begin where their light first meets dust. */
  | {
      kind: 'central-stars'
      bins: SamplingTable
      /** bins x columns of cells seen from the centre. */
      columns: SamplingTable
      /** components x columns x (nr + 1): mass over area from the centre to each radial wall, g/cm2. */
      columnDensity: Float64Array
    }
  /** Isotropic light from outside. */
  | { kind: 'ambient'; bins: SamplingTable }
  /** Dust of fixed temperature: cells in proportion to luminosity, bins from the row of `emission` of its component. */
  | { kind: 'dust'; component: number; cells: SamplingTable; row: number }

/** What the modified random walk needs to know of the cells in which it may run, as flat arrays that all threads share. */
export interface WalkLevels {
  /** cells + 1: where the levels of a cell begin among all. */
  first: Int32Array
  /**
   * LEVEL_SIZE numbers a level, from large spheres to small ones: the smallest radius (cm) of its spheres; path (cm) over the square of
   * the radius that a packet leaves in a sphere; flights of light to which the sphere is thin, over the same; and the first bin of such
   * light. All 0 behind the last.
   */
  levels: Float64Array
}
