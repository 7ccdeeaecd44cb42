import type { Conduction } from './conduction.js'

const STEPS = 4000

/** How T^4 follows from what is measured in the cells and known about them. */
export interface DiffusionFit {
  conduction: Conduction
  unknown: number[]
  /** What the measured value of each unknown cell weighs, beside its conductances. */
  weight: Float64Array
}

/**
 * Solves for the values of the unknown cells by conjugate gradients, scaled by the diagonal (Hestenes & Stiefel 1952). `values` by cell:
 * the known and the measured ones. Changes and returns `x`, the first guess.
 */
export function solveFit(
  { conduction: { first, neighbour, other, conductance }, unknown, weight }: DiffusionFit,
  values: Float64Array,
  x: Float64Array,
  smallest: number
): Float64Array {
  const n = unknown.length
  const diagonal = new Float64Array(n)
  const residual = new Float64Array(n)
  const direction = new Float64Array(n)
  const image = new Float64Array(n)
  let goal = 0
  for (let k = 0; k < n; k++) {
    const measured = values[unknown[k]]
    diagonal[k] = weight[k]
    residual[k] = weight[k] * (measured - x[k])
    for (let e = first[k]; e < first[k + 1]; e++) {
      diagonal[k] += conductance[e]
      residual[k] += conductance[e] * ((other[e] < 0 ? values[neighbour[e]] : x[other[e]]) - x[k])
    }
    // A cell that conducts nothing keeps its guess.
    if (!(diagonal[k] > 0)) diagonal[k] = 1
    direction[k] = residual[k] / diagonal[k]
    goal += (residual[k] * residual[k]) / diagonal[k] + x[k] * x[k] * diagonal[k]
  }
  const size = () => residual.reduce((sum, value, k) => sum + (value * value) / diagonal[k], 0)
  let now = size()
  goal *= smallest ** 2
  for (let step = 0; step < STEPS && now > goal; step++) {
    let bend = 0
    for (let k = 0; k < n; k++) {
      let sum = weight[k] * direction[k]
      for (let e = first[k]; e < first[k + 1]; e++)
        sum += conductance[e] * (direction[k] - (other[e] < 0 ? 0 : direction[other[e]]))
      image[k] = sum
      bend += sum * direction[k]
    }
    if (!(bend > 0)) break
    const stride = now / bend
    for (let k = 0; k < n; k++) {
      x[k] += stride * direction[k]
      residual[k] -= stride * image[k]
    }
    const before = now
    now = size()
    for (let k = 0; k < n; k++) direction[k] = residual[k] / diagonal[k] + (now / before) * direction[k]
  }
  return x
}
