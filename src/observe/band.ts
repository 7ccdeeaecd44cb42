import { bracket, interpolateLinear } from '../math/interp.js'
import { gaussLegendre } from '../math/quadrature.js'
import type { LightSpec } from './types.js'

const RULE = gaussLegendre(6)

/** How the values at a model's wavelengths make one observed value. */
export interface LightWeights {
  /** One a wavelength; their sum is 1. */
  weights: Float64Array
  /** The same from every second wavelength inside the band: what they differ by tells the error of interpolation. */
  coarse: Float64Array
  /** Pivot wavelength, cm. */
  wavelength: number
}

/** Relative error of interpolation above which it is told. */
export const MOST_BAND_ERROR = 0.01

/** Why a model cannot give what is wanted. */
export class LightError extends Error {}

/**
 * Weights of a model's wavelengths (cm, increasing) for one wavelength or a band. The mean flux density of a band is
 * int F_nu R dnu/nu / int R dnu/nu for a response R a photon, int F_nu R dnu / int R dnu for a response an energy
 * (Bessell & Murphy 2012, PASP 124, 140, section 2 and appendix); F_nu is straight in ln(wavelength) between wavelengths, R in
 * wavelength. Throws a LightError where the model does not reach.
 */
export function lightWeights(
  light: LightSpec,
  wavelengths: ArrayLike<number>,
  shown: (wavelength: number) => string
): LightWeights {
  if (light.kind === 'line') {
    const k = Array.from(wavelengths).findIndex((wavelength) => Math.abs(wavelength / light.wavelength - 1) < 1e-6)
    if (k < 0) throw new LightError(`not a wavelength of the model; there are ${Array.from(wavelengths, shown).join(', ')}`)
    const weights = new Float64Array(wavelengths.length)
    weights[k] = 1
    return { weights, coarse: weights, wavelength: wavelengths[k] }
  }
  const [from, to] = reach(light)
  const [first, last] = [wavelengths[0], wavelengths[wavelengths.length - 1]]
  const slack = 1e-9
  if (wavelengths.length < 2 || from < first * (1 - slack) || to > last * (1 + slack))
    throw new LightError(
      `the band reaches from ${shown(from)} to ${shown(to)}, the wavelengths of the model from ${shown(first)} to ${shown(last)}`
    )
  const all = Array.from(wavelengths)
  const inside = all.filter((wavelength) => wavelength > from && wavelength < to)
  const halved = all.filter((wavelength) => !(inside.indexOf(wavelength) % 2 === 0))
  const weights = bandWeights(light, all)
  const sparse = bandWeights(light, halved)
  const coarse = new Float64Array(all.length)
  halved.forEach((wavelength, i) => {
    coarse[all.indexOf(wavelength)] = sparse[i]
  })
  return { weights, coarse, wavelength: pivot(light) }
}

/** Values at a model's wavelengths, seen in a light. */
export function inLight({ weights }: Pick<LightWeights, 'weights'>, values: ArrayLike<number>): number {
  return weights.reduce((sum, weight, k) => sum + weight * values[k], 0)
}

/** Estimated relative error of that, for values between which too few lie; halving the step takes three quarters of the error away. */
export function interpolationError(
  { weights, coarse }: Pick<LightWeights, 'weights' | 'coarse'>,
  values: ArrayLike<number>
): number {
  const seen = inLight({ weights }, values)
  return seen > 0 ? Math.abs(inLight({ weights: coarse }, values) - seen) / 3 / seen : 0
}

type Band = Extract<LightSpec, { kind: 'band' }>

/** Ends of the wavelengths at which a band responds. */
function reach({ wavelength, response }: Band): [number, number] {
  const lit = Array.from(response.keys()).filter((i) => response[i] > 0)
  return [wavelength[Math.max(0, lit[0] - 1)], wavelength[Math.min(response.length - 1, lit[lit.length - 1] + 1)]]
}

function bandWeights(band: Band, nodes: number[]): Float64Array {
  const weights = new Float64Array(nodes.length)
  const power = band.weighting === 'photon' ? -1 : -2
  let all = 0
  eachPoint(band, nodes, (wavelength, response, step) => {
    const part = response * wavelength ** power * step
    const k = bracket(nodes, wavelength)
    const share = Math.log(wavelength / nodes[k]) / Math.log(nodes[k + 1] / nodes[k])
    weights[k] += part * (1 - share)
    weights[k + 1] += part * share
    all += part
  })
  return weights.map((weight) => weight / all)
}

/** Square root of int R lambda dlambda / int R dlambda/lambda, R a photon (Koornneef et al. 1986, Highlights of Astronomy 7, 833). */
function pivot(band: Band): number {
  const power = band.weighting === 'photon' ? 0 : -1
  let above = 0
  let below = 0
  eachPoint(band, [], (wavelength, response, step) => {
    const photons = response * wavelength ** power * step
    above += photons * wavelength
    below += photons / wavelength
  })
  return Math.sqrt(above / below)
}

/** Points of Gauss-Legendre sums over wavelength, between which neither the response nor the model (`nodes`) bends. */
function eachPoint(band: Band, nodes: number[], take: (wavelength: number, response: number, step: number) => void): void {
  const [from, to] = reach(band)
  const bends = [...band.wavelength, ...nodes].filter((wavelength) => wavelength >= from && wavelength <= to)
  const sorted = [...new Set([from, ...bends, to])].sort((a, b) => a - b)
  for (let i = 1; i < sorted.length; i++) {
    const half = 0.5 * (sorted[i] - sorted[i - 1])
    RULE.nodes.forEach((node, j) => {
      const wavelength = 0.5 * (sorted[i] + sorted[i - 1]) + half * node
      take(wavelength, interpolateLinear(band.wavelength, band.response, wavelength), RULE.weights[j] * half)
    })
  }
}
