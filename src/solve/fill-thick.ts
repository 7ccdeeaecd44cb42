import type { Model } from '../model/model.js'
import type { EquilibriumMedium } from '../transport/equilibrium-medium.js'
import { forEachWall } from './conduction.js'
import { diffuseDeviations, fillByDiffusion } from './diffusion-fill.js'
import type { DustTemperatures } from './dust-temperatures.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'
import { GROUPS } from './groups.js'
import type { ThickCells } from './thick-cells.js'

/**
 * A thick cell with a larger relative error of its absorbed energy (4 to 6 times that of its temperature) is solved for instead:
 * where diffusion, which misses temperatures of disks by 1 % in fine cells and 6 % in coarse ones, does better.
 */
const NOISY = 0.25
/** Least optical depth (Rosseland mean) over half a cell, and over half of every cell about it, for its radiation to diffuse. */
const DIFFUSES = 3
const DIFFUSES_ABOUT = 1

/**
 * Gives thick cells that few packets or none reached the temperatures with which radiation diffuses between their neighbours, with the
 * deviations of the groups, and so the 1 sigma, that those of the neighbours make there; where no packet came it stays unknown. A cell at
 * the surface of its dust is left as it is: it shines into the open.
 */
export function fillThick({ medium }: EquilibriumSetup, model: Model, thick: ThickCells, dust: DustTemperatures): void {
  const { cells, components, density, emissionRow } = medium
  const { temperature, sigma, slope, deviation } = dust
  const common = new Float64Array(cells)
  const uncertain: number[] = []
  for (let cell = 0; cell < cells; cell++) {
    let mass = 0
    let fourth = 0
    let error = 0
    let solved = true
    for (let at = cell; at < components * cells; at += cells) {
      if (!(density[at] > 0)) continue
      solved &&= emissionRow[at] >= 0
      if (!(temperature[at] > 0)) continue
      mass += density[at]
      fourth += density[at] * temperature[at] ** 4
      error = Math.max(error, Number.isNaN(sigma[at]) ? Number.POSITIVE_INFINITY : (slope[at] * sigma[at]) / temperature[at])
    }
    if (!(mass > 0)) continue
    common[cell] = (fourth / mass) ** 0.25
    if (!solved || error <= NOISY) continue
    if (thick.halfDepth(cell, common[cell]) > DIFFUSES) uncertain.push(cell)
  }
  const unknown = uncertain.filter((cell) => {
    let enclosed = true
    forEachWall(model.walls, cell, (beyond) => {
      enclosed &&= common[beyond] > 0 && thick.halfDepth(beyond, common[beyond]) > DIFFUSES_ABOUT
    })
    return enclosed
  })
  if (unknown.length === 0) return
  const conduction = fillByDiffusion(model, common, unknown, (cell, kelvin) =>
    kelvin > 0 ? thick.meanExtinction(cell, kelvin) : 0
  )
  for (const cell of unknown)
    for (let at = cell; at < components * cells; at += cells) if (temperature[at] > 0) temperature[at] = common[cell]
  const squares = new Float64Array(unknown.length)
  for (let group = 0; group < GROUPS; group++) {
    const known = fourthDeviations({ components, cells, density }, dust, group)
    for (const cell of unknown) known[cell] = 0
    diffuseDeviations(conduction, unknown, known).forEach((value, k) => {
      const relative = value / common[unknown[k]] ** 4
      squares[k] += relative * relative
      for (let at = unknown[k]; at < components * cells; at += cells) deviation[at * GROUPS + group] = 0.25 * slope[at] * relative
    })
  }
  unknown.forEach((cell, k) => {
    const relative = 0.25 * Math.sqrt(squares[k] / (GROUPS * (GROUPS - 1)))
    for (let at = cell; at < components * cells; at += cells) if (sigma[at] > 0) sigma[at] = relative * temperature[at]
  })
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
