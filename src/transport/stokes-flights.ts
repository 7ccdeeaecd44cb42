import { sphericalOf } from '../grid/cells.js'
import { SphericalWalk } from '../grid/walk.js'
import { exponential } from '../math/exponential.js'
import { GOLDEN_STEP, SHARE_OF_STEP } from '../math/golden.js'
import { ROULETTE_BELOW, SURVIVAL } from './flight.js'
import { drawLaw, Launcher } from './scatter-launch.js'
import { centralRadius2, FLIGHT_BINS, FLIGHT_STEPS, flightLookup, type ScatterMedium, scatteringOf } from './scatter-medium.js'
import { Stokes } from './stokes.js'

const { lookup } = flightLookup()

/**
 * As `tallyFlights` for laws in tables: two numbers a bin, I and Q. The plane of flight and radius stays the same along a flight, and
 * Stokes parameters refer to it, to the direction nearer to the radius outwards. By symmetry U and V are nothing on average.
 */
export function tallyStokesFlights(medium: ScatterMedium, packets: number, uniform: () => number): Float64Array {
  const { cells } = medium
  const tables = medium.tables!
  const bin = lookup
  const half = FLIGHT_STEPS / 2
  const extinction = Float64Array.from(medium.extinction)
  const squares = sphericalOf(medium.walls).r.map((r) => r * r)
  const albedo = extinction.map((value, cell) => (value > 0 ? scatteringOf(medium, cell) / value : 0))
  const tally = new Float64Array(2 * cells * FLIGHT_BINS)
  const starRadius2 = centralRadius2(medium)
  const unit = SHARE_OF_STEP
  const golden = GOLDEN_STEP
  const walk = new SphericalWalk(sphericalOf(medium.walls))
  const launcher = new Launcher(medium, packets, true)
  const stokes = new Stokes()
  const out = new Float64Array(3)

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    stokes.clear()
    let { cell, s, b2 } = walk
    let weight = launcher.weight
    const least = ROULETTE_BELOW * weight
    let place = (uniform() * 4294967296) | 0
    let scatters = launcher.atScattering
    packet: while (weight > 0) {
      if (scatters) {
        stokes.scatter(tables, drawLaw(medium, cell, uniform), uniform)
        const { mu: turn, cos, sin } = stokes
        const r2 = b2 + s * s
        const b = Math.sqrt(b2)
        const bend = Math.sqrt(Math.max(0, 1 - turn * turn))
        // The radius in the frame of the scattered light, times its length.
        stokes.refer(b * turn * cos - s * bend, -b * sin)
        s = s * turn + b * bend * cos
        b2 = Math.max(0, r2 - s * s)
      }
      scatters = true
      let remaining = exponential(uniform())
      const weightQ = weight * stokes.q
      for (;;) {
        const below = squares[cell] - b2
        const inwards = s < 0 && below > 0
        let next = inwards ? -Math.sqrt(below) : Math.sqrt(squares[cell + 1] - b2)
        if (!(next > s)) next = s
        let ends = false
        if (s < 0 && b2 < starRadius2) {
          const star = -Math.sqrt(starRadius2 - b2)
          if (star < next) {
            next = Math.max(star, s)
            ends = true
          }
        }
        let step = next - s
        const depth = step * extinction[cell]
        const collides = depth >= remaining
        if (collides) step = remaining / extinction[cell]
        place = (place + golden) | 0
        const at = s + (place >>> 0) * unit * step
        const slot = ((cell << 7) + 2 * bin[((half * at * Math.abs(at)) / (b2 + at * at) + half) | 0]) | 0
        tally[slot] += weight * step
        tally[slot + 1] += weightQ * step
        if (collides) {
          s += step
          break
        }
        if (ends) break packet
        remaining -= depth
        s = next
        cell = inwards ? (cell - 1) | 0 : (cell + 1) | 0
        if (cell === cells) break packet
      }
      weight *= albedo[cell]
      if (weight < least) weight = uniform() < SURVIVAL ? weight / SURVIVAL : 0
    }
  }
  return tally
}
