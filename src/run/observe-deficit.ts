import { starsOnSky } from '../camera/stars-on-sky.js'
import type { Model } from '../model/model.js'
import type { Scene } from '../scene/types.js'
import type { DustLight } from '../solve/dust-light.js'
import { ambientIntensity } from '../solve/scatter-medium.js'
import { noLedger } from '../workers/ledger.js'
import { observeWavelength, type Studio } from './observe-wavelength.js'
import { observersOf } from './observers-of.js'
import { inPlaceOfFlux, inPlaceOfTotal, type Wanted } from './wanted.js'

/**
 * Ambient light of intensity I that is missing towards the observer: I (1 - exp(-tau)) through dust, all of it behind a star. That is
 * the picture of the same dust and stars if their surfaces and the source function were I everywhere, and it is made as such.
 * Returns false when it was stopped.
 */
export async function observeDeficit(model: Model, light: DustLight, wanted: Wanted[], studio: Studio): Promise<boolean> {
  const intensity = ambientIntensity(model, light.nu)
  if (intensity === 0) return true
  const { tables: _, ...unpolarised } = light
  const dark: DustLight = {
    ...unpolarised,
    scattering: new Float64Array(light.scattering.length),
    emission: light.extinction.map((value) => value * intensity),
    emissionGroups: new Float32Array(),
    beams: []
  }
  const stars = model.stars.flatMap(({ spec, spectrum }) => {
    if (spec.extent === 'point') return []
    const luminosity = 4 * (Math.PI * spec.radius!) ** 2 * intensity
    const grey = { ...spectrum, luminosityNu: () => luminosity, intensityNu: () => intensity }
    return [{ spec: { ...spec, limbDarkening: 0 }, spectrum: grey }]
  })
  const scratch = wanted.map((want) => intoDeficit(model.scene, want))
  const { indices } = observersOf(model, wanted)
  return observeWavelength({ ...model, stars }, dark, [], scratch, indices, { ...studio, ledger: noLedger })
}

/** The same product with its deficit in place of the total. */
function intoDeficit(scene: Scene, want: Wanted): Wanted {
  if (want.kind === 'spectrum') return inPlaceOfFlux(want, want.result.deficit!.subarray(want.k, want.k + 1))
  const pixels = want.images.width * want.images.height
  // Exit bins know no stars, but their deficit does.
  const stars = starsOnSky(scene, want.spec)
  return inPlaceOfTotal(want, want.images.deficit!.subarray(want.k * pixels, (want.k + 1) * pixels), stars)
}
