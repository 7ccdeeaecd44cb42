import { coolingOf, rowOf } from '../dust/emission.js'
import { planckNu } from '../dust/planck.js'
import { allocateShared } from '../math/allocate.js'
import type { WalkLevels } from '../transport/equilibrium-medium.js'
import { LEAST_DEPTH, LEVEL_SIZE, shareBeyond } from '../transport/random-walk.js'
import { STEFAN_BOLTZMANN } from '../units/constants.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'
import { spectrumShares, type ThickCells } from './thick-cells.js'

/** Optical depth of a sphere of the random walk below which light of a wavelength flies instead of walking. */
const FLIES = 1.5
/** Spheres of one level are at most so many times larger than the smallest. */
const LEVEL_RATIO = 4
/** Most flights of such light in a sphere: where there are more, little walks. */
const MOST_FLIGHTS = 1

/** Writes what the modified random walk needs of the cells in which it may run, for the temperatures with which packets are emitted. */
export class WalkWriter {
  /** Rows of the emission tables x bins: share of a bin in int B d(nu). */
  private readonly ofEnergy: Float64Array
  /** Transport extinction by bin of the cell that is written, cm-1. */
  private readonly extinction: Float64Array

  constructor(
    private readonly setup: EquilibriumSetup,
    private readonly thick: ThickCells
  ) {
    const { medium } = setup
    const { cells } = medium
    this.ofEnergy = spectrumShares(setup, planckNu)
    this.extinction = new Float64Array(medium.bins)
    const first = new Int32Array(allocateShared(4 * (cells + 1)))
    for (let cell = 0; cell < cells; cell++) {
      const depth = thick.mostDepth(cell) / LEAST_DEPTH
      first[cell + 1] = first[cell] + (depth < 1 ? 0 : 2 + Math.floor(Math.log(depth) / Math.log(LEVEL_RATIO)))
    }
    medium.walk = { first, levels: new Float64Array(allocateShared(8 * LEVEL_SIZE * first[cells])) }
  }

  /** Updates the medium for new temperatures (K; components x cells). */
  update(temperature: Float64Array): void {
    const { medium, tables } = this.setup
    const { cells, components, density, planck, emissionRow, walk } = medium
    walk.levels.fill(0)
    for (let cell = 0; cell < cells; cell++) {
      if (walk.first[cell + 1] === walk.first[cell]) continue
      let solved = true
      let hottest = 0
      for (let at = cell; at < components * cells; at += cells) {
        if (!(density[at] > 0)) continue
        solved &&= emissionRow[at] >= 0
        hottest = Math.max(hottest, temperature[at])
      }
      if (!solved || hottest === 0) continue
      for (let c = 0; c < components; c++) {
        const here = temperature[c * cells + cell]
        planck[c * cells + cell] = here > 0 ? (Math.PI * coolingOf(tables[c], here)) / (STEFAN_BOLTZMANN * here ** 4) : 0
      }
      this.write(walk, cell, hottest)
    }
  }

  /** The levels of a cell at a temperature (K), from the largest spheres down to those that are too thin to walk. */
  private write({ first, levels }: WalkLevels, cell: number, temperature: number): void {
    const { thick, ofEnergy, extinction } = this
    const { bins } = this.setup.medium
    const [table] = this.setup.tables
    thick.extinctionOf(cell, extinction)
    const position = Math.min(rowOf(table, temperature), table.rows - 1.001)
    const low = Math.floor(position) * bins
    const above = position % 1
    let radius = thick.size[cell]
    for (let at = LEVEL_SIZE * first[cell]; at < LEVEL_SIZE * first[cell + 1]; at += LEVEL_SIZE) {
      let cut = bins
      while (cut > 0 && extinction[cut - 1] * radius < FLIES) cut--
      let inverse = 0
      for (let k = 0; k < cut; k++)
        inverse += ((1 - above) * ofEnergy[low + k] + above * ofEnergy[low + bins + k]) / extinction[k]
      if (cut === 0 || radius < LEAST_DEPTH * inverse) return
      const { emitted, flying } = this.emission(cell, cut)
      const flights = (0.5 * flying * emitted) / inverse
      if (flights * radius * radius > MOST_FLIGHTS) return
      levels[at] = radius
      levels[at + 1] = (0.5 * (1 - flying)) / inverse
      levels[at + 2] = flights
      levels[at + 3] = cut
      const next = Math.max(radius / LEVEL_RATIO, LEAST_DEPTH * inverse)
      if (next > 0.9 * radius) return
      radius = next
    }
  }

  /** Planck mean of the absorption of a cell, cm-1, and the share of its emission in the bins from `cut` on. */
  private emission(cell: number, cut: number): { emitted: number; flying: number } {
    const { cells, components, density, planck, emission, emissionRow } = this.setup.medium
    let emitted = 0
    let beyond = 0
    for (let c = 0; c < components; c++) {
      const at = c * cells + cell
      const power = density[at] * planck[at]
      if (!(power > 0)) continue
      emitted += power
      beyond += power * shareBeyond(emission[c], emissionRow[at], cut)
    }
    return { emitted, flying: beyond / emitted }
  }
}
