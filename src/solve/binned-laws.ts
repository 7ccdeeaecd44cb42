import type { ScatteringMatrix } from '../dust/scattering-matrix.js'
import { type ScatteringTables, scatteringTables } from '../dust/scattering-tables.js'
import type { WavelengthGrid } from '../dust/wavelength-grid.js'
import { allocateShared } from '../math/allocate.js'
import type { DustComponent } from '../model/model.js'

/** Bins of wavelength, 1.5 % wide each, that share one matrix where that changes with wavelength. */
const SHARED_BINS = 8

/** Scattering laws of the temperature phase. */
export interface BinnedLaws {
  /** components x bins: law among `tables`; -1 for Henyey-Greenstein. */
  lawOf: Int32Array
  /** Absent where all is Henyey-Greenstein. */
  tables?: ScatteringTables
}

export function binnedLaws(components: DustComponent[], grid: WavelengthGrid): BinnedLaws {
  const lawOf = new Int32Array(allocateShared(4 * components.length * grid.count)).fill(-1)
  const matrices: ScatteringMatrix[] = []
  components.forEach(({ law }, c) => {
    if (!law.matrix) return
    for (let first = 0; first < grid.count; first += SHARED_BINS) {
      const end = Math.min(first + SHARED_BINS, grid.count)
      const matrix = law.matrix(grid.centres[(first + end - 1) >> 1])
      // A law that is the same at all wavelengths gives the same object.
      if (matrix !== matrices[matrices.length - 1]) matrices.push(matrix)
      lawOf.fill(matrices.length - 1, c * grid.count + first, c * grid.count + end)
    }
  })
  return { lawOf, ...(matrices.length > 0 && { tables: scatteringTables(matrices, allocateShared) }) }
}
