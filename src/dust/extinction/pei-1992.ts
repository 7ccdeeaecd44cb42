import type { Galaxy } from '../../scene/types.js'
import type { ExtinctionCurve } from './extinction-curve.js'

/** a, l (um), b, n of each term. */
type Terms = readonly (readonly [number, number, number, number])[]

const GALAXIES = {
  'milky-way': [
    [165, 0.047, 90, 2],
    [14, 0.08, 4, 6.5],
    [0.045, 0.22, -1.95, 2],
    [0.002, 9.7, -1.95, 2],
    [0.002, 18, -1.8, 2],
    [0.012, 25, 0, 2]
  ],
  'large-magellanic-cloud': [
    [175, 0.046, 90, 2],
    [19, 0.08, 5.5, 4.5],
    [0.023, 0.22, -1.95, 2],
    [0.005, 9.7, -1.95, 2],
    [0.006, 18, -1.8, 2],
    [0.02, 25, 0, 2]
  ],
  'small-magellanic-cloud': [
    [185, 0.042, 90, 2],
    [27, 0.08, 5.5, 4],
    [0.005, 0.22, -1.95, 2],
    [0.01, 9.7, -1.95, 2],
    [0.012, 18, -1.8, 2],
    [0.03, 25, 0, 2]
  ]
} as const satisfies Record<Galaxy, Terms>

/**
 * A(lambda) / A(B) = sum a / ((lambda / l)^n + (l / lambda)^n + b) of Pei (1992, ApJ 395, 130), eq. 20 and table 4: background, far
 * ultraviolet, 2175 A, 9.7 um, 18 um and far infrared. Fitted from 0.1 um into the far infrared, taken here as 1000 um; not exactly 1 at B.
 */
export function pei1992(galaxy: Galaxy): ExtinctionCurve {
  const terms: Terms = GALAXIES[galaxy]
  return {
    ratio: (wavelength) =>
      terms.reduce((sum, [a, l, b, n]) => {
        const ratio = (wavelength * 1e4) / l
        return sum + a / (ratio ** n + ratio ** -n + b)
      }, 0),
    range: [1e-5, 0.1]
  }
}
