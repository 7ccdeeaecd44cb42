import { AB_ZERO_FLUX } from '../units/constants.js'
import { fluxUnit } from '../units/flux.js'
import { type IntensityContext, intensityUnit } from '../units/intensity.js'
import { linearUnit, type SpectralUnit } from '../units/spectral-unit.js'
import type { Amount } from './types.js'

/** Counts a pixel in the time of the exposure: a unit only where an exposure defines it. */
export const COUNTS = 'counts'

/** A unit of magnitudes that count from `zero` (erg/s/cm2/Hz) instead of AB. */
function fromZero<Context>(unit: SpectralUnit<Context>, zero: number | undefined): SpectralUnit<Context> {
  if (zero === undefined || !unit.name.startsWith('mag')) return unit
  const shift = 2.5 * Math.log10(zero / AB_ZERO_FLUX)
  return {
    ...unit,
    fromCgs: (value, context) => unit.fromCgs(value, context) + shift,
    toCgs: (value, context) => unit.toCgs(value - shift, context)
  }
}

/** The intensity unit of that name; `zero` is the flux density of magnitude 0 when it is not AB. */
export function pictureUnit(name: string, zero?: number): SpectralUnit<IntensityContext> {
  return fromZero(intensityUnit(name), zero)
}

/** The flux unit of that name, likewise. */
export function photometryUnit(name: string, zero?: number): SpectralUnit<{ frequencyHz: number }> {
  return fromZero(fluxUnit(name), zero)
}

/** Counts as a unit of intensity: `countSize` is the intensity of one count in a pixel. */
export function countsUnit(countSize: number): SpectralUnit<IntensityContext> {
  return linearUnit(COUNTS, 'count', () => countSize)
}

/** An intensity in cgs. */
export function intensityOf({ number, unit }: Amount, context: IntensityContext, zero?: number): number {
  return pictureUnit(unit, zero).toCgs(number, context)
}

/** A flux density in cgs. */
export function fluxOf({ number, unit }: Amount, frequencyHz: number, zero?: number): number {
  return photometryUnit(unit, zero).toCgs(number, { frequencyHz })
}
