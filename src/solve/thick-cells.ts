import { rowOf } from '../dust/emission.js'
import { planckNuDerivative } from '../dust/planck.js'
import { isOctree } from '../grid/cells.js'
import { cubeVolumes } from '../grid/octree/octree.js'
import { allocateShared } from '../math/allocate.js'
import type { Model } from '../model/model.js'
import { LIGHT_SPEED } from '../units/constants.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'

/** How thick cells are to their own radiation, by the transport extinction: absorption + (1 - g) scattering. */
export class ThickCells {
  /** Half the smallest extent of every cell, cm. */
  readonly size: Float64Array
  /** Rows of the emission tables x bins: share of a bin in int dB/dT d(nu). */
  private readonly ofFlux: Float64Array
  /** components x bins, cm2/g. */
  private readonly transport: Float64Array
  private readonly largest: number[]
  /** By bin, of the cell asked for last. */
  private readonly extinction: Float64Array

  constructor(
    model: Model,
    private readonly setup: EquilibriumSetup
  ) {
    const { medium } = setup
    const { bins, components } = medium
    this.size = halfExtents(model)
    this.ofFlux = spectrumShares(setup, planckNuDerivative)
    this.transport = medium.extinction.map((value, i) => value - medium.asymmetry[i] * (value - medium.absorption[i]))
    this.largest = Array.from({ length: components }, (_, c) =>
      this.transport.subarray(c * bins, (c + 1) * bins).reduce((a, b) => Math.max(a, b), 0)
    )
    this.extinction = new Float64Array(bins)
  }

  /** Transport extinction of a cell by bin, cm-1, into `out`. */
  extinctionOf(cell: number, out: Float64Array): void {
    const { cells, components, bins, density } = this.setup.medium
    out.fill(0)
    for (let c = 0; c < components; c++) {
      const rho = density[c * cells + cell]
      if (rho > 0) for (let k = 0; k < bins; k++) out[k] += rho * this.transport[c * bins + k]
    }
  }

  /** Rosseland mean of a cell at a temperature (K), cm-1; 0 without dust. */
  meanExtinction(cell: number, temperature: number): number {
    const { bins } = this.setup.medium
    const [table] = this.setup.tables
    const position = Math.min(rowOf(table, temperature), table.rows - 1.001)
    const low = Math.floor(position) * bins
    const above = position % 1
    this.extinctionOf(cell, this.extinction)
    let inverse = 0
    for (let k = 0; k < bins; k++)
      inverse += ((1 - above) * this.ofFlux[low + k] + above * this.ofFlux[low + bins + k]) / this.extinction[k]
    return 1 / inverse
  }

  /** Optical depth by that mean over half the smallest extent of a cell. */
  halfDepth(cell: number, temperature: number): number {
    return this.size[cell] * this.meanExtinction(cell, temperature)
  }

  /** The same where the dust is most opaque: an upper limit for all temperatures. */
  mostDepth(cell: number): number {
    const { cells, components, density } = this.setup.medium
    let most = 0
    for (let c = 0; c < components; c++) most += density[c * cells + cell] * this.largest[c]
    return most * this.size[cell]
  }
}

/** Rows of the emission tables x bins: share of a bin in the integral over frequency of a function of frequency (Hz) and temperature (K). */
export function spectrumShares(
  { medium: { bins }, grid, tables: [table] }: EquilibriumSetup,
  spectrum: (nu: number, kelvin: number) => number
): Float64Array {
  const shares = new Float64Array(table.rows * bins)
  for (let row = 0; row < table.rows; row++) {
    const kelvin = Math.exp(table.lnFirst + row * table.lnStep)
    let sum = 0
    for (let k = 0; k < bins; k++) {
      const part = spectrum(LIGHT_SPEED / grid.centres[k], kelvin) * grid.widthsHz[k]
      shares[row * bins + k] = part
      sum += part
    }
    for (let k = 0; k < bins; k++) shares[row * bins + k] /= sum
  }
  return shares
}

const shared = (length: number) => new Float64Array(allocateShared(8 * length))

/** Half the smallest extent of every cell, cm: no point of a cell is farther from all of its walls. */
function halfExtents({ walls, cells }: Model): Float64Array {
  if (isOctree(walls)) {
    const size = cubeVolumes(walls, shared(cells))
    for (let cell = 0; cell < cells; cell++) size[cell] = 0.5 * Math.cbrt(size[cell])
    return size
  }
  const { r, cosTheta, phi } = walls
  const nt = cosTheta.length - 1
  const np = phi.length - 1
  const size = shared(cells)
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
