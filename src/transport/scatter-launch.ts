import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { sphericalOf, type Walk } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { sampleBin } from '../math/cdf.js'
import { GOLDEN } from '../math/golden.js'
import { deflect, directionInOrder, isotropicDirection } from './direction.js'
import { launchFromCell, launchFromSurface, launchInwards } from './launch.js'
import type { Polarisation } from './polarisation.js'
import { type ScatterLaunch, type ScatterMedium, scatteringOf } from './scatter-medium.js'
import { WayFromStar } from './way-from-star.js'

/** Draws the scattering law of a cell: the index into `asymmetry`. */
export function drawLaw(medium: ScatterMedium, cell: number, uniform: () => number): number {
  const last = medium.asymmetry.length - 1
  if (last === 0) return 0
  let law = 0
  let pick = uniform() * scatteringOf(medium, cell)
  while (law < last && pick >= medium.scattering[law * medium.cells + cell])
    pick -= medium.scattering[law++ * medium.cells + cell]
  return law
}

/**
 * Brings the walk to the first scattering of starlight in the column drawn, with the radial direction of the light, and
 * returns the albedo there. The walk's direction is the one before the scattering.
 */
function firstScattering(
  walk: SphericalWalk,
  medium: ScatterMedium,
  launch: Extract<ScatterLaunch, { kind: 'point-star' }>,
  u: number,
  uniform: () => number
): number {
  const { r, cosTheta, phi } = sphericalOf(medium.walls)
  const nr = r.length - 1
  const np = phi.length - 1
  const column = sampleBin(launch.columns, 0, u)
  const ip = column % np
  const it = (column - ip) / np
  const mu = cosTheta[it + 1] + uniform() * (cosTheta[it] - cosTheta[it + 1])
  const azimuth = phi[ip] + uniform() * (phi[ip + 1] - phi[ip])
  const start = column * (nr + 1)
  const depths = launch.opticalDepth
  const depth = -Math.log1p(uniform() * Math.expm1(-depths[start + nr]))
  let low = 0
  let high = nr
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (depths[start + middle] <= depth) low = middle
    else high = middle
  }
  const share = Math.min(1, (depth - depths[start + low]) / (depths[start + low + 1] - depths[start + low]))
  const radius = r[low] + share * (r[low + 1] - r[low])
  const sin = Math.sqrt(Math.max(0, 1 - mu * mu))
  const ux = sin * Math.cos(azimuth)
  const uy = sin * Math.sin(azimuth)
  walk.start(ux * radius, uy * radius, mu * radius, ux, uy, mu, low, it, ip)
  return scatteringOf(medium, walk.cell) / medium.extinction[walk.cell]
}

/** Scatters the packet where the walk stands: a new direction, and a new polarisation where there is one, by the law of the dust there. */
export function scatterHere(
  walk: Walk,
  medium: ScatterMedium,
  s: number,
  uniform: () => number,
  out: Float64Array,
  polarisation?: Polarisation
): void {
  const law = drawLaw(medium, walk.cell, uniform)
  if (polarisation) {
    polarisation.scatter(medium.tables!, law, walk, s, uniform, out)
    return
  }
  const mu = sampleHenyeyGreenstein(medium.asymmetry[law], uniform())
  const { ux, uy, uz } = walk
  deflect(out, ux, uy, uz, mu, uniform())
  walk.turn(walk.x0 + s * ux, walk.y0 + s * uy, walk.z0 + s * uz, out[0], out[1], out[2])
}

/** Starts the packets of a batch, one after another. */
export class Launcher {
  /** Power of the packet last started, erg/s/Hz: its share of all `packets`. */
  weight = 0
  /** The packet stands where starlight is scattered for the first time, not yet turned; the albedo is in its weight. */
  atScattering = false
  /** Where the packet comes from. */
  from: 'star' | 'dust' | 'ambient' = 'star'
  /** Where the even sequence of impact parameters begins; drawn when first needed. */
  private lattice = -1
  private readonly way = new WayFromStar()

  /** With `forced`, light of point stars starts where it is scattered for the first time; else at the star. */
  constructor(
    private readonly medium: ScatterMedium,
    private readonly packets: number,
    private readonly forced: boolean
  ) {}

  /**
   * Starts packet n; n chooses the source evenly among the packets of the batch, and then the direction from a star, or the cell that
   * emits, in their order: packets that follow one another meet the same cells.
   */
  next(walk: Walk, n: number, uniform: () => number, out: Float64Array): void {
    const { launch, launchTable, walls } = this.medium
    const choice = (n + uniform()) / this.packets
    const index = sampleBin(launchTable, 0, choice)
    const below = index === 0 ? 0 : launchTable.cumulative[index - 1]
    const chance = launchTable.cumulative[index] - below
    const chosen = launch[index]
    const number = Math.min((choice - below) / chance, 1 - 1e-12)
    const scale = 1 / (chance * this.packets)
    this.from = chosen.kind === 'dust' || chosen.kind === 'ambient' ? chosen.kind : 'star'
    this.atScattering = this.forced && (chosen.kind === 'point-star' || chosen.kind === 'free-star')
    if (chosen.kind === 'dust') {
      launchFromCell(walk, walls, sampleBin(chosen.cells, 0, number), uniform, out)
      this.weight = chosen.luminosity * scale
    } else if (chosen.kind === 'ambient') {
      if (this.lattice < 0) this.lattice = uniform()
      const share = launchInwards(walk, walls, (this.lattice + n * GOLDEN) % 1, uniform, out)
      this.weight = walk.cell < 0 ? 0 : chosen.luminosity * scale * share
    } else if (chosen.kind === 'sphere-star') {
      const [x, y, z] = chosen.at
      launchFromSurface(walk, x, y, z, chosen.radius, number, uniform, out)
      this.weight = chosen.luminosity * scale
    } else if (chosen.kind === 'free-star') {
      const [x, y, z] = chosen.at
      directionInOrder(out, number, uniform)
      walk.startAt(x, y, z, out[0], out[1], out[2])
      this.weight = chosen.luminosity * scale
      if (this.forced) this.weight *= this.way.scatter(walk, this.medium, uniform)
    } else if (this.forced) {
      this.weight = chosen.removed * scale * firstScattering(walk as SphericalWalk, this.medium, chosen, number, uniform)
    } else {
      isotropicDirection(out, uniform(), uniform())
      walk.startAt(0, 0, 0, out[0], out[1], out[2])
      this.weight = chosen.luminosity * scale
    }
  }
}
