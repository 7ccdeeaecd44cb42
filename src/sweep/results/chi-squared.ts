import { type Goodness, goodness } from '../../compare/goodness.js'
import type { ModelResult } from '../folder/model-result.js'
import type { DataSet } from '../types.js'

/** Compares a model with measured fluxes; NaN without the model. */
export function compareWith({ spectrum, wavelengths, fluxJy, sigmaJy }: DataSet, result: ModelResult | undefined): Goodness {
  const model = result?.spectra.find(({ name }) => name === spectrum)
  if (!model) return { chiSquared: Number.NaN, deviance: Number.NaN, noiseShare: Number.NaN }
  // The model has the wavelengths of the data, each once, in the same order.
  let k = -1
  const at = wavelengths.map((wavelength, i) => (wavelength === wavelengths[i - 1] ? k : ++k))
  const ofRows = (values: ArrayLike<number>) => at.map((place) => values[place])
  return goodness({ values: fluxJy, sigma: sigmaJy }, { values: ofRows(model.flux), sigma: ofRows(model.sigma) })
}
