import { coolingOf } from '../dust/emission.js'
import { planckNuDerivative } from '../dust/planck.js'
import { isOctree } from '../grid/cells.js'
import { cubeVolumes } from '../grid/octree/octree.js'
import type { Model } from '../model/model.js'
import { LEAST_DEPTH } from '../transport/random-walk.js'
import { LIGHT_SPEED, STEFAN_BOLTZMANN } from '../units/constants.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'

/** Temperatures at which the weights of the Rosseland mean are known, evenly in the logarithm. */
const ROWS = 60
const COLDEST = 3
const HOTTEST = 3000

/**
 * Writes what the modified random walk needs of the cells that are thick to their own radiation at the present temperatures:
 * the Rosseland mean of the transport extinction, absorption + (1 - g) scattering, cm-1 (0 for all other cells), and the Planck
 * mean absorption opacity of every component, cm2/g.
 */
export class ThickCells {
  /** ROWS x bins: share of a bin in int dB/dT d(nu). */
  private readonly weights: Float64Array
  /** components x bins, cm2/g. */
  private readonly transport: Float64Array
  /** Half the smallest extent of every cell, cm. */
  private readonly size: Float64Array
  private readonly largest: number[]

  constructor(
    model: Model,
    private readonly setup: EquilibriumSetup
  ) {
    const { medium, grid } = setup
    const { bins, components } = medium
    this.weights = new Float64Array(ROWS * bins)
    for (let row = 0; row < ROWS; row++) {
      let sum = 0
      for (let k = 0; k < bins; k++) {
        const weight = planckNuDerivative(LIGHT_SPEED / grid.centres[k], temperatureAt(row)) * grid.widthsHz[k]
        this.weights[row * bins + k] = weight
        sum += weight
      }
      for (let k = 0; k < bins; k++) this.weights[row * bins + k] /= sum
    }
    this.transport = medium.extinction.map((value, i) => value - medium.asymmetry[i] * (value - medium.absorption[i]))
    this.largest = Array.from({ length: components }, (_, c) =>
      this.transport.subarray(c * bins, (c + 1) * bins).reduce((a, b) => Math.max(a, b), 0)
    )
    this.size = halfExtents(model)
  }

  /** Updates the medium for new temperatures (K; components x cells). */
  update(temperature: Float64Array): void {
    const { medium, tables } = this.setup
    const { cells, components, density, rosseland, planck, emissionRow } = medium
    rosseland.fill(0)
    for (let cell = 0; cell < cells; cell++) {
      let most = 0
      let solved = true
      let hottest = 0
      for (let c = 0; c < components; c++) {
        const at = c * cells + cell
        most += density[at] * this.largest[c]
        if (!(density[at] > 0)) continue
        solved &&= emissionRow[at] >= 0
        hottest = Math.max(hottest, temperature[at])
      }
      if (!solved || most * this.size[cell] < LEAST_DEPTH || hottest === 0) continue
      const mean = this.meanExtinction(cell, hottest)
      if (this.size[cell] * mean < LEAST_DEPTH) continue
      rosseland[cell] = mean
      for (let c = 0; c < components; c++) {
        const at = c * cells + cell
        const here = temperature[at]
        planck[at] = here > 0 ? (Math.PI * coolingOf(tables[c], here)) / (STEFAN_BOLTZMANN * here ** 4) : 0
      }
    }
  }

  /** Rosseland mean of the transport extinction of a cell at a temperature (K), cm-1; 0 without dust. */
  meanExtinction(cell: number, temperature: number): number {
    const { cells, components, bins, density } = this.setup.medium
    const position = (Math.log(temperature / COLDEST) / Math.log(HOTTEST / COLDEST)) * (ROWS - 1)
    const row = Math.min(ROWS - 1, Math.max(0, Math.round(position)))
    let inverse = 0
    for (let k = 0; k < bins; k++) {
      let extinction = 0
      for (let c = 0; c < components; c++) extinction += density[c * cells + cell] * this.transport[c * bins + k]
      inverse += this.weights[row * bins + k] / extinction
    }
    return 1 / inverse
  }

  /** Optical depth by that mean over half the smallest extent of a cell. */
  halfDepth(cell: number, temperature: number): number {
    return this.size[cell] * this.meanExtinction(cell, temperature)
  }
}

function temperatureAt(row: number): number {
  return COLDEST * (HOTTEST / COLDEST) ** (row / (ROWS - 1))
}

/** Half the smallest extent of every cell, cm: no point of a cell is farther from all of its walls. */
function halfExtents({ walls, cells }: Model): Float64Array {
  if (isOctree(walls)) return cubeVolumes(walls, new Float64Array(cells)).map((volume) => 0.5 * Math.cbrt(volume))
  const { r, cosTheta, phi } = walls
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  const size = new Float64Array(cells)
  size[0] = r[1]
  for (let cell = 1; cell < cells; cell++) {
    const ip = (cell - 1) % np
    const it = ((cell - 1 - ip) / np) % nt
    const ir = 1 + Math.floor((cell - 1) / (np * nt))
    let extent = r[ir + 1] - r[ir]
    if (nt > 1) extent = Math.min(extent, r[ir + 1] * (Math.acos(cosTheta[it + 1]) - Math.acos(cosTheta[it])))
    if (np > 1) extent = Math.min(extent, r[ir + 1] * (phi[ip + 1] - phi[ip]))
    size[cell] = 0.5 * extent
  }
  return size
}
