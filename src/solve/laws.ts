import { scalarMatrix } from '../dust/matrices.js'
import { henyeyGreenstein } from '../dust/phase-function.js'
import type { ScatteringMatrix } from '../dust/scattering-matrix.js'
import { type ScatteringTables, scatteringTables } from '../dust/scattering-tables.js'
import { allocateShared } from '../math/allocate.js'
import type { DustComponent } from '../model/model.js'

/** The different scattering laws of the components at one wavelength. */
export interface Laws {
  /** By component: which law it follows. */
  of: number[]
  /** By law: mean cosine of the scattering angle. */
  asymmetry: Float64Array
  /** Present where a law is not Henyey-Greenstein. */
  tables?: ScatteringTables
}

/** Components of one asymmetry share a law, as do those of one opacity. */
export function lawsAt(components: DustComponent[], wavelength: number): Laws {
  const keys: (number | string)[] = []
  const asymmetry: number[] = []
  const matrices: (ScatteringMatrix | undefined)[] = []
  const of = components.map(({ spec, law }) => {
    const g = law.asymmetry(wavelength)
    const key = law.matrix ? spec.opacity : g
    if (!keys.includes(key)) {
      keys.push(key)
      asymmetry.push(g)
      matrices.push(law.matrix?.(wavelength))
    }
    return keys.indexOf(key)
  })
  const found = { of, asymmetry: Float64Array.from(asymmetry.length > 0 ? asymmetry : [0]) }
  if (matrices.every((matrix) => matrix === undefined)) return found
  const all = matrices.map((matrix, i) => matrix ?? scalarMatrix((cosine) => henyeyGreenstein(asymmetry[i], cosine)))
  return { ...found, tables: scatteringTables(all, allocateShared) }
}
