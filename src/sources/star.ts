import { planckNu } from '../dust/planck.js'
import { blackbodyRange } from '../dust/wavelength-grid.js'
import { interpolateLogLog } from '../math/interp.js'
import { integrate } from '../math/quadrature.js'
import type { SpectrumTable, StarSpec } from '../scene/types.js'
import { LIGHT_SPEED, STEFAN_BOLTZMANN } from '../units/constants.js'

/** Light of one star as a function of frequency. */
export interface StarSpectrum {
  /** erg/s, the integral of luminosityNu. */
  luminosity: number
  /** Spectral luminosity, erg/s/Hz, at a frequency (Hz). */
  luminosityNu: (nu: number) => number
  /**
   * Specific intensity, erg/s/cm2/Hz/sr, of the stellar surface seen at cosine mu from its normal, with linear limb darkening:
   * I(1) (1 - u (1 - mu)), where pi I(1) (1 - u / 3) is the flux leaving the surface (common practice). Needs a radius.
   */
  intensityNu: (nu: number, mu: number) => number
  /** Wavelengths (cm) between which the star shines; a blackbody's leaves out 1e-9 of its power at each end. */
  range: [number, number]
  /** Wavelengths (cm, increasing) of the rows of a tabulated spectrum; none for a blackbody. */
  nodes: Float64Array
}

/** The spectrum a scene asks for: a blackbody, or a table scaled so that its integral is the luminosity. */
export function starSpectrum(spec: StarSpec): StarSpectrum {
  const luminosityNu = spec.spectrum.kind === 'table' ? tabulated(spec.spectrum.table, spec.luminosity) : blackbody(spec)
  const nodes = spec.spectrum.kind === 'table' ? spec.spectrum.table.wavelength : new Float64Array()
  return {
    luminosity: spec.luminosity,
    luminosityNu,
    intensityNu: (nu, mu) => {
      const u = spec.limbDarkening
      const area = 4 * Math.PI * spec.radius! ** 2
      return (luminosityNu(nu) / (area * Math.PI * (1 - u / 3))) * (1 - u * (1 - mu))
    },
    range: spec.spectrum.kind === 'table' ? [nodes[0], nodes[nodes.length - 1]] : blackbodyRange(spec.temperature!),
    nodes
  }
}

/** L pi B_nu / (sigma T^4). */
function blackbody(spec: StarSpec): (nu: number) => number {
  const temperature = spec.temperature!
  const scale = (spec.luminosity * Math.PI) / (STEFAN_BOLTZMANN * temperature ** 4)
  return (nu) => scale * planckNu(nu, temperature)
}

/** Log-log between the rows of the table, nothing beyond them. */
function tabulated(table: SpectrumTable, luminosity: number): (nu: number) => number {
  const { wavelength, fluxNu } = table
  const last = wavelength.length - 1
  const shape = (nu: number) => {
    const at = LIGHT_SPEED / nu
    return at < wavelength[0] || at > wavelength[last] ? 0 : interpolateLogLog(wavelength, fluxNu, at)
  }
  let integral = 0
  for (let i = 0; i < last; i++) integral += integrate(shape, LIGHT_SPEED / wavelength[i + 1], LIGHT_SPEED / wavelength[i])
  return (nu) => (luminosity / integral) * shape(nu)
}
