import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { sphericalOf } from '../grid/cells.js'
import { exponential } from '../math/exponential.js'
import { GOLDEN_STEP, SHARE_OF_STEP } from '../math/golden.js'
import { cosAzimuth } from './direction.js'
import { importanceOf } from './importance.js'
import { drawLaw } from './scatter-launch.js'
import { centralRadius2, FLIGHT_BINS, FLIGHT_STEPS, flightLookup, type ScatterMedium, scatteringOf } from './scatter-medium.js'
import { ShellLauncher } from './shell-launch.js'

const { lookup } = flightLookup()
/**
 * Working memory for the most cells that a scene may ask for. V8 knows kind, place and length of typed arrays that are constants of
 * a module, and looks up those of all others at every access.
 */
const MOST_CELLS = 10_000
const wallSquares = new Float64Array(MOST_CELLS + 1)
const extinctions = new Float64Array(MOST_CELLS)
const albedos = new Float64Array(MOST_CELLS)
const importances = new Float64Array(MOST_CELLS)
/** Parts of split packets that wait for their turn: s, b2 and weight, cell, and how many, and whether they fly on straight. */
const MOST_WAITING = 1024
const waiting = new Float64Array(MOST_WAITING * 3)
const waitingCells = new Int32Array(MOST_WAITING)
const waitingParts = new Int32Array(MOST_WAITING)
const waitingStraight = new Uint8Array(MOST_WAITING)
/**
 * Weight x importance is kept near what the packets of the source begin with, on average: below this share of it a packet plays
 * roulette, above that it is split.
 */
const ROULETTE_BELOW = 0.1
const SPLIT_ABOVE = 4
const MOST_PARTS = 32
/**
 * Longer flights, in mean free paths, are cut, and go on straight: on its way out importance may rise so far along one of them that it has
 * to be split before its end. Without it the light of a shell of optical depth 100 hangs on a few long flights.
 */
const LONGEST = 4
const flights = new Float64Array(MOST_CELLS * FLIGHT_BINS)

/**
 * Light in flight in cells of one dimension: sum of weight x path (erg/s/Hz cm) by radial cell and by the angle between the
 * flight and the radius; cells x FLIGHT_BINS. The point of a segment that decides its bin is drawn along it, so that long
 * segments are shared out without bias: at golden steps, in units of 2^-32, from a random one.
 *
 * By symmetry a packet is known by its radius and the cosine of its direction with it. Along a flight of impact parameter b and
 * path s from the closest approach, r^2 = b^2 + s^2 and the cosine is s / r. Inward and outward steps have a loop each, with
 * nothing in it but what every step needs: 1.3 times as many packets a second as one loop for all.
 *
 * Packets are split where their light comes nearer to the outside and play roulette where it goes deeper, so that as many are under way
 * at any depth (weight windows, common practice).
 */
export function tallyFlights(medium: ScatterMedium, packets: number, uniform: () => number): Float64Array {
  const { cells, asymmetry } = medium
  const squares = wallSquares
  const extinction = extinctions
  const albedo = albedos
  const tally = flights
  const bin = lookup
  const half = FLIGHT_STEPS / 2
  const unit = SHARE_OF_STEP
  const golden = GOLDEN_STEP
  const single = asymmetry.length === 1
  const starRadius2 = centralRadius2(medium)
  squares.set(sphericalOf(medium.walls).r.map((r) => r * r))
  extinction.set(medium.extinction)
  albedo.set(medium.extinction.map((value, i) => (value > 0 ? scatteringOf(medium, i) / value : 0)))
  tally.fill(0, 0, cells * FLIGHT_BINS)
  const importance = importances
  importance.set(importanceOf(medium))
  const launcher = new ShellLauncher(medium, packets, importance)

  for (let n = 0; n < packets; n++) {
    launcher.next(n, uniform)
    const { radius, mu } = launcher
    let { cell, weight } = launcher
    const { worth } = launcher
    const least = ROULETTE_BELOW * worth
    const most = SPLIT_ABOVE * worth
    let s = radius * mu
    let b2 = radius * radius * (1 - mu * mu)
    let place = (uniform() * 4294967296) | 0
    let held = 0
    for (;;) {
      let remaining = exponential(uniform())
      let straight = remaining > LONGEST
      if (straight) remaining = LONGEST
      // biome-ignore-start lint/suspicious/noConfusingLabels: flags in their place cost every step a test
      scatter: {
        gone: {
          flight: {
            while (s < 0) {
              const below = squares[cell] - b2
              const inwards = below > 0
              let next = inwards ? -Math.sqrt(below) : Math.sqrt(squares[cell + 1] - b2)
              if (!(next > s)) next = s
              let ends = false
              if (b2 < starRadius2) {
                const star = -Math.sqrt(starRadius2 - b2)
                if (star < next) {
                  next = Math.max(star, s)
                  ends = true
                }
              }
              const step = next - s
              const depth = step * extinction[cell]
              if (depth >= remaining) break flight
              place = (place + golden) | 0
              const at = s + (place >>> 0) * unit * step
              tally[((cell << 6) + bin[((half * at * Math.abs(at)) / (b2 + at * at) + half) | 0]) | 0] += weight * step
              if (ends) break gone
              remaining -= depth
              s = next
              cell = inwards ? (cell - 1) | 0 : (cell + 1) | 0
              if (cell === cells) break gone
            }
            for (;;) {
              let next = Math.sqrt(squares[cell + 1] - b2)
              if (!(next > s)) next = s
              const step = next - s
              const depth = step * extinction[cell]
              if (depth >= remaining) break flight
              place = (place + golden) | 0
              const at = s + (place >>> 0) * unit * step
              const at2 = at * at
              tally[((cell << 6) + bin[((half * at2) / (b2 + at2) + half) | 0]) | 0] += weight * step
              remaining -= depth
              s = next
              cell = (cell + 1) | 0
              if (cell === cells) break gone
            }
          }
          const step = remaining / extinction[cell]
          place = (place + golden) | 0
          const at = s + (place >>> 0) * unit * step
          tally[((cell << 6) + bin[((half * at * Math.abs(at)) / (b2 + at * at) + half) | 0]) | 0] += weight * step
          s += step
          if (!straight) weight *= albedo[cell]
          const here = weight * importance[cell]
          if (here < least) {
            if (uniform() * worth >= here) break gone
            weight *= worth / here
          } else if (here > most && held < MOST_WAITING) {
            const parts = Math.min(MOST_PARTS, here / worth + 0.5) | 0
            weight /= parts
            const top = held * 3
            waiting[top] = s
            waiting[top + 1] = b2
            waiting[top + 2] = weight
            waitingCells[held] = cell
            waitingParts[held] = parts - 1
            waitingStraight[held] = straight ? 1 : 0
            held++
          }
          break scatter
        }
        if (held === 0) break
        const last = held - 1
        s = waiting[last * 3]
        b2 = waiting[last * 3 + 1]
        weight = waiting[last * 3 + 2]
        cell = waitingCells[last]
        straight = waitingStraight[last] === 1
        if (--waitingParts[last] === 0) held = last
      }
      // biome-ignore-end lint/suspicious/noConfusingLabels: see above
      if (straight) continue
      // The radius stays; its part along the new direction is s cos(turn) + b sin(turn) cos(azimuth).
      const r2 = b2 + s * s
      const turn = sampleHenyeyGreenstein(single ? asymmetry[0] : asymmetry[drawLaw(medium, cell, uniform)], uniform())
      s = s * turn + Math.sqrt(b2 * (1 - turn * turn)) * cosAzimuth(uniform())
      b2 = Math.max(0, r2 - s * s)
    }
  }
  return tally.slice(0, cells * FLIGHT_BINS)
}
