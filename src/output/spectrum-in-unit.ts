import type { ApertureSpectrum } from '../camera/types.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { fluxUnit } from '../units/flux.js'

/** A spectrum in the user's unit, one value a wavelength (um). */
export interface SpectrumValues {
  wavelengthUm: number[]
  total: number[]
  sigma: number[]
  direct: number[]
  emitted: number[]
  scattered: number[]
  /** Absent without ambient fields. */
  deficit?: number[]
}

/** Converts a spectrum from cgs to its own unit. */
export function spectrumInUnit(measured: ApertureSpectrum): SpectrumValues {
  const { wavelengths, unit: name } = measured.spectrum
  const unit = fluxUnit(name)
  const contexts = wavelengths.map((wavelength) => ({ frequencyHz: LIGHT_SPEED / wavelength }))
  const convert = (values: Float64Array): number[] => contexts.map((context, k) => unit.fromCgs(values[k], context))
  return {
    wavelengthUm: wavelengths.map((wavelength) => Number((wavelength * 1e4).toPrecision(15))),
    total: convert(measured.total),
    sigma: contexts.map((context, k) => unit.sigmaFromCgs(measured.total[k], measured.sigma[k], context)),
    direct: convert(measured.direct),
    emitted: convert(measured.emitted),
    scattered: convert(measured.scattered),
    ...(measured.deficit && { deficit: convert(measured.deficit) })
  }
}
