import type { Scene } from '../scene/types.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { Model } from './model.js'

/** Every wavelength of the cameras and spectra, cm, each once, increasing. */
export function observedWavelengths(scene: Scene): number[] {
  const all = [...scene.cameras, ...scene.spectra].flatMap(({ wavelengths }) => wavelengths)
  return [...new Set(all)].sort((a, b) => a - b)
}

/** Where dust emits, cm: for scenes with neither stars nor cameras. */
const TYPICAL = 10e-4

/** Wavelengths at which optical depths have to be resolved: where stars and fields put their energy, or else those observed. */
export function mattering(scene: Scene, stars: Model['stars'], fields: Model['fields']): number[] {
  const wavelengths = [
    ...stars.map(({ spectrum: { range, luminosityNu } }) => peak(range, luminosityNu)),
    ...fields.map(({ spectrum: { range, intensityNu } }) => peak(range, intensityNu))
  ]
  if (wavelengths.length > 0) return wavelengths.flatMap((best) => [best / 2, best])
  const observed = observedWavelengths(scene)
  return observed.length > 0 ? observed : [TYPICAL]
}

/** Wavelength (cm) within a range where nu times `perHz` is greatest. */
function peak([shortest, longest]: [number, number], perHz: (nu: number) => number): number {
  let best = shortest
  let most = 0
  for (let i = 0; i <= 200; i++) {
    const wavelength = shortest * (longest / shortest) ** (i / 200)
    const nu = LIGHT_SPEED / wavelength
    const power = nu * perHz(nu)
    if (power > most) {
      most = power
      best = wavelength
    }
  }
  return best
}
