import type { ModelResult } from '../folder/model-result.js'
import type { DataSet } from '../types.js'

/** How a model compares with measured fluxes; NaN without the model. */
export interface Comparison {
  /** Sum of (model - data)^2 / (sigma_data^2 + sigma_model^2). */
  chiSquared: number
  /** -2 ln of the likelihood, but for a constant of the data: chi squared + sum of ln(1 + sigma_model^2 / sigma_data^2). */
  deviance: number
  /** Mean share of the Monte Carlo error in the variance. */
  noiseShare: number
}

/** Compares a model with a data set; errors of both are taken to be Gaussian and independent. */
export function compareWith({ spectrum, wavelengths, fluxJy, sigmaJy }: DataSet, result: ModelResult | undefined): Comparison {
  const model = result?.spectra.find(({ name }) => name === spectrum)
  if (!model) return { chiSquared: Number.NaN, deviance: Number.NaN, noiseShare: Number.NaN }
  const comparison = { chiSquared: 0, deviance: 0, noiseShare: 0 }
  // The model has the wavelengths of the data, each once, in the same order.
  let k = -1
  wavelengths.forEach((wavelength, i) => {
    if (wavelength !== wavelengths[i - 1]) k++
    const [ofData, ofModel] = [sigmaJy[i] ** 2, model.sigma[k] ** 2]
    comparison.chiSquared += (model.flux[k] - fluxJy[i]) ** 2 / (ofData + ofModel)
    comparison.deviance += Math.log1p(ofModel / ofData)
    comparison.noiseShare += ofModel / (ofData + ofModel) / wavelengths.length
  })
  comparison.deviance += comparison.chiSquared
  return comparison
}
