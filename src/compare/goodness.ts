import { logNormalBelow } from '../math/normal.js'

/** Values with their 1 sigma, in one unit. */
export interface Values {
  values: ArrayLike<number>
  sigma: ArrayLike<number>
}

export interface Measured extends Values {
  /** 1 where the value is an upper limit. */
  limit?: ArrayLike<number>
}

/** How well a model agrees with data. */
export interface Goodness {
  /** Sum of the squared residuals. */
  chiSquared: number
  /** -2 ln of the likelihood, but for a constant of the data: chi-squared + sum of ln(1 + sigma_model^2 / sigma_data^2). */
  deviance: number
  /** Mean share of the Monte Carlo error in the variance. */
  noiseShare: number
}

/**
 * (data - model) / sigma, where sigma^2 is that of the data and of the model together. For an upper limit, the square root of
 * -2 ln P, P the probability of a value below the limit (cf. Sawicki 2012, PASP 124, 1208): near 0 for a model well below it.
 */
export function residual(data: number, model: number, sigma: number, isLimit: boolean): number {
  const off = (data - model) / sigma
  return isLimit ? -Math.sqrt(-2 * logNormalBelow(off)) : off
}

/**
 * Compares a model with data; errors of both are taken to be Gaussian, and that part of the values to be `independent` (less than 1
 * where errors are correlated): chi-squared and deviance count as many.
 */
export function goodness({ data, independent }: { data: Measured; independent: number }, model: Values): Goodness {
  const count = data.values.length
  const sum = { chiSquared: 0, deviance: 0, noiseShare: 0 }
  for (let i = 0; i < count; i++) {
    const [ofData, ofModel] = [data.sigma[i] ** 2, model.sigma[i] ** 2]
    const isLimit = data.limit?.[i] === 1
    sum.chiSquared += residual(data.values[i], model.values[i], Math.sqrt(ofData + ofModel), isLimit) ** 2
    if (!isLimit) sum.deviance += Math.log1p(ofModel / ofData)
    sum.noiseShare += ofModel / (ofData + ofModel) / count
  }
  return {
    chiSquared: independent * sum.chiSquared,
    deviance: independent * (sum.deviance + sum.chiSquared),
    noiseShare: sum.noiseShare
  }
}
