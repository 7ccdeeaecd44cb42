import { type Allocate, allocatePrivate } from '../math/allocate.js'
import { makeSamplingTable, type SamplingTable } from '../math/cdf.js'
import { bracket } from '../math/interp.js'
import { planckBins } from './planck-bins.js'
import type { WavelengthGrid } from './wavelength-grid.js'

/**
 * Thermal emission of one kind of dust at equal steps of ln(T), as flat arrays that can be shared between threads.
 * Cooling is summed over the same bins, with the same opacities, as heating by packets: dust in a field B(T) settles at T.
 */
export interface EmissionTable {
  rows: number
  /** ln of the temperature (K) of the first row, and the step to the next. */
  lnFirst: number
  lnStep: number
  /** ln of the cooling (erg/s/g/sr) of each row; -Infinity everywhere for dust that absorbs nothing. */
  lnCooling: Float64Array
  /** One row a temperature: share of a bin in the emission. Draw with `sampleBin(table.sampling, row, u)`. */
  sampling: SamplingTable
}

const COLDEST = 1
const HOTTEST = 1e4
const ROWS = 401

/** Table for absorption opacities (cm2/g), one a bin of the grid; 401 rows from 1 K to 1e4 K. */
export function makeEmissionTable(
  absorption: Float64Array,
  grid: WavelengthGrid,
  allocate: Allocate = allocatePrivate
): EmissionTable {
  const bins = grid.count
  const lnFirst = Math.log(COLDEST)
  const lnStep = Math.log(HOTTEST / COLDEST) / (ROWS - 1)
  const lnCooling = new Float64Array(allocate(8 * ROWS))
  const weights = new Float64Array(ROWS * bins)
  for (let row = ROWS - 1; row >= 0; row--) {
    const emission = planckBins(grid, Math.exp(lnFirst + row * lnStep))
    let sum = 0
    for (let k = 0; k < bins; k++) {
      emission[k] *= absorption[k]
      sum += emission[k]
    }
    if (sum >= Number.MIN_VALUE / Number.EPSILON) {
      weights.set(emission, row * bins)
      lnCooling[row] = Math.log(sum)
    } else if (row < ROWS - 2) {
      // Too cold for a double: the spectrum of the next row, the cooling on a power law.
      weights.copyWithin(row * bins, (row + 1) * bins, (row + 2) * bins)
      lnCooling[row] = 2 * lnCooling[row + 1] - lnCooling[row + 2]
    } else {
      lnCooling[row] = Number.NEGATIVE_INFINITY
    }
  }
  if (lnCooling[ROWS - 2] === Number.NEGATIVE_INFINITY) lnCooling.fill(Number.NEGATIVE_INFINITY)
  return { rows: ROWS, lnFirst, lnStep, lnCooling, sampling: makeSamplingTable(weights, ROWS, bins, allocate) }
}

/**
 * Integral of kappa_abs B_nu(T) over frequency, erg/s/g/sr; a power law beyond the first and last row. Between rows it is the sum
 * over bins to 1e-5. That sum takes the opacity as constant in a bin, which raises it by beta (beta + 1) h^2 / 12 for
 * kappa ~ nu^beta and bins of width h in ln(nu) (1e-4 for beta = 2, h = 0.015); heating by packets is raised by as much.
 */
export function coolingOf(table: EmissionTable, temperature: number): number {
  const { rows, lnFirst, lnStep, lnCooling } = table
  if (temperature <= 0 || lnCooling[0] === Number.NEGATIVE_INFINITY) return 0
  const position = (Math.log(temperature) - lnFirst) / lnStep
  const i = Math.min(rows - 2, Math.max(0, Math.floor(position)))
  return Math.exp(cubic(lnCooling, i, position - i).value)
}

/**
 * Temperature (K) of dust that absorbs `absorbedPerGram` (erg/s/g): 4 pi coolingOf(T) = absorbedPerGram, to rounding.
 * Zero for dust that absorbs nothing.
 */
export function temperatureOf(table: EmissionTable, absorbedPerGram: number): number {
  const { lnFirst, lnStep, lnCooling } = table
  if (!(absorbedPerGram > 0) || lnCooling[0] === Number.NEGATIVE_INFINITY) return 0
  const wanted = Math.log(absorbedPerGram / (4 * Math.PI))
  const i = bracket(lnCooling, wanted)
  let t = (wanted - lnCooling[i]) / (lnCooling[i + 1] - lnCooling[i])
  for (let step = 0; step < 6; step++) {
    const { value, slope } = cubic(lnCooling, i, t)
    t -= (value - wanted) / slope
  }
  return Math.exp(lnFirst + (i + t) * lnStep)
}

/** d ln(cooling) / d ln(T): how steeply the emission of dust rises with its temperature. */
export function coolingSlope(table: EmissionTable, temperature: number): number {
  const step = 1.01
  return Math.log(coolingOf(table, temperature * step) / coolingOf(table, temperature / step)) / (2 * Math.log(step))
}

/**
 * Row whose emission spectrum belongs to a temperature (K), with a fraction, within [0, rows - 1]. A caller draws the row above
 * with that fraction as its probability, otherwise the row below.
 */
export function rowOf(table: EmissionTable, temperature: number): number {
  const position = (Math.log(temperature) - table.lnFirst) / table.lnStep
  return Math.min(table.rows - 1, Math.max(0, position))
}

/**
 * Cubic through values at equal steps, slopes by central differences (Catmull & Rom 1974), at i + t; a straight line outside.
 * `slope` is that with respect to t.
 */
function cubic(values: Float64Array, i: number, t: number): { value: number; slope: number } {
  const last = values.length - 1
  const slopeAt = (k: number) => {
    const below = Math.max(0, k - 1)
    const above = Math.min(last, k + 1)
    return (values[above] - values[below]) / (above - below)
  }
  const from = slopeAt(i)
  const to = slopeAt(i + 1)
  if (t < 0) return { value: values[i] + t * from, slope: from }
  if (t > 1) return { value: values[i + 1] + (t - 1) * to, slope: to }
  const step = values[i + 1] - values[i]
  const a = from + to - 2 * step
  const b = 3 * step - 2 * from - to
  return { value: values[i] + t * (from + t * (b + t * a)), slope: from + t * (2 * b + 3 * t * a) }
}
