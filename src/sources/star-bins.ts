import type { WavelengthGrid } from '../dust/wavelength-grid.js'
import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { StarSpectrum } from './star.js'

const RULE = gaussLegendre(8)

/**
 * Luminosity (erg/s) in each bin of the grid, scaled so that the sum is the star's luminosity. Bins are divided at the rows of a
 * tabulated spectrum, so lines and edges narrower than a bin are kept. `makeSamplingTable` of these draws launch bins.
 */
export function starBins(star: StarSpectrum, grid: WavelengthGrid): Float64Array {
  const bins = new Float64Array(grid.count)
  let node = 0
  for (let k = 0; k < grid.count; k++) {
    let from = grid.edges[k]
    const end = grid.edges[k + 1]
    while (node < star.nodes.length && star.nodes[node] <= from) node++
    while (from < end) {
      const to = node < star.nodes.length && star.nodes[node] < end ? star.nodes[node++] : end
      bins[k] += applyRule(RULE, star.luminosityNu, LIGHT_SPEED / to, LIGHT_SPEED / from)
      from = to
    }
  }
  const sum = bins.reduce((total, part) => total + part, 0)
  return bins.map((part) => (part * star.luminosity) / sum)
}
