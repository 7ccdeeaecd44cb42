import { coolingSlope, temperatureOf } from '../dust/emission.js'
import { isOctree, reachOf, sphericalOf } from '../grid/cells.js'
import { cellCube } from '../grid/octree/octree.js'
import type { Model } from '../model/model.js'
import { forEachWall } from './conduction.js'
import { type DustTemperatures, givenTemperatures } from './dust-temperatures.js'
import type { EquilibriumSetup } from './equilibrium-medium.js'
import { fillThick } from './fill-thick.js'
import { GROUPS } from './groups.js'
import type { ThickCells } from './thick-cells.js'

/** First guess: dust warmed by stars and ambient fields, as if nothing stood between. */
export function firstGuess(model: Model, setup: EquilibriumSetup): Float64Array {
  const { components, cells, walls } = model
  const { starlight, ambient, medium } = setup
  const outer = reachOf(walls)
  const temperature = givenTemperatures(model).temperature
  const dilution = dilutions(model)
  components.forEach(({ spec, density }, c) => {
    if (spec.temperature !== 'solve') return
    let heating = 0
    let outside = 0
    for (let k = 0; k < medium.bins; k++) {
      heating += medium.absorption[c * medium.bins + k] * starlight[k]
      // 4 pi I = 4 pi (inflow) / (4 pi^2 R^2)
      outside += (medium.absorption[c * medium.bins + k] * ambient[k]) / (Math.PI * outer * outer)
    }
    for (let i = 0; i < cells; i++) {
      const guess = temperatureOf(setup.tables[c], heating * dilution[i] + outside)
      // Stars may be absent: dust of fixed temperature then does the heating, and the first round finds how much.
      if (density[i] > 0) temperature[c * cells + i] = Math.min(Math.max(guess, COOLEST), HOTTEST)
    }
  })
  return temperature
}

/** What makes flux of luminosity in the middle of every cell, cm-2: 1 / (4 pi r^2), over the stars in proportion to what they shine. */
function dilutions({ walls, cells, stars }: Model): Float64Array {
  if (!isOctree(walls)) {
    const { r, cosTheta, phi } = walls
    const angular = (cosTheta.length - 1) * (phi.length - 1)
    return Float64Array.from({ length: cells }, (_, i) => {
      const ir = i === 0 ? 0 : 1 + Math.floor((i - 1) / angular)
      return 1 / (Math.PI * (r[ir] + r[ir + 1]) ** 2)
    })
  }
  const all = stars.reduce((sum, { spectrum }) => sum + spectrum.luminosity, 0)
  const cube = new Float64Array(4)
  return Float64Array.from({ length: cells }, (_, i) => {
    const [x, y, z, length] = cellCube(walls, i, cube)
    return stars.reduce((sum, { spec: { at }, spectrum }) => {
      const distance = Math.max(0.5 * length, Math.hypot(x - at[0], y - at[1], z - at[2]))
      return sum + spectrum.luminosity / all / (4 * Math.PI * distance * distance)
    }, 0)
  })
}

const COOLEST = 3
const HOTTEST = 5000

/**
 * Temperatures from the absorbed energies of the groups of one round: 4 pi int kappa B(T) = energy absorbed per gram.
 * `absorbed`: GROUPS arrays of path x opacity sums, which together stand for `packets` packets.
 */
export function temperaturesFrom(
  model: Model,
  setup: EquilibriumSetup,
  thick: ThickCells,
  absorbed: Float64Array[],
  packets: number
): DustTemperatures {
  const { components, cells, volume } = model
  const result = givenTemperatures(model)
  const { temperature, sigma, slope } = result
  const deviation = new Float32Array(temperature.length * GROUPS)
  const perPacket = setup.luminosity / packets
  const direct = setup.central?.heating
  const symmetric = !isOctree(model.walls) && components.every(({ shape }) => shape.symmetry !== 'none')
  components.forEach(({ spec, density }, c) => {
    if (spec.temperature !== 'solve') return
    const table = setup.tables[c]
    for (let i = 0; i < cells; i++) {
      if (!(density[i] > 0)) continue
      const at = c * cells + i
      // Where cells and what is in them are the same on both sides of the midplane, each side helps the other.
      const twin = symmetric ? c * cells + mirrorCell(model, i) : at
      let sum = 0
      for (let g = 0; g < GROUPS; g++) sum += 0.5 * (absorbed[g][at] + absorbed[g][twin])
      if (!(sum > 0)) {
        sigma[at] = Number.NaN
        continue
      }
      const heating = sum * perPacket + (direct ? 0.5 * (direct[at] + direct[twin]) : 0)
      temperature[at] = temperatureOf(table, heating / volume[i])
      const scale = perPacket / heating
      let square = 0
      for (let g = 0; g < GROUPS; g++) {
        const relative = scale * (0.5 * (absorbed[g][at] + absorbed[g][twin]) * GROUPS - sum)
        deviation[at * GROUPS + g] = relative
        square += relative * relative
      }
      const relative = Math.sqrt(square / (GROUPS * (GROUPS - 1)))
      slope[at] = coolingSlope(table, temperature[at])
      sigma[at] = (temperature[at] * relative) / slope[at]
    }
    fillEmpty(model, temperature, sigma, density, c)
  })
  const dust = { temperature, sigma, deviation, slope }
  fillThick(setup, model, thick, dust)
  return dust
}

/** The cell on the other side of the midplane. */
function mirrorCell({ walls }: Model, cell: number): number {
  if (cell === 0) return 0
  const { phi, cosTheta } = sphericalOf(walls)
  const np = phi.length - 1
  const nt = cosTheta.length - 1
  const it = Math.floor((cell - 1) / np) % nt
  return cell + (nt - 1 - 2 * it) * np
}

/** Cells that no packet reached take the mean of T^4 of neighbours that have one, spreading until all have. */
function fillEmpty(model: Model, temperature: Float64Array, sigma: Float64Array, density: Float64Array, c: number): void {
  const { cells, walls } = model
  const start = c * cells
  let empty: number[] = []
  for (let i = 0; i < cells; i++)
    if (density[i] > 0 && Number.isNaN(sigma[start + i]) && temperature[start + i] === 0) empty.push(i)
  while (empty.length > 0) {
    const found: [number, number][] = []
    for (const i of empty) {
      const near: number[] = []
      forEachWall(walls, i, (beyond) => near.push(beyond))
      const known = near.map((k) => (k < 0 ? 0 : temperature[start + k])).filter((value) => value > 0)
      if (known.length > 0) found.push([i, (known.reduce((sum, value) => sum + value ** 4, 0) / known.length) ** 0.25])
    }
    if (found.length === 0) break
    for (const [i, value] of found) temperature[start + i] = value
    const done = new Set(found.map(([i]) => i))
    empty = empty.filter((i) => !done.has(i))
  }
}
