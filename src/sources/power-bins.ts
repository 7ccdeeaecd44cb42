import type { WavelengthGrid } from '../dust/wavelength-grid.js'
import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { LIGHT_SPEED } from '../units/constants.js'

/** Power that a source sends out, or an ambient field in, as a function of frequency. */
export interface PowerSpectrum {
  /** erg/s, the integral of luminosityNu. */
  luminosity: number
  /** erg/s/Hz at a frequency (Hz). */
  luminosityNu: (nu: number) => number
  /** Wavelengths (cm, increasing) where the spectrum has corners or steps. */
  nodes: Float64Array
}

const RULE = gaussLegendre(8)

/**
 * Power (erg/s) in each bin of the grid, scaled so that the sum is the luminosity. Bins are divided at the nodes of the spectrum,
 * so lines and edges narrower than a bin are kept. `makeSamplingTable` of these draws launch bins.
 */
export function powerBins({ luminosity, luminosityNu, nodes }: PowerSpectrum, grid: WavelengthGrid): Float64Array {
  const bins = new Float64Array(grid.count)
  let node = 0
  for (let k = 0; k < grid.count; k++) {
    let from = grid.edges[k]
    const end = grid.edges[k + 1]
    while (node < nodes.length && nodes[node] <= from) node++
    while (from < end) {
      const to = node < nodes.length && nodes[node] < end ? nodes[node++] : end
      bins[k] += applyRule(RULE, luminosityNu, LIGHT_SPEED / to, LIGHT_SPEED / from)
      from = to
    }
  }
  const sum = bins.reduce((total, part) => total + part, 0)
  return bins.map((part) => (part * luminosity) / sum)
}
