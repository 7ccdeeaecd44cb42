import { type Amplitudes, makeAmplitudes, writeAmplitudes } from '../../../src/dust/mie/amplitudes.js'
import { coatedSeries } from '../../../src/dust/mie/coated-series.js'
import { type Efficiencies, efficiencies } from '../../../src/dust/mie/efficiencies.js'
import { type MieSeries, makeMieSeries } from '../../../src/dust/mie/mie-series.js'
import { sphereSeries } from '../../../src/dust/mie/sphere-series.js'
import { complex } from '../../../src/math/complex.js'

export type Index = [n: number, k: number]

export function sphere(x: number, [n, k]: Index): MieSeries {
  const series = makeMieSeries(x)
  sphereSeries(series, x, n, k)
  return series
}

export function coated(xCore: number, x: number, core: Index, coat: Index): MieSeries {
  const series = makeMieSeries(x)
  coatedSeries(series, xCore, x, complex(...core), complex(...coat))
  return series
}

export const sphereEfficiencies = (x: number, index: Index): Efficiencies => efficiencies(sphere(x, index))

export function amplitudesAt(series: MieSeries, degrees: number[]): Amplitudes {
  const amplitudes = makeAmplitudes(degrees.map((angle) => Math.cos((angle * Math.PI) / 180)))
  writeAmplitudes(series, amplitudes)
  return amplitudes
}
