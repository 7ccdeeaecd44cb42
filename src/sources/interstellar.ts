import { planckNu } from '../dust/planck.js'
import { LIGHT_SPEED } from '../units/constants.js'

/** Wavelengths (cm) where the pieces of the field meet; it is dark below the first, the Lyman limit of hydrogen. */
export const INTERSTELLAR_BREAKS = [0.0912e-4, 0.11e-4, 0.134e-4, 0.246e-4]
export const INTERSTELLAR_COOLEST = 3000

/** Dilution and temperature (K) of the stars beyond the last break. */
const STARS = [
  [1e-14, 7500],
  [1e-13, 4000],
  [4e-13, INTERSTELLAR_COOLEST]
]

/**
 * Mean specific intensity of starlight in the solar neighbourhood, erg/s/cm2/Hz/sr, at a frequency (Hz): Mathis, Mezger &
 * Panagia 1983 (A&A 128, 212), section 2 and table A3; coefficients recalled from memory, checked against the energy density of
 * the ultraviolet and against each other where they meet. Light of dust and of the cosmic background is not in it.
 */
export function interstellarNu(nu: number): number {
  const wavelength = LIGHT_SPEED / nu
  if (wavelength < INTERSTELLAR_BREAKS[0]) return 0
  if (wavelength >= INTERSTELLAR_BREAKS[3])
    return STARS.reduce((sum, [dilution, temperature]) => sum + dilution * planckNu(nu, temperature), 0)
  // 4 pi J_lambda per um is 1e4 times that per cm, and J_nu = J_lambda lambda^2 / c.
  return ((ultraviolet(wavelength * 1e4) * 1e4) / (4 * Math.PI)) * (wavelength ** 2 / LIGHT_SPEED)
}

/** 4 pi J_lambda, erg/s/cm2/um, at a wavelength in um. */
function ultraviolet(um: number): number {
  if (um < 0.11) return 38.57 * um ** 3.4172
  return um < 0.134 ? 2.045e-2 : 7.115e-4 * um ** -1.6678
}
