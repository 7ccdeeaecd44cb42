import { sphericalOf } from '../grid/cells.js'
import { allocateShared } from '../math/allocate.js'
import { makeSamplingTable } from '../math/cdf.js'
import type { Model } from '../model/model.js'
import type { EquilibriumMedium, EquilibriumSource } from '../transport/equilibrium-medium.js'

/** Light of point stars at the centre of cells of one or two dimensions on its way straight out, which needs no packets. */
export interface CentralLight {
  /** components x cells: what it heats, in the units of `absorbed` x power of a packet, erg/s cm3/g. */
  heating: Float64Array
  /** What meets no dust, erg/s. */
  escaped: number
  /** What meets dust, erg/s. */
  caught: number
  /** Where that is met, as packets start from there. */
  source: Extract<EquilibriumSource, { kind: 'central-stars' }>
}

/** A column is followed until so little of its light is left. */
const DARK = 1e-12

/** The light (erg/s, by bin) along every column of cells, dimmed by the law of Beer and Lambert, summed exactly within cells. */
export function centralLight(
  { walls, cells, components }: Model,
  { bins, density, absorption, extinction }: Pick<EquilibriumMedium, 'bins' | 'density' | 'absorption' | 'extinction'>,
  starlight: Float64Array
): CentralLight {
  const { r, cosTheta } = sphericalOf(walls)
  const nr = r.length - 1
  const columns = cosTheta.length - 1
  const heating = new Float64Array(components.length * cells)
  const columnDensity = new Float64Array(allocateShared(8 * components.length * columns * (nr + 1)))
  const met = new Float64Array(bins * columns)
  let caught = 0
  for (let column = 0; column < columns; column++) {
    const share = 0.5 * (cosTheta[column] - cosTheta[column + 1])
    components.forEach((_, c) => {
      const start = (c * columns + column) * (nr + 1)
      for (let ir = 0; ir < nr; ir++)
        columnDensity[start + ir + 1] = columnDensity[start + ir] + density[c * cells + cellAt(ir)] * (r[ir + 1] - r[ir])
    })
    for (let k = 0; k < bins; k++) {
      if (starlight[k] === 0) continue
      let left = 1
      let gone = 0
      for (let ir = 0; ir < nr && left > DARK; ir++) {
        const cell = cellAt(ir)
        let opacity = 0
        for (let c = 0; c < components.length; c++) opacity += density[c * cells + cell] * extinction[c * bins + k]
        if (opacity === 0) continue
        const lost = -left * Math.expm1(-opacity * (r[ir + 1] - r[ir]))
        const path = (starlight[k] * share * lost) / opacity
        for (let c = 0; c < components.length; c++) heating[c * cells + cell] += path * absorption[c * bins + k]
        left -= lost
        gone += lost
      }
      met[k * columns + column] = starlight[k] * share * gone
      caught += met[k * columns + column]
    }

    function cellAt(ir: number): number {
      return ir === 0 ? 0 : 1 + (ir - 1) * columns + column
    }
  }
  const byBin = Float64Array.from({ length: bins }, (_, k) =>
    met.subarray(k * columns, (k + 1) * columns).reduce((sum, value) => sum + value, 0)
  )
  return {
    heating,
    escaped: starlight.reduce((sum, value) => sum + value, 0) - caught,
    caught,
    source: {
      kind: 'central-stars',
      bins: makeSamplingTable(byBin, 1, bins, allocateShared),
      columns: makeSamplingTable(met, bins, columns, allocateShared),
      columnDensity
    }
  }
}
