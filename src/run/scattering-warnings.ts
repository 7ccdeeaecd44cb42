import type { DustComponent, Model } from '../model/model.js'
import { observedWavelengths } from '../model/wavelengths.js'
import { isPolarised, polarises } from '../scene/is-polarised.js'

/** What is left out of scattering laws and polarisation. */
export function scatteringWarnings({ scene, components }: Model): string[] {
  const wavelengths = observedWavelengths(scene)
  const scatters = ({ law }: DustComponent) => wavelengths.some((wavelength) => law.scattering(wavelength) > 0)
  const silent = components.filter((component) => scatters(component) && !polarises(component.law.phase))
  if (!isPolarised(scene) || silent.length === 0) return []
  return [
    `polarisation: the scattering law of ${silent.map(({ spec }) => spec.name).join(', ')} says nothing about it; light scattered there leaves unpolarised`
  ]
}
