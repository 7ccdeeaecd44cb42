import type { Model } from '../model/model.js'
import { type Conduction, conductances } from './conduction.js'

/** Changes of the mean free path with temperature are followed by so many solutions, or until no temperature moves by CLOSE. */
const PASSES = 12
const CLOSE = 1e-4
/** The residual falls by this factor, that of deviations by this, within so many steps. */
const RESIDUAL = 1e-9
const ROUGH_RESIDUAL = 1e-6
const STEPS = 4000

/**
 * Temperatures (K, by cell) of cells in whose dust radiation diffuses, between cells whose temperatures are known: the steady state
 * div((4 sigma / 3 chi) grad T^4) = 0 (Mihalas & Mihalas 1984, Foundations of Radiation Hydrodynamics, section 97), with one
 * equation for each cell in `unknown` and the flux through each of its walls conducted over the optical depth between the middles of
 * the two cells. `meanExtinction` gives the Rosseland mean (cm-1) of a cell at a temperature; where it is 0 nothing is conducted.
 * Changes `temperature`, whose present values at `unknown` are the first guess; returns how the radiation diffuses at the end.
 */
export function fillByDiffusion(
  model: Pick<Model, 'walls' | 'cells'>,
  temperature: Float64Array,
  unknown: number[],
  meanExtinction: (cell: number, temperature: number) => number
): Conduction {
  for (let pass = 1; ; pass++) {
    const known = new Map<number, number>()
    const extinction = (cell: number) => {
      const value = known.get(cell) ?? meanExtinction(cell, temperature[cell])
      known.set(cell, value)
      return value
    }
    const conduction = conductances(model, unknown, extinction)
    const fourth = conjugateGradients(
      conduction,
      unknown,
      temperature.map((kelvin) => kelvin ** 4),
      RESIDUAL
    )
    let moved = 0
    unknown.forEach((cell, k) => {
      const next = Math.max(0, fourth[k]) ** 0.25
      if (next > 0) moved = Math.max(moved, Math.abs(temperature[cell] / next - 1))
      temperature[cell] = next
    })
    if (moved < CLOSE || pass === PASSES) return conduction
  }
}

/** Deviations of T^4 in the unknown cells, in their order, from `deviations` of T^4 by cell in the known ones about them. */
export function diffuseDeviations(conduction: Conduction, unknown: number[], deviations: Float64Array): Float64Array {
  return conjugateGradients(conduction, unknown, deviations, ROUGH_RESIDUAL)
}

/**
 * Solves for the values of the unknown cells by conjugate gradients, scaled by the diagonal (Hestenes & Stiefel 1952). `values` by cell:
 * the known ones, and the first guess of the others.
 */
function conjugateGradients(
  { first, neighbour, other, conductance }: Conduction,
  unknown: number[],
  values: Float64Array,
  smallest: number
): Float64Array {
  const n = unknown.length
  const x = Float64Array.from(unknown, (cell) => values[cell])
  const diagonal = new Float64Array(n)
  const residual = new Float64Array(n)
  const direction = new Float64Array(n)
  const image = new Float64Array(n)
  for (let k = 0; k < n; k++) {
    for (let e = first[k]; e < first[k + 1]; e++) {
      diagonal[k] += conductance[e]
      residual[k] += conductance[e] * ((other[e] < 0 ? values[neighbour[e]] : x[other[e]]) - x[k])
    }
    // A cell that conducts nothing keeps its guess.
    if (!(diagonal[k] > 0)) diagonal[k] = 1
    direction[k] = residual[k] / diagonal[k]
  }
  const size = () => residual.reduce((sum, value, k) => sum + (value * value) / diagonal[k], 0)
  let now = size()
  const goal = smallest ** 2 * x.reduce((sum, value, k) => sum + value * value * diagonal[k], now)
  for (let step = 0; step < STEPS && now > goal; step++) {
    let bend = 0
    for (let k = 0; k < n; k++) {
      let sum = 0
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
