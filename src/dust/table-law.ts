import { interpolateLinear, interpolateLogLog } from '../math/interp.js'
import type { OpacityTable } from '../scene/types.js'
import type { OpacityCurves } from './opacity-curves.js'

/** Opacities between the rows of a table, as the scene format has it. */
export function tableLaw(table: Omit<OpacityTable, 'file'>): OpacityCurves {
  const { wavelength: rows, absorption, scattering, asymmetry } = table
  const lnRows = rows.map(Math.log)
  return {
    absorption: (wavelength) => tabulated(rows, absorption, wavelength),
    scattering: (wavelength) => tabulated(rows, scattering, wavelength),
    asymmetry: (wavelength) => interpolateLinear(lnRows, asymmetry, Math.log(wavelength)),
    range: [rows[0], rows[rows.length - 1]],
    kinks: Array.from(rows.filter((_, i) => isKink(rows, absorption, i) || isKink(rows, scattering, i)))
  }
}

/** Log-log interpolation; constant below the first row, the power law of the last two rows beyond the last. */
function tabulated(rows: Float64Array, values: Float64Array, wavelength: number): number {
  const last = rows.length - 1
  if (wavelength <= rows[last] || last === 0) return interpolateLogLog(rows, values, wavelength)
  if (values[last] === 0 || values[last - 1] === 0) return values[last]
  return values[last] * (wavelength / rows[last]) ** logSlope(rows, values, last - 1)
}

/** d ln value / d ln wavelength from row i to the next; infinite from or to a zero. */
function logSlope(rows: Float64Array, values: Float64Array, i: number): number {
  return values[i] === values[i + 1] ? 0 : Math.log(values[i + 1] / values[i]) / Math.log(rows[i + 1] / rows[i])
}

/** A bend of the logarithmic slope by more than one half, or an interval from or to a zero on either side. */
function isKink(rows: Float64Array, values: Float64Array, i: number): boolean {
  if (i === rows.length - 1) return false
  const before = i === 0 ? 0 : logSlope(rows, values, i - 1)
  return !(Math.abs(logSlope(rows, values, i) - before) <= 0.5)
}
