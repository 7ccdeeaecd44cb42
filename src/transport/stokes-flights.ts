import { SphericalWalk } from '../grid/walk.js'
import { ROULETTE_BELOW, SURVIVAL } from './flight.js'
import { flightBin } from './flights.js'
import { drawLaw, Launcher, scatteringOf } from './scatter-launch.js'
import { FLIGHT_BINS, type ScatterMedium } from './scatter-medium.js'
import { Stokes } from './stokes.js'

/**
 * As `tallyFlights` for laws in tables: two numbers a bin, I and Q. The plane of flight and radius stays the same along a flight, and
 * Stokes parameters refer to it, to the direction nearer to the radius outwards. By symmetry U and V are nothing on average.
 */
export function tallyStokesFlights(medium: ScatterMedium, packets: number, uniform: () => number): Float64Array {
  const { cells } = medium
  const tables = medium.tables!
  const extinction = Float64Array.from(medium.extinction)
  const squares = medium.walls.r.map((r) => r * r)
  const albedo = extinction.map((value, cell) => (value > 0 ? scatteringOf(medium, cell) / value : 0))
  const tally = new Float64Array(2 * cells * FLIGHT_BINS)
  const starRadius2 = medium.starRadius ** 2
  const golden = 0.6180339887498949
  const walk = new SphericalWalk(medium.walls)
  const launcher = new Launcher(medium, packets, true)
  const stokes = new Stokes()
  const out = new Float64Array(3)

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    stokes.clear()
    let { cell, s, b2 } = walk
    let weight = launcher.weight
    const least = ROULETTE_BELOW * weight
    let along = uniform()
    let remaining = launcher.atScattering ? 0 : -Math.log(uniform())
    let scatters = launcher.atScattering
    while (weight > 0) {
      if (scatters) {
        stokes.scatter(tables, drawLaw(medium, cell, uniform), uniform)
        const r2 = b2 + s * s
        const r = Math.sqrt(r2)
        const before = Math.min(1, Math.max(-1, s / r))
        const off = Math.sqrt(1 - before * before)
        const turn = stokes.mu
        const bend = Math.sqrt(Math.max(0, 1 - turn * turn))
        const mu = Math.min(1, Math.max(-1, before * turn + off * bend * stokes.cos))
        // The radius in the frame of the scattered light.
        stokes.refer(off * turn * stokes.cos - before * bend, -off * stokes.sin)
        s = r * mu
        b2 = r2 * (1 - mu * mu)
        remaining = -Math.log(uniform())
        scatters = false
      }
      const below = squares[cell] - b2
      const inwards = s < 0 && below > 0
      const wall = inwards ? -Math.sqrt(below) : Math.sqrt(Math.max(0, squares[cell + 1] - b2))
      let step = Math.max(0, wall - s)
      let ends = false
      if (s < 0 && b2 < starRadius2) {
        const toStar = Math.max(0, -Math.sqrt(starRadius2 - b2) - s)
        if (toStar < step) {
          step = toStar
          ends = true
        }
      }
      const depth = step * extinction[cell]
      scatters = depth >= remaining
      if (scatters) step = remaining / extinction[cell]
      along += golden
      along -= along | 0
      const at = s + along * step
      const slot = 2 * (cell * FLIGHT_BINS + flightBin(at / Math.sqrt(b2 + at * at)))
      tally[slot] += weight * step
      tally[slot + 1] += weight * step * stokes.q
      s += step
      if (scatters) {
        weight *= albedo[cell]
        if (weight < least) weight = uniform() < SURVIVAL ? weight / SURVIVAL : 0
        continue
      }
      remaining -= depth
      cell += inwards ? -1 : 1
      if (ends || cell === cells) break
    }
  }
  return tally
}
