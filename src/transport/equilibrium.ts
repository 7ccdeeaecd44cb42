import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { cosineAt, drawPlace } from '../dust/scattering-tables.js'
import { openWalk } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { sampleBin } from '../math/cdf.js'
import { GOLDEN } from '../math/golden.js'
import { meetDust } from './central-launch.js'
import { deflect, directionInOrder, isotropicDirection } from './direction.js'
import type { EquilibriumMedium } from './equilibrium-medium.js'
import { launchFromCell, launchFromSurface, launchInwards } from './launch.js'
import { diffuse } from './random-walk.js'
import { pathToStar, spheresOf } from './star-spheres.js'

export interface EquilibriumTally {
  /** components x cells: sum of energy x path x absorption opacity, cm3/g; energies in units of the mean of all packets. */
  absorbed: Float64Array
  /** Energies: sent out, and where they went. */
  emitted: number
  escaped: number
  returned: number
  kept: number
  /** Absorptions and scatterings outside the random walk. */
  interactions: number
}

/**
 * Follows packets from the sources until they leave. Every cell crossed gains energy x path x absorption opacity
 * (Lucy 1999, A&A 344, 282); an absorbed packet is emitted again at once by the same dust, with a wavelength drawn from
 * kappa_abs B(T) of the temperature given (Bjorkman & Wood 2001, ApJ 554, 615, without their correction: T comes from the
 * round before). Inside thick cells a packet is taken by the modified random walk. The same `uniform` stream gives the same tally, bit for bit.
 */
export function propagateEnergy(medium: EquilibriumMedium, packets: number, uniform: () => number): EquilibriumTally {
  const {
    walls,
    cells,
    components,
    bins,
    density,
    absorption,
    extinction,
    asymmetry,
    lawOf,
    tables,
    emission,
    emissionRow,
    sources,
    sourceEnergy
  } = medium
  const levelsOf = medium.walk.first
  const absorbed = new Float64Array(components * cells)
  const walk = openWalk(walls)
  const direction = new Float64Array(3)
  const spheres = spheresOf(sources.flatMap((source) => (source.kind === 'star' ? [source] : [])))
  let emitted = 0
  let escaped = 0
  let returned = 0
  let kept = 0
  let interactions = 0
  // Where the even sequence of impact parameters or wavelengths begins; drawn when first needed.
  let lattice = -1

  for (let n = 0; n < packets; n++) {
    // One stratified number chooses the source and, what remains of it, the direction from a star or the cell that emits, in their order:
    // packets that follow one another meet the same cells. Else it chooses the wavelength.
    let choice = (n + uniform()) / packets
    const index = sampleBin(medium.sourceTable, 0, choice)
    const source = sources[index]
    const below = index === 0 ? 0 : medium.sourceTable.cumulative[index - 1]
    choice = Math.min((choice - below) / (medium.sourceTable.cumulative[index] - below), 1 - 1e-12)
    let energy = sourceEnergy[index]
    let bin: number
    let met = false
    if (source.kind !== 'central-stars' && lattice < 0) lattice = uniform()
    const even = (lattice + n * GOLDEN) % 1
    if (source.kind === 'ambient') {
      bin = sampleBin(source.bins, 0, choice)
      energy *= launchInwards(walk, walls, even, uniform, direction)
    } else if (source.kind === 'central-stars') {
      bin = sampleBin(source.bins, 0, choice)
      meetDust(walk as SphericalWalk, medium, source, bin, uniform)
      met = true
    } else if (source.kind === 'star') {
      bin = sampleBin(source.bins, 0, even)
      const [x, y, z] = source.at
      if (source.radius > 0) launchFromSurface(walk, x, y, z, source.radius, choice, uniform, direction)
      else {
        directionInOrder(direction, choice, uniform)
        walk.startAt(x, y, z, direction[0], direction[1], direction[2])
      }
    } else {
      const row = Math.floor(source.row) + (uniform() < source.row - Math.floor(source.row) ? 1 : 0)
      bin = sampleBin(emission[source.component], row, even)
      launchFromCell(walk, walls, sampleBin(source.cells, 0, choice), uniform, direction)
    }

    emitted += energy
    let remaining = met ? 0 : -Math.log(uniform())
    let alive = walk.cell >= 0
    if (!alive) escaped += energy
    while (alive) {
      const cell = walk.cell
      let step = walk.toWall()
      let opacity = 0
      for (let c = 0; c < components; c++) opacity += density[c * cells + cell] * extinction[c * bins + bin]
      // A star in the way ends the flight.
      let hitsStar = false
      if (spheres.length > 0) {
        const toStar = pathToStar(walk, spheres)
        if (toStar < step) {
          step = toStar
          hitsStar = true
        }
      }
      const weighed = walk.weighed(step)
      const depth = weighed * opacity
      if (depth < remaining) {
        for (let c = 0; c < components; c++) absorbed[c * cells + cell] += energy * weighed * absorption[c * bins + bin]
        remaining -= depth
        if (hitsStar) {
          returned += energy
          alive = false
        } else if (walk.cross() < 0) {
          escaped += energy
          alive = false
        }
        continue
      }
      const flown = remaining / opacity
      for (let c = 0; c < components; c++) absorbed[c * cells + cell] += energy * flown * absorption[c * bins + bin]
      const s = walk.s + walk.stepOf(flown)
      const x = walk.x0 + s * walk.ux
      const y = walk.y0 + s * walk.uy
      const z = walk.z0 + s * walk.uz
      interactions++
      // Which component, and whether it absorbs.
      let pick = uniform() * opacity
      let c = 0
      let share = density[cell] * extinction[bin]
      while (pick >= share && c < components - 1) {
        pick -= share
        c++
        share = density[c * cells + cell] * extinction[c * bins + bin]
      }
      const absorbs = pick < density[c * cells + cell] * absorption[c * bins + bin]
      if (absorbs) {
        const row = emissionRow[c * cells + cell]
        if (row < 0) {
          kept += energy
          alive = false
          continue
        }
        const low = Math.floor(row)
        bin = sampleBin(emission[c], low + (uniform() < row - low ? 1 : 0), uniform())
        isotropicDirection(direction, uniform(), uniform())
      } else {
        const law = lawOf[c * bins + bin]
        const mu =
          law < 0 ? sampleHenyeyGreenstein(asymmetry[c * bins + bin], uniform()) : cosineAt(drawPlace(tables!, law, uniform))
        deflect(direction, walk.ux, walk.uy, walk.uz, mu, uniform())
      }
      walk.turn(x, y, z, direction[0], direction[1], direction[2])
      if (absorbs && levelsOf[cell + 1] > levelsOf[cell]) bin = diffuse(medium, walk, bin, energy, absorbed, uniform, direction)
      remaining = -Math.log(uniform())
    }
  }
  return { absorbed, emitted, escaped, returned, kept, interactions }
}
