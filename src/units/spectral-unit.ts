import { AB_ZERO_FLUX } from './constants.js'

/**
 * A unit in which I_nu or F_nu can be given. `Context` holds what the conversion depends on (frequency, solid angles).
 * Values go from and to cgs: erg/s/cm2/Hz/sr for intensities, erg/s/cm2/Hz for flux densities.
 */
export interface SpectralUnit<Context> {
  /** As written in scene files. */
  name: string
  /** The same unit by the rules of the FITS standard (version 4.0, section 4.3), for BUNIT, TUNITn and ECSV. */
  fits: string
  fromCgs(value: number, context: Context): number
  /** 1 sigma of the converted value, from the value and its 1 sigma in cgs. */
  sigmaFromCgs(value: number, sigma: number, context: Context): number
  toCgs(value: number, context: Context): number
  /** 1 sigma in cgs, from the value in cgs and its 1 sigma in the unit. */
  sigmaToCgs(value: number, sigma: number, context: Context): number
}

/** A unit proportional to the cgs one; `size` is the unit in cgs. */
export function linearUnit<Context>(name: string, fits: string, size: (context: Context) => number): SpectralUnit<Context> {
  return {
    name,
    fits,
    fromCgs: (value, context) => value / size(context),
    sigmaFromCgs: (_, sigma, context) => sigma / size(context),
    toCgs: (value, context) => value * size(context),
    sigmaToCgs: (_, sigma, context) => sigma * size(context)
  }
}

/** AB magnitudes of a flux density in `solidAngle` (1 for fluxes); NaN where nothing shines. */
export function magnitudeUnit<Context>(name: string, fits: string, solidAngle: number): SpectralUnit<Context> {
  return {
    name,
    fits,
    fromCgs: (value) => (value > 0 ? -2.5 * Math.log10((value * solidAngle) / AB_ZERO_FLUX) : Number.NaN),
    sigmaFromCgs: (value, sigma) => (value > 0 ? (2.5 / Math.LN10) * (sigma / value) : Number.NaN),
    toCgs: (value) => (AB_ZERO_FLUX * 10 ** (-0.4 * value)) / solidAngle,
    sigmaToCgs: (value, sigma) => (value * sigma * Math.LN10) / 2.5
  }
}
