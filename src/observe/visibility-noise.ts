import { sumOf } from '../math/stats.js'
import { pixelSrOf } from './blur.js'
import { transformed } from './fourier.js'
import { noisePlanes } from './noise-planes.js'
import type { CameraSource } from './run-source.js'

/**
 * 1 sigma of the real and imaginary parts of visibilities (the larger of the two) from the Monte Carlo noise of a run; baselines towards
 * east and north, cm. Modes go through the transform as the light does. For a run that did not keep them both extremes are added in
 * quadrature: all pixels of a wavelength alike, and all independent.
 */
export function visibilitySigma(baselines: [number, number][], source: CameraSource, weights: Float64Array): Float64Array {
  const pixelSr = pixelSrOf(source)
  const lit = Array.from(weights.keys()).filter((k) => weights[k] !== 0)
  const planes = lit.map((k) => noisePlanes(source, [k], weights).map((plane) => plane.map((value) => value * pixelSr)))
  const scatter = source.modes ? 0 : sumOf(planes.map(([flux]) => sumOf(flux.map((value) => value * value))))
  // Planes whose transforms add up before they are squared: those of a mode at all wavelengths, or else each by itself.
  const terms = source.modes
    ? planes[0].map((_, g) => lit.map((k, j) => ({ k, flux: planes[j][g] })))
    : lit.map((k, j) => [{ k, flux: planes[j][0] }])
  return Float64Array.from(baselines, ([east, north]) => {
    let [re, im] = [scatter, scatter]
    for (const term of terms) {
      const noises = term.map(({ k, flux }) =>
        transformed(flux, source, east / source.wavelengths[k], north / source.wavelengths[k])
      )
      re += sumOf(noises.map((noise) => noise.re)) ** 2
      im += sumOf(noises.map((noise) => noise.im)) ** 2
    }
    return Math.sqrt(Math.max(re, im))
  })
}
