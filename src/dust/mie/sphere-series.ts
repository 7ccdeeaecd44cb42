import { besselRatios } from './bessel-ratios.js'
import { matchOutside } from './match-outside.js'
import { type MieSeries, seriesTerms } from './mie-series.js'

/**
 * Series of a homogeneous sphere (Mie 1908, Ann. Phys. 330, 377) of size parameter x > 0 and refractive index n + i k relative to
 * the medium around it, n > 0 or k > 0, k >= 0. Written to `series`, which must have been made for x or more; nothing is checked.
 * From x = 1e-6 to 1e5 and beyond, to about 1e-15 sqrt(terms) of the largest coefficient.
 */
export function sphereSeries(series: MieSeries, x: number, n: number, k: number): void {
  const inside = series.scratch.inside[0]
  besselRatios(n * x, k * x, seriesTerms(x), inside)
  matchOutside(series, x, n, k, inside, inside)
}
