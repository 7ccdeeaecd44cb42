import { drawNormal } from '../math/draw.js'
import { stream } from '../math/random.js'
import { extent } from '../math/stats.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { LightWeights } from './band.js'
import { type ClosurePhase, closurePhases } from './closure.js'
import { type ComplexValues, dustOf, transformed } from './fourier.js'
import type { CameraSource } from './run-source.js'
import { diskVisibility } from './star-visibility.js'
import type { VisibilitiesSpec } from './types.js'
import { fluxOf } from './unit.js'
import { type VisibilityCurve, visibilityCurve } from './visibility-curve.js'
import { visibilitySigma } from './visibility-noise.js'

/** Visibilities as an interferometer records them; one value a baseline. */
export interface Visibilities {
  spec: VisibilitiesSpec
  /** cm; the pivot of a band. */
  wavelength: number
  observed: ComplexValues
  expected: ComplexValues
  /** 1 sigma of the real and of the imaginary part: of the run's Monte Carlo part, and of the instrument's noise (0 without). */
  sigma: Float64Array
  noise: number
  closures: ClosurePhase[]
  curve: VisibilityCurve
  /** Flux density of the field: the visibility at no baseline. */
  flux: number
  /** Longest baseline in wavelengths, times the side of a pixel: above 0.5 the pixels hide what it sees. */
  coarseness: number
}

/** Observes a camera of a run with an interferometer. */
export function measureVisibilities(
  spec: VisibilitiesSpec,
  source: CameraSource,
  { weights, wavelength }: LightWeights,
  seed: string
): Visibilities {
  const { expected, sigma } = modelVisibilities(spec.baselines, source, weights)
  const noise = spec.noise ? fluxOf(spec.noise.level, LIGHT_SPEED / wavelength) : 0
  const random = stream(`${seed}/${spec.name}`)
  const noisy = (values: Float64Array) => (noise > 0 ? values.map((value) => value + noise * drawNormal(random)) : values)
  const observed = { re: noisy(expected.re), im: noisy(expected.im) }
  const [, longest] = extent(spec.baselines.map(([east, north]) => Math.hypot(east, north)))
  const shortestWave = Math.min(...source.wavelengths.filter((_, k) => weights[k] !== 0))
  const curve = visibilityCurve(source, weights, longest)
  return {
    spec,
    wavelength,
    observed,
    expected,
    sigma,
    noise,
    closures: closurePhases(spec.baselines, observed, expected, sigma, noise),
    curve,
    flux: curve.visibility[0],
    coarseness: (longest / shortestWave) * Math.max(...source.pixel)
  }
}

/** Visibilities of a camera without noise, and the 1 sigma of their real and imaginary parts; baselines towards east and north, cm. */
export function modelVisibilities(
  baselines: [number, number][],
  source: CameraSource,
  weights: Float64Array
): { expected: ComplexValues; sigma: Float64Array } {
  const expected = { re: new Float64Array(baselines.length), im: new Float64Array(baselines.length) }
  weights.forEach((weight, k) => {
    if (weight === 0) return
    const light = dustOf(source, k)
    baselines.forEach(([east, north], i) => {
      const [u, v] = [east / source.wavelengths[k], north / source.wavelengths[k]]
      const dust = transformed(light, source, u, v)
      const stars = starsAt(source, k, u, v)
      expected.re[i] += weight * (dust.re + stars.re)
      expected.im[i] += weight * (dust.im + stars.im)
    })
  })
  return { expected, sigma: visibilitySigma(baselines, source, weights) }
}

/** Stars as the disks or points they are. */
function starsAt({ stars }: CameraSource, k: number, u: number, v: number): { re: number; im: number } {
  let re = 0
  let im = 0
  for (const { east, north, radius, limbDarkening, flux } of stars) {
    const amplitude = flux[k] * diskVisibility(2 * Math.PI * Math.hypot(u, v) * radius, limbDarkening)
    const angle = -2 * Math.PI * (u * east + v * north)
    re += amplitude * Math.cos(angle)
    im += amplitude * Math.sin(angle)
  }
  return { re, im }
}
