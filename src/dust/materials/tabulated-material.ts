import { interpolateLinear, interpolateLogLog } from '../../math/interp.js'
import type { Material } from './material.js'

/** Optical constants as measured: wavelengths in vacuum (cm, increasing, two or more), n and k >= 0 at each. */
export interface OpticalConstants {
  wavelength: Float64Array
  n: Float64Array
  k: Float64Array
}

/**
 * Material from a table: n linear in the logarithm of wavelength, k a power law between rows (linear from or to a zero). Outside, n
 * and k keep the nearest value, but beyond the last row k goes on as the power law of the last two rows.
 */
export function tabulatedMaterial({ wavelength: rows, n, k }: OpticalConstants): Material {
  const lnRows = rows.map(Math.log)
  const last = rows.length - 1
  const bothPositive = k[last] > 0 && k[last - 1] > 0
  const slope = bothPositive ? Math.log(k[last] / k[last - 1]) / (lnRows[last] - lnRows[last - 1]) : 0
  return {
    index: (wavelength) => ({
      re: interpolateLinear(lnRows, n, Math.log(wavelength)),
      im: interpolateLogLog(rows, k, wavelength) * Math.max(1, wavelength / rows[last]) ** slope
    }),
    range: [rows[0], rows[last]]
  }
}
