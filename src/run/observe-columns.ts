import type { CameraImages } from '../camera/types.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import type { DustLight } from '../solve/dust-light.js'
import { noLedger } from '../workers/ledger.js'
import { observeWavelength, type Studio } from './observe-wavelength.js'
import { observersOf } from './observers-of.js'
import { inPlaceOfTotal } from './wanted.js'

/** Opacity of dust that dims nothing, cm2/g: what is left of its optical depth is lost in rounding. */
const TRANSPARENT = 1e-30

/**
 * Column density of all dust (g/cm2) in every pixel of the cameras, into their `column`: the picture of the same dust if it emitted as
 * much as it is dense and dimmed nothing, without stars to hide what lies behind, and it is made as such. Returns false when it was stopped.
 */
export async function observeColumns(
  model: Model,
  images: CameraImages[],
  studio: Pick<Studio, 'pool' | 'onDone' | 'stop'>
): Promise<boolean> {
  if (model.components.length === 0) return true
  const wanted = images.map((product) => {
    const column = new Float64Array(product.width * product.height)
    return inPlaceOfTotal({ spec: product.camera, images: product }, column, [])
  })
  const clear: Model = { ...model, stars: [] }
  const { indices } = observersOf(clear, wanted)
  if (!(await observeWavelength(clear, glowOfMass(model), [], wanted, indices, { ...studio, ledger: noLedger, name: 'columns' })))
    return false
  wanted.forEach((want, i) => {
    images[i].column = { density: want.images.total, samplingError: want.images.samplingError[0] }
  })
  return true
}

/** Dust that emits its density, in g/cm3 for erg/s/cm3/Hz/sr. */
function glowOfMass({ components, cells }: Model): DustLight {
  const shared = () => new Float64Array(allocateShared(8 * cells))
  const [emission, extinction] = [shared(), shared()]
  for (const { density } of components) for (let i = 0; i < cells; i++) emission[i] += density[i]
  for (let i = 0; i < cells; i++) extinction[i] = TRANSPARENT * emission[i]
  return {
    wavelength: Number.NaN,
    nu: Number.NaN,
    extinction,
    asymmetry: new Float64Array(),
    scattering: new Float64Array(),
    emission,
    emissionGroups: new Float32Array(),
    opticalDepth: new Float64Array(),
    beams: []
  }
}
