import { sampleHenyeyGreenstein } from '../../dust/phase-function'
import { cosAzimuth } from '../../math/cos-azimuth'
import { GOLDEN_STEP } from '../../math/golden'
import { Deviate } from './exponential'
import { CELL, CELLS, Cell, drawAsymmetry, Medium } from './medium'
import { Random } from './random'
import { Segment } from './segment'
import { startBatch, startCell, startMu, startPacket, startRadius, startWeight } from './source'
import { MOST_WAITING, waitingPart } from './waiting'

export { LOG_TABLES } from './exponential'
export { CELLS, TALLY } from './medium'
export { startStream } from './random'
export { BIN_OF_FLIGHT } from './segment'

/** Where the caller may begin to lay what the batch needs. */
export function firstFree(): usize {
  return (__heap_base + 63) & ~63
}

/**
 * Weight x importance is kept near what the packets of the source begin with, on average: below this share of it a packet plays
 * roulette, above that it is split.
 */
const ROULETTE_BELOW: f64 = 0.1
const SPLIT_ABOVE: f64 = 4
const MOST_PARTS: f64 = 32
/**
 * Longer flights, in mean free paths, are cut, and go on straight: on its way out importance may rise so far along one of them that it has
 * to be split before its end. Without it the light of a shell of optical depth 100 hangs on a few long flights.
 */
const LONGEST: f64 = 4

/**
 * The packet loop of `tallyFlights` (transport/flights.ts). Inward and outward steps have a loop each, with nothing in it but what every
 * step needs. A cell is known by the place of its record.
 */
export function tallyFlights(medium: Medium): void {
  const packets = <i32>medium.packets
  const starRadius2 = medium.starRadius2
  const end = CELLS + <i32>medium.cells * CELL
  const asymmetryOfAll = load<f64>(<usize>medium.asymmetry)
  const single = medium.laws === 1
  startBatch()
  for (let n = 0; n < packets; n++) {
    const worth = startPacket(medium, n).worth
    const least = ROULETTE_BELOW * worth
    const most = SPLIT_ABOVE * worth
    let cell = CELLS + startCell * CELL
    let weight = startWeight
    let s = startRadius * startMu
    let b2 = startRadius * startRadius * (1 - startMu * startMu)
    let place = Random.whole(Random.uniform())
    let held = 0
    while (true) {
      let remaining = Deviate.exponential(Random.uniform())
      let straight = remaining > LONGEST
      if (straight) remaining = LONGEST
      let extinction: f64 = 0
      let collides = false
      let gone = false
      const b2s = f64x2.splat(b2)
      while (s < 0) {
        const inwards = changetype<Cell>(cell).square > b2
        let next: f64
        if (inwards) next = -Segment.toWall(cell, b2s)
        else next = Segment.toWall(cell + CELL, b2s)
        if (!(next > s)) next = s
        let ends = false
        if (b2 < starRadius2) {
          const star = -sqrt(starRadius2 - b2)
          if (star < next) {
            next = star > s ? star : s
            ends = true
          }
        }
        const step = next - s
        extinction = changetype<Cell>(cell).extinction
        const depth = step * extinction
        collides = depth >= remaining
        if (collides) break
        place += <u32>GOLDEN_STEP
        Segment.tally(cell, Segment.at(s, step, place), b2, weight * step)
        if (ends) {
          gone = true
          break
        }
        remaining -= depth
        s = next
        cell += inwards ? -CELL : CELL
        if (cell === end) {
          gone = true
          break
        }
      }
      if (!collides && !gone) {
        while (true) {
          let next = Segment.toWall(cell + CELL, b2s)
          if (!(next > s)) next = s
          const step = next - s
          extinction = changetype<Cell>(cell).extinction
          const depth = step * extinction
          if (depth >= remaining) break
          place += <u32>GOLDEN_STEP
          Segment.tallyOutwards(cell, Segment.at(s, step, place), b2, weight * step)
          remaining -= depth
          s = next
          cell += CELL
          if (cell === end) {
            gone = true
            break
          }
        }
      }
      if (!gone) {
        const step = remaining / extinction
        place += <u32>GOLDEN_STEP
        Segment.tally(cell, Segment.at(s, step, place), b2, weight * step)
        s += step
        if (!straight) weight *= changetype<Cell>(cell).albedo
        const here = weight * changetype<Cell>(cell).importance
        if (here < least) {
          if (Random.uniform() * worth >= here) gone = true
          else weight *= worth / here
        } else if (here > most && held < MOST_WAITING) {
          let parts = floor(here / worth + 0.5)
          if (parts > MOST_PARTS) parts = MOST_PARTS
          weight /= parts
          waitingPart(held).hold(s, b2, weight, cell, <i32>parts - 1, straight)
          held++
        }
      }
      if (gone) {
        if (held === 0) break
        const part = waitingPart(held - 1)
        s = part.s
        b2 = part.b2
        weight = part.weight
        cell = part.cell
        straight = part.straight
        part.count--
        if (part.count === 0) held--
      }
      if (straight) continue
      // The radius stays; its part along the new direction is s cos(turn) + b sin(turn) cos(azimuth).
      const r2 = b2 + s * s
      const asymmetry = single ? asymmetryOfAll : drawAsymmetry(medium, <i32>(cell - CELLS) / CELL)
      const u = Random.uniform()
      const turn = inline.always(sampleHenyeyGreenstein(asymmetry, u))
      const v = Random.uniform()
      s = s * turn + sqrt(b2 * (1 - turn * turn)) * inline.always(cosAzimuth(v))
      b2 = r2 - s * s
      if (!(b2 > 0)) b2 = 0
    }
  }
}
