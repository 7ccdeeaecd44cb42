import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { sphericalOf } from '../grid/cells.js'
import { sampleBin } from '../math/cdf.js'
import { GOLDEN } from '../math/golden.js'
import { meanImportance } from './importance.js'
import { impactParameter } from './launch.js'
import { drawLaw } from './scatter-launch.js'
import { type ScatterLaunch, type ScatterMedium, scatteringOf } from './scatter-medium.js'

/** Starts the packets of a batch in cells of one dimension, one after another: light of point stars where it is first scattered. */
export class ShellLauncher {
  /** The packet last started: radial cell, radius (cm), cosine of its direction with the radius, power (erg/s/Hz). */
  cell = 0
  radius = 0
  mu = 1
  weight = 0
  /** Weight x importance of the packets of this source on average. */
  worth = 0
  /** Where the even sequence of impact parameters of ambient light begins; drawn when first needed. */
  private lattice = -1
  private readonly impact = new Float64Array(2)
  /** By source. */
  private readonly worths: number[]

  /** `importance` by radial cell. */
  constructor(
    private readonly medium: ScatterMedium,
    private readonly packets: number,
    importance: Float64Array
  ) {
    this.worths = medium.launch.map((launch) => meanImportance(launch, importance.subarray(0, medium.cells)))
  }

  /** Starts packet n; n chooses the source evenly among the packets of the batch. */
  next(n: number, uniform: () => number): void {
    const { launch, launchTable, cells } = this.medium
    const { r } = sphericalOf(this.medium.walls)
    const index = sampleBin(launchTable, 0, (n + uniform()) / this.packets)
    const chance = launchTable.cumulative[index] - (index === 0 ? 0 : launchTable.cumulative[index - 1])
    const chosen = launch[index]
    const scale = 1 / (chance * this.packets)
    this.worth = (chosen.kind === 'point-star' ? chosen.removed : chosen.luminosity) * scale * this.worths[index]
    if (chosen.kind === 'point-star') this.scatter(chosen, scale, uniform)
    else if (chosen.kind === 'ambient') {
      if (this.lattice < 0) this.lattice = uniform()
      const { impact } = this
      impactParameter(impact, r[cells], r[1], (this.lattice + n * GOLDEN) % 1)
      this.cell = cells - 1
      this.radius = r[cells]
      this.mu = -Math.sqrt(1 - (impact[0] / r[cells]) ** 2)
      this.weight = chosen.luminosity * scale * impact[1]
    } else if (chosen.kind === 'free-star') throw new TypeError('a star off the centre of shells')
    else if (chosen.kind === 'sphere-star') {
      this.radius = chosen.radius
      this.cell = 0
      while (r[this.cell + 1] <= chosen.radius && this.cell < cells - 1) this.cell++
      this.mu = Math.sqrt(uniform())
      this.weight = chosen.luminosity * scale
    } else {
      const cell = sampleBin(chosen.cells, 0, uniform())
      const inner3 = r[cell] ** 3
      this.cell = cell
      this.radius = Math.cbrt(inner3 + uniform() * (r[cell + 1] ** 3 - inner3))
      this.mu = 2 * uniform() - 1
      this.weight = chosen.luminosity * scale
    }
  }

  /**
   * Straight from the star to the first scattering, which is certain: half of them at depths as nature has them, half evenly deep, so
   * that dust that little light reaches is not left dark. The weight sets that right, and is twice nature's at most (composite biasing,
   * Baes et al. 2016, A&A 590, A55).
   */
  private scatter(star: Extract<ScatterLaunch, { kind: 'point-star' }>, scale: number, uniform: () => number): void {
    const { medium } = this
    const { cells, extinction, asymmetry } = medium
    const { r } = sphericalOf(medium.walls)
    const depths = star.opticalDepth
    const all = depths[cells]
    const caught = -Math.expm1(-all)
    const u = 2 * uniform()
    const depth = u < 1 ? -Math.log1p(-u * caught) : (u - 1) * all
    const favour = 2 / (1 + (caught * Math.exp(depth)) / all)
    let cell = 0
    let high = cells
    while (high - cell > 1) {
      const middle = (cell + high) >> 1
      if (depths[middle] <= depth) cell = middle
      else high = middle
    }
    const share = Math.min(1, (depth - depths[cell]) / (depths[cell + 1] - depths[cell]))
    this.cell = cell
    this.radius = r[cell] + share * (r[cell + 1] - r[cell])
    this.weight = (star.removed * scale * favour * scatteringOf(medium, cell)) / extinction[cell]
    this.mu = sampleHenyeyGreenstein(asymmetry[drawLaw(medium, cell, uniform)], uniform())
  }
}
