import { gaussLegendre } from '../math/quadrature.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { OpacityLaw } from './opacity-law.js'
import type { WavelengthGrid } from './wavelength-grid.js'

/** An opacity law averaged over the bins of a wavelength grid; one value a bin. */
export interface BinnedOpacity {
  /** cm2/g */
  absorption: Float64Array
  /** cm2/g */
  scattering: Float64Array
  /** Mean cosine, weighted by the scattering opacity. */
  asymmetry: Float64Array
}

const RULE = gaussLegendre(8)

/** Averages over frequency inside each bin, by eight-point Gauss-Legendre sums. */
export function binOpacity(law: OpacityLaw, grid: WavelengthGrid): BinnedOpacity {
  const absorption = new Float64Array(grid.count)
  const scattering = new Float64Array(grid.count)
  const asymmetry = new Float64Array(grid.count)
  for (let k = 0; k < grid.count; k++) {
    const middle = 0.5 * (LIGHT_SPEED / grid.edges[k] + LIGHT_SPEED / grid.edges[k + 1])
    for (let i = 0; i < RULE.nodes.length; i++) {
      const wavelength = LIGHT_SPEED / (middle + 0.5 * grid.widthsHz[k] * RULE.nodes[i])
      const weight = 0.5 * RULE.weights[i]
      const scattered = weight * law.scattering(wavelength)
      absorption[k] += weight * law.absorption(wavelength)
      scattering[k] += scattered
      asymmetry[k] += scattered * law.asymmetry(wavelength)
    }
    asymmetry[k] = scattering[k] > 0 ? asymmetry[k] / scattering[k] : law.asymmetry(grid.centres[k])
  }
  return { absorption, scattering, asymmetry }
}
