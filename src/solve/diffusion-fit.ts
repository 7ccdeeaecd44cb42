import type { Model } from '../model/model.js'
import { type Conduction, setConductances, wallsOf } from './conduction.js'
import { type DiffusionFit, solveFit } from './solve-fit.js'

/** Changes of mean free paths and weights with temperature are followed by so many solutions, or until no temperature moves by CLOSE. */
const PASSES = 12
const CLOSE = 1e-4
/** The residual falls by this factor, that of deviations by this. */
const RESIDUAL = 1e-9
const ROUGH_RESIDUAL = 1e-6
/**
 * Relative error of the flux through a wall, at most 1: of light that flies farther than the mean free path, as seen in disks of absorption
 * ~ 1/wavelength, this over the depth under the surface, squared; of cells that do not resolve that depth, the fourth power of the optical
 * depth between their middles over it; and of T^4 that falls as exp(-a k) from cell k to the next, (sinh(a/2) / (a/2))^2 - 1.
 */
const NONLOCAL = 3
const CURVED = 1 / 12

/** What is known of cells beforehand. */
export interface Measured {
  /** Relative error of T^4 by cell; Infinity where there is no more than a first guess. */
  error: Float64Array
  /** Optical depth of every cell under the surface of the dust. */
  depth: Float64Array
}

/**
 * Temperatures (K, by cell) of cells in whose dust radiation diffuses, from measured ones there and known ones about them. Diffusion is
 * div((4 sigma / 3 chi) grad T^4) = 0 (Mihalas & Mihalas 1984, Foundations of Radiation Hydrodynamics, section 97), one equation for
 * each cell in `unknown`, with the flux through each of its walls conducted over the optical depth between the middles of the two
 * cells. For given neighbours it misses the T^4 of a cell by a share d that the errors of fluxes make; packets miss it by their noise s. So
 * the fluxes into a cell add up not to zero but to d / s times what its conductances make of the difference between T^4 and the measured one:
 * noise is smoothed over some (s / d)^(1/2) cells, so far that errors of diffusion of one sign would add up to s, and where
 * packets tell more than diffusion can, their answer stays.
 * `meanExtinction` gives the Rosseland mean (cm-1) of a cell at a temperature; where it is 0 nothing is conducted. Changes `temperature`,
 * whose present values at `unknown` are the measured ones.
 */
export function fitByDiffusion(
  model: Pick<Model, 'walls' | 'cells'>,
  temperature: Float64Array,
  unknown: number[],
  known: Measured,
  meanExtinction: (cell: number, temperature: number) => number
): DiffusionFit {
  const measured = temperature.map((kelvin) => kelvin ** 4)
  const guess = Float64Array.from(unknown, (cell) => measured[cell])
  // The first solution is smooth: the gradients of noise are no gradients.
  let weight = new Float64Array(unknown.length)
  const conduction = wallsOf(model, unknown)
  const involved = new Set([...unknown, ...conduction.neighbour])
  const extinction = new Float64Array(model.cells)
  for (let pass = 1; ; pass++) {
    for (const cell of involved) extinction[cell] = meanExtinction(cell, temperature[cell])
    setConductances(conduction, unknown, extinction)
    const fit = { conduction, unknown, weight }
    solveFit(fit, measured, guess, RESIDUAL)
    let moved = 0
    unknown.forEach((cell, k) => {
      if (!(guess[k] > 0)) return
      const next = guess[k] ** 0.25
      moved = Math.max(moved, Math.abs(temperature[cell] / next - 1))
      temperature[cell] = next
    })
    if ((pass > 1 && moved < CLOSE) || pass === PASSES) return fit
    weight = weights(conduction, unknown, temperature, known)
  }
}

/** What the measured T^4 of each unknown cell weighs: the errors of all fluxes into it over the noise. */
function weights(
  { first, neighbour, between, conductance }: Conduction,
  unknown: number[],
  temperature: Float64Array,
  { error, depth }: Measured
): Float64Array<ArrayBuffer> {
  return Float64Array.from(unknown, (cell, k) => {
    let missed = 0
    for (let e = first[k]; e < first[k + 1]; e++) {
      const fall = 4 * Math.log(temperature[neighbour[e]] / temperature[cell])
      const least = Math.min(depth[cell], depth[neighbour[e]])
      const share = (NONLOCAL / least) ** 2 + (between[e] / least) ** 4 + CURVED * fall * fall
      missed += conductance[e] * Math.abs(Math.expm1(fall)) * Math.min(1, share)
    }
    return missed / error[cell]
  })
}

/** Deviations of T^4 in the unknown cells, in their order, from `deviations` of T^4 by cell, measured there and known about them. */
export function fitDeviations(fit: DiffusionFit, deviations: Float64Array): Float64Array {
  return solveFit(fit, deviations, new Float64Array(fit.unknown.length), ROUGH_RESIDUAL)
}
