import { drawNormal } from '../math/draw.js'
import { stream } from '../math/random.js'
import { LIGHT_SPEED } from '../units/constants.js'
import { inLight, interpolationError, type LightWeights } from './band.js'
import type { SpectrumSource } from './run-source.js'
import type { PhotometrySpec } from './types.js'
import { fluxOf } from './unit.js'

/** A flux density as an instrument records it, cgs. */
export interface Photometry {
  spec: PhotometrySpec
  /** cm; the pivot of a band. */
  wavelength: number
  observed: number
  /** The same without noise. */
  expected: number
  /** 1 sigma of the run's Monte Carlo part (as if alike at all wavelengths: an upper limit), and of the instrument's noise (0 without). */
  sigma: number
  noise: number
  /** Estimated relative error of the interpolation between the run's wavelengths. */
  bandError: number
}

/** Observes a spectrum of a run. */
export function measureFlux(
  spec: PhotometrySpec,
  { total, sigma }: SpectrumSource,
  light: LightWeights,
  seed: string
): Photometry {
  const { wavelength } = light
  const expected = inLight(light, total)
  const noise = noiseOf(spec, expected, LIGHT_SPEED / wavelength)
  return {
    spec,
    wavelength,
    expected,
    observed: noise > 0 ? expected + noise * drawNormal(stream(`${seed}/${spec.name}`)) : expected,
    sigma: inLight(light, sigma),
    noise,
    bandError: interpolationError(light, total)
  }
}

function noiseOf({ noise }: PhotometrySpec, flux: number, frequencyHz: number): number {
  if (!noise) return 0
  return noise.kind === 'relative' ? noise.level * flux : fluxOf(noise.level, frequencyHz)
}
