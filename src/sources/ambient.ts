import { planckNu } from '../dust/planck.js'
import { blackbodyRange } from '../dust/wavelength-grid.js'
import { interpolateLogLog } from '../math/interp.js'
import { integrate } from '../math/quadrature.js'
import type { AmbientSpec, IntensityTable } from '../scene/types.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { INTERSTELLAR_BREAKS, INTERSTELLAR_COOLEST, interstellarNu } from './interstellar.js'
import type { PowerSpectrum } from './power-bins.js'

/** Isotropic light from outside the dust, as a function of frequency. */
export interface AmbientField {
  /** erg/s/cm2/sr, the integral of intensityNu. */
  intensity: number
  /** Specific intensity, erg/s/cm2/Hz/sr, at a frequency (Hz). */
  intensityNu: (nu: number) => number
  /** Wavelengths (cm) between which the field shines; a blackbody's leaves out 1e-9 of its power at each end. */
  range: [number, number]
  /** Wavelengths (cm, increasing) where the spectrum has corners or steps. */
  nodes: Float64Array
}

/** The field a scene asks for. */
export function ambientField({ spectrum, strength }: AmbientSpec): AmbientField {
  const { range, nodes, shape } = shapeOf(spectrum)
  const intensityNu = (nu: number) => strength * shape(nu)
  // In ln(nu), between the corners.
  const stops = [range[0], ...nodes.filter((node) => node > range[0] && node < range[1]), range[1]]
  let intensity = 0
  for (let i = 1; i < stops.length; i++) {
    intensity += integrate(
      (x) => Math.exp(x) * intensityNu(Math.exp(x)),
      Math.log(LIGHT_SPEED / stops[i]),
      Math.log(LIGHT_SPEED / stops[i - 1])
    )
  }
  return { intensity, intensityNu, range, nodes }
}

/** What the field sends into a sphere of `radius` (cm): 4 pi R^2 times the flux pi I, erg/s and erg/s/Hz. */
export function inflow({ intensity, intensityNu, nodes }: AmbientField, radius: number): PowerSpectrum {
  const area = 4 * Math.PI ** 2 * radius ** 2
  return { luminosity: area * intensity, luminosityNu: (nu) => area * intensityNu(nu), nodes }
}

function shapeOf(spectrum: AmbientSpec['spectrum']): Pick<AmbientField, 'range' | 'nodes'> & { shape: (nu: number) => number } {
  switch (spectrum.kind) {
    case 'blackbodies': {
      const { terms } = spectrum
      const ranges = terms.map(({ temperature }) => blackbodyRange(temperature))
      return {
        range: [Math.min(...ranges.map(([from]) => from)), Math.max(...ranges.map(([, to]) => to))],
        nodes: new Float64Array(),
        shape: (nu) => terms.reduce((sum, { temperature, dilution }) => sum + dilution * planckNu(nu, temperature), 0)
      }
    }
    case 'interstellar':
      return {
        range: [INTERSTELLAR_BREAKS[0], blackbodyRange(INTERSTELLAR_COOLEST)[1]],
        nodes: Float64Array.from(INTERSTELLAR_BREAKS),
        shape: interstellarNu
      }
    case 'table':
      return tabulated(spectrum.table)
  }
}

/** Log-log between the rows of the table, nothing beyond them. */
function tabulated({ wavelength, intensityNu }: IntensityTable) {
  const last = wavelength.length - 1
  return {
    range: [wavelength[0], wavelength[last]] as [number, number],
    nodes: wavelength,
    shape: (nu: number) => {
      const at = LIGHT_SPEED / nu
      return at < wavelength[0] || at > wavelength[last] ? 0 : interpolateLogLog(wavelength, intensityNu, at)
    }
  }
}
