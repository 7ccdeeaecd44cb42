import { BOLTZMANN, LIGHT_SPEED, PLANCK } from '../units/constants.js'

/**
 * Planck function B_nu(T), erg/s/cm2/Hz/sr, at frequency nu (Hz) and temperature (K); 2 h nu^3 / c^2 / (e^x - 1), x = h nu / k T
 * (Planck 1901). To rounding for every x: zero where e^x overflows, Rayleigh-Jeans for small x; zero at nu = 0 or T = 0.
 */
export function planckNu(nu: number, temperature: number): number {
  if (nu <= 0 || temperature <= 0) return 0
  const x = (PLANCK * nu) / (BOLTZMANN * temperature)
  return ((2 * PLANCK * nu * nu) / (LIGHT_SPEED * LIGHT_SPEED)) * (nu / Math.expm1(x))
}

/** Derivative dB_nu/dT, erg/s/cm2/Hz/sr/K: B_nu x / T / (1 - e^-x). */
export function planckNuDerivative(nu: number, temperature: number): number {
  const value = planckNu(nu, temperature)
  if (value === 0) return 0
  const x = (PLANCK * nu) / (BOLTZMANN * temperature)
  return (value * x) / temperature / -Math.expm1(-x)
}
