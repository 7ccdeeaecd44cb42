import { openWalk } from '../grid/cells.js'
import { collide, EARLY_BELOW, EARLY_SURVIVAL } from './flight.js'
import { FRAME, observerFrames } from './observer-frame.js'
import { nearOffset, type Observers, observerCount } from './observers.js'
import { Polarisation } from './polarisation.js'
import { Launcher, scatterHere } from './scatter-launch.js'
import { isForward, type ScatterMedium } from './scatter-medium.js'
import { scatterTowards } from './scatter-towards.js'
import { pathToStar } from './star-spheres.js'
import { StokesPlaceTally } from './stokes-place-tally.js'
import { TurnedCopies } from './turned-copies.js'

/**
 * As `tallyTowards` for laws in tables: `stokesCount` numbers (I, Q, U, V; I alone where no law polarises) where that has one.
 * They refer to the projected z axis. A flight turned about the axis takes its polarisation with it; mirrored in the midplane, or
 * folded about the observer's plane, U and V change sign.
 */
export function tallyStokesTowards(
  medium: ScatterMedium,
  observers: Observers,
  packets: number,
  uniform: () => number
): Float64Array {
  const { walls, cells, extinction, scattering, asymmetry, spheres } = medium
  const tables = medium.tables!
  const parts = stokesCount(medium)
  const { directions } = observers
  const count = observerCount(observers)
  const far = directions.length / 3
  const near = observers.places.length > 0
  const laws = asymmetry.length
  const copies = new TurnedCopies(walls, isForward(asymmetry))
  const { count: turns, cos: cosTurn, sin: sinTurn, places } = copies
  const values = near ? nearOffset(cells, observers, observers.places.length) : cells * copies.azimuths * count
  const tally = new Float64Array(values * parts)
  const towards = new Float64Array(turns * laws * far * 4)
  const frames = observerFrames(directions)
  const turnedFrame = new Float64Array(FRAME)
  const walk = openWalk(walls)
  const launcher = new Launcher(medium, packets, true)
  const polarisation = new Polarisation()
  const { stokes, frame } = polarisation
  const nearby = new StokesPlaceTally(medium, observers, polarisation, tally, parts)
  const out = new Float64Array(3)

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    polarisation.reset(walk.ux, walk.uy, walk.uz)
    if (launcher.atScattering) scatterHere(walk, medium, walk.s, uniform, out, polarisation)
    const first = launcher.weight
    let weight = first
    let turned = true
    let remaining = -Math.log(uniform())
    copies.begin(uniform)
    while (weight > 0) {
      if (turned) {
        copies.turn(uniform)
        for (let k = 0; k < turns; k++) {
          const cos = cosTurn[k]
          const sin = sinTurn[k]
          const mirror = k % 2 === 0 ? 1 : -1
          for (let i = 0; i < FRAME; i += 3) {
            // e is a cross product: a mirror turns it round.
            const sign = i === 6 ? mirror : 1
            turnedFrame[i] = sign * (cos * frame[i] - sin * frame[i + 1])
            turnedFrame[i + 1] = sign * (sin * frame[i] + cos * frame[i + 1])
            turnedFrame[i + 2] = sign * mirror * frame[i + 2]
          }
          for (let law = 0; law < laws; law++) {
            for (let o = 0; o < far; o++) {
              const to = ((k * laws + law) * far + o) * 4
              scatterTowards(
                tables,
                law,
                turnedFrame,
                0,
                stokes.q,
                mirror * stokes.u,
                mirror * stokes.v,
                frames,
                o * FRAME,
                towards,
                to
              )
              for (let part = 0; part < parts; part++) towards[to + part] /= turns
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
      const { x, y } = copies
      for (let k = 0; k < turns; k++) {
        const fold = sinTurn[k] * x + cosTurn[k] * y < 0 ? -1 : 1
        const base = places[k] * count * parts
        for (let law = 0; law < laws; law++) {
          const amount = weight * weighed * scattering[law * cells + cell]
          if (amount === 0) continue
          const from = (k * laws + law) * far * 4
          if (parts === 1) {
            for (let o = 0; o < far; o++) tally[base + o] += amount * towards[from + 4 * o]
            continue
          }
          for (let o = 0; o < 4 * far; o += 4) {
            tally[base + o] += amount * towards[from + o]
            tally[base + o + 1] += amount * towards[from + o + 1]
            tally[base + o + 2] += fold * amount * towards[from + o + 2]
            tally[base + o + 3] += fold * amount * towards[from + o + 3]
          }
        }
      }
      if (near) nearby.add(walk, step, weight * step)
      if (collides) {
        weight = collide(walk, medium, walk.s + step, weight, EARLY_BELOW * first, EARLY_SURVIVAL, uniform, out, polarisation)
        remaining = -Math.log(uniform())
        turned = true
      } else {
        remaining -= depth
        if (toStar < toWall || walk.cross() < 0) weight = 0
      }
    }
  }
  return tally
}

/** Stokes parameters that a medium's tallies hold: 4, or 1 where no law polarises. */
export function stokesCount(medium: ScatterMedium): 1 | 4 {
  return medium.tables!.polarising ? 4 : 1
}
