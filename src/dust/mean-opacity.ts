import { LIGHT_SPEED } from '../units/constants.js'
import type { OpacityCurves } from './opacity-curves.js'
import { planckNu, planckNuDerivative } from './planck.js'
import { blackbodyRange } from './wavelength-grid.js'

/** Step in ln(wavelength) of the sums: several to the narrowest bands of crystals. */
const STEP = 1e-3

/** Long waves count more in the Rosseland mean than in the power: the sums go on by this factor, for 1e-7 where opacity ~ nu^2. */
const TAIL = 1e4

export interface MeanOpacities {
  /** Of the absorption, weighted by B_nu(T), cm2/g. */
  planck: Float64Array
  /** Harmonic, of absorption + (1 - asymmetry) scattering, weighted by dB_nu/dT, cm2/g. */
  rosseland: Float64Array
}

/**
 * Planck and Rosseland means at some temperatures (K, increasing; Rybicki & Lightman 1979, sections 1.8 and 1.9; transport
 * opacity for scattering that is not isotropic: Mihalas 1978, section 2.4). By sums over equal steps of ln(nu).
 */
export function meanOpacities(law: OpacityCurves, temperatures: ArrayLike<number>): MeanOpacities {
  const [shortest] = blackbodyRange(temperatures[temperatures.length - 1])
  const longest = TAIL * blackbodyRange(temperatures[0])[1]
  const count = Math.ceil(Math.log(longest / shortest) / STEP)
  const nu = new Float64Array(count)
  const absorption = new Float64Array(count)
  const transport = new Float64Array(count)
  for (let i = 0; i < count; i++) {
    const wavelength = shortest * Math.exp((i + 0.5) * STEP)
    nu[i] = LIGHT_SPEED / wavelength
    absorption[i] = law.absorption(wavelength)
    transport[i] = absorption[i] + (1 - law.asymmetry(wavelength)) * law.scattering(wavelength)
  }
  const planck = new Float64Array(temperatures.length)
  const rosseland = new Float64Array(temperatures.length)
  for (let t = 0; t < temperatures.length; t++) {
    let [emitted, intensity, passed, flow] = [0, 0, 0, 0]
    for (let i = 0; i < count; i++) {
      const weight = nu[i] * planckNu(nu[i], temperatures[t])
      const change = nu[i] * planckNuDerivative(nu[i], temperatures[t])
      emitted += weight * absorption[i]
      intensity += weight
      passed += change / transport[i]
      flow += change
    }
    planck[t] = emitted / intensity
    rosseland[t] = flow / passed
  }
  return { planck, rosseland }
}
