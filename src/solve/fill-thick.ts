import { coolingSlope } from '../dust/emission.js'
import type { Model } from '../model/model.js'
import type { EquilibriumMedium } from '../transport/equilibrium-medium.js'
import { buriedCells } from './buried-cells.js'
import { fitByDiffusion, fitDeviations } from './diffusion-fit.js'
import type { DustTemperatures } from './dust-temperatures.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'
import { GROUPS } from './groups.js'
import type { ThickCells } from './thick-cells.js'

/**
 * In cells buried in thick dust, puts what packets tell of temperatures together with the diffusion of radiation between the cells; the
 * deviations of the groups, and so the 1 sigma, follow. Cells that no packet reached get theirs from their surroundings.
 */
export function fillThick({ medium, tables }: EquilibriumSetup, model: Model, thick: ThickCells, dust: DustTemperatures): void {
  const { cells, components, density, emissionRow } = medium
  const { temperature, sigma, slope, deviation } = dust
  const measured = new Float64Array(cells)
  const error = new Float64Array(cells)
  const extinction = new Float64Array(cells)
  for (let cell = 0; cell < cells; cell++) {
    let mass = 0
    let fourth = 0
    let solved = true
    for (let at = cell; at < components * cells; at += cells) {
      if (!(density[at] > 0)) continue
      solved &&= emissionRow[at] >= 0
      if (!(temperature[at] > 0)) continue
      mass += density[at]
      fourth += density[at] * temperature[at] ** 4
      error[cell] = Math.max(error[cell], sigma[at] >= 0 ? (4 * sigma[at]) / temperature[at] : Number.POSITIVE_INFINITY)
    }
    if (!(mass > 0)) continue
    measured[cell] = (fourth / mass) ** 0.25
    if (solved) extinction[cell] = thick.meanExtinction(cell, measured[cell])
  }
  const { buried, depth } = buriedCells(model, extinction)
  if (buried.length === 0) return
  const common = measured.slice()
  const fit = fitByDiffusion(model, common, buried, { error, depth }, (cell, kelvin) =>
    extinction[cell] > 0 ? thick.meanExtinction(cell, kelvin) : 0
  )
  const squares = new Float64Array(components * cells)
  for (let group = 0; group < GROUPS; group++) {
    const deviations = fourthDeviations(medium, dust, group)
    fitDeviations(fit, deviations).forEach((value, k) => {
      const cell = buried[k]
      const fitted = value / common[cell] ** 4
      const moved = fitted - deviations[cell] / measured[cell] ** 4
      for (let at = cell; at < components * cells; at += cells) {
        if (!(temperature[at] > 0)) continue
        const known = sigma[at] >= 0
        if (!known) slope[at] = coolingSlope(tables[Math.floor(at / cells)], common[cell])
        // What a component differs by from all dust of its cell stays.
        const relative = known ? (4 / slope[at]) * deviation[at * GROUPS + group] + moved : fitted
        deviation[at * GROUPS + group] = 0.25 * slope[at] * relative
        squares[at] += relative * relative
      }
    })
  }
  for (const cell of buried) {
    for (let at = cell; at < components * cells; at += cells) {
      if (!(temperature[at] > 0)) continue
      temperature[at] = sigma[at] >= 0 ? (temperature[at] * common[cell]) / measured[cell] : common[cell]
      sigma[at] = 0.25 * Math.sqrt(squares[at] / (GROUPS * (GROUPS - 1))) * temperature[at]
    }
  }
}

/** Deviation of a group from the T^4 of each cell, the mean over the mass of its dust. */
function fourthDeviations(
  { components, cells, density }: Pick<EquilibriumMedium, 'components' | 'cells' | 'density'>,
  { temperature, slope, deviation }: DustTemperatures,
  group: number
): Float64Array {
  const sum = new Float64Array(cells)
  const mass = new Float64Array(cells)
  for (let at = 0; at < components * cells; at++) {
    const cell = at % cells
    mass[cell] += density[at]
    if (slope[at] > 0) sum[cell] += (density[at] * 4 * temperature[at] ** 4 * deviation[at * GROUPS + group]) / slope[at]
  }
  return sum.map((value, cell) => (mass[cell] > 0 ? value / mass[cell] : 0))
}
