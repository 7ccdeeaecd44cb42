import { henyeyGreenstein } from '../dust/phase-function.js'
import { openWalk } from '../grid/cells.js'
import { LeadingDraws } from '../math/leading-draws.js'
import { collide, EARLY_BELOW, EARLY_SURVIVAL } from './flight.js'
import { nearOffset, type Observers, observerCount } from './observers.js'
import { PlaceTally } from './place-tally.js'
import { Launcher, scatterHere } from './scatter-launch.js'
import { isForward, type ScatterMedium } from './scatter-medium.js'
import { pathToStar } from './star-spheres.js'
import { TurnedCopies } from './turned-copies.js'

/** Numbers of a packet that are drawn evenly over a batch. */
const EVEN = 10

/**
 * Light scattered towards each observer in cells of two or three dimensions: sum of weight x path x scattering coefficient x
 * scattering law (erg/s/Hz/sr), for each cell, azimuth bin (folded about the observer's plane; one bin in three dimensions)
 * and observer: index (cell * azimuths + azimuth) * observers + observer. In two dimensions observers stand in the half-plane of
 * azimuth 0.
 */
export function tallyTowards(medium: ScatterMedium, observers: Observers, packets: number, random: () => number): Float64Array {
  const draws = new LeadingDraws(EVEN, random)
  const uniform = draws.draw
  const { walls, cells, extinction, scattering, asymmetry, spheres } = medium
  const { directions } = observers
  const count = observerCount(observers)
  const far = directions.length / 3
  const near = observers.places.length > 0
  const laws = asymmetry.length
  // Of one law the coefficient is the same for all that a cell gains: it comes in the end, and the loop reads an array less.
  const single = laws === 1
  const copies = new TurnedCopies(walls, isForward(asymmetry))
  const { count: turns, cos: cosTurn, sin: sinTurn, places } = copies
  const tally = new Float64Array(near ? nearOffset(cells, observers, observers.places.length) : cells * copies.azimuths * count)
  const towards = new Float64Array(turns * laws * far)
  const walk = openWalk(walls)
  const nearby = new PlaceTally(medium, observers, tally)
  const launcher = new Launcher(medium, packets, true)
  const out = new Float64Array(3)

  for (let n = 0; n < packets; n++) {
    draws.begin()
    launcher.next(walk, n, uniform, out)
    if (launcher.atScattering) scatterHere(walk, medium, walk.s, uniform, out)
    const first = launcher.weight
    let weight = first
    let turned = true
    let remaining = -Math.log(uniform())
    copies.begin(uniform)
    while (weight > 0) {
      if (turned) {
        // The direction is constant along a flight: one value of the law for each turn and observer.
        const { ux, uy, uz } = walk
        copies.turn(uniform)
        for (let k = 0; k < turns; k++) {
          const cos = cosTurn[k]
          const sin = sinTurn[k]
          for (let o = 0; o < far; o++) {
            const along3 = (k % 2 === 0 ? uz : -uz) * directions[3 * o + 2]
            const cosine = (cos * ux - sin * uy) * directions[3 * o] + (sin * ux + cos * uy) * directions[3 * o + 1] + along3
            for (let law = 0; law < laws; law++) {
              towards[(law * turns + k) * far + o] = henyeyGreenstein(asymmetry[law], cosine) / turns
            }
          }
        }
        turned = false
      }
      const cell = walk.cell
      const toWall = walk.toWall()
      const toStar = spheres.length > 0 ? pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
      const free = Math.min(toStar, toWall)
      const whole = walk.weighed(free)
      const depth = whole * extinction[cell]
      const collides = depth >= remaining
      const weighed = collides ? remaining / extinction[cell] : whole
      const step = collides ? walk.stepOf(weighed) : free
      copies.place(walk, step)
      for (let law = 0; law < laws; law++) {
        const amount = single ? weight * weighed : weight * weighed * scattering[law * cells + cell]
        let from = law * turns * far
        for (let k = 0; k < turns; k++) {
          const base = places[k] * count
          for (let o = 0; o < far; o++) tally[base + o] += amount * towards[from++]
        }
      }
      if (near) nearby.add(walk, step, weight * weighed)
      if (collides) {
        weight = collide(walk, medium, walk.s + step, weight, EARLY_BELOW * first, EARLY_SURVIVAL, uniform, out)
        remaining = -Math.log(uniform())
        turned = true
      } else {
        remaining -= depth
        if (toStar < toWall || walk.cross() < 0) weight = 0
      }
    }
  }
  if (single) {
    const values = copies.azimuths * count
    for (let cell = 0, i = 0; cell < cells; cell++) for (let k = 0; k < values; k++) tally[i++] *= scattering[cell]
  }
  return tally
}
