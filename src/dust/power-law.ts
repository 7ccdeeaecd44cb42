import type { PowerOpacitySpec } from '../scene/types.js'
import type { OpacityCurves } from './opacity-curves.js'

/** Absorption as a power law of wavelength; scattering with a constant albedo or a slope of its own. */
export function powerLaw(spec: PowerOpacitySpec): OpacityCurves {
  const { reference, slope, scattering } = spec
  const absorption = (wavelength: number) => reference.absorption * (wavelength / reference.wavelength) ** -slope
  const ratio = scattering.albedo / (1 - scattering.albedo)
  const scatteringSlope = scattering.slope ?? slope
  return {
    absorption,
    scattering: (wavelength) => ratio * reference.absorption * (wavelength / reference.wavelength) ** -scatteringSlope,
    asymmetry: () => scattering.asymmetry,
    range: [0, Number.POSITIVE_INFINITY],
    kinks: []
  }
}
