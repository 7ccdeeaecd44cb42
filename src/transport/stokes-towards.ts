import { dimensionsOf, isOctree, openWalk } from '../grid/cells.js'
import type { SphericalWalk } from '../grid/walk.js'
import { collide, EARLY_BELOW, EARLY_SURVIVAL } from './flight.js'
import { Polarisation } from './polarisation.js'
import { Launcher, scatterHere } from './scatter-launch.js'
import { AZIMUTH_BINS, azimuthLookup, type ScatterMedium } from './scatter-medium.js'
import { FRAME, observerFrames, scatterTowards } from './scatter-towards.js'
import { pathToStar } from './star-spheres.js'
import { COPIES } from './towards.js'

/**
 * As `tallyTowards` for laws in tables: `stokesCount` numbers (I, Q, U, V; I alone where no law polarises) where that has one.
 * They refer to the projected z axis. A flight turned about the axis takes its polarisation with it; mirrored in the midplane, or
 * folded about the observer's plane, U and V change sign.
 */
export function tallyStokesTowards(
  medium: ScatterMedium,
  observers: Float64Array,
  packets: number,
  uniform: () => number
): Float64Array {
  const { walls, cells, extinction, scattering, asymmetry, spheres } = medium
  const tables = medium.tables!
  const parts = stokesCount(medium)
  const count = observers.length / 3
  const laws = asymmetry.length
  const axial = dimensionsOf(walls) < 3
  const azimuths = axial ? AZIMUTH_BINS : 1
  const copies = axial ? COPIES : 1
  const nt = isOctree(walls) ? 1 : walls.cosTheta.length - 1
  const { lookup, scale } = azimuthLookup()
  const tally = new Float64Array(cells * azimuths * count * parts)
  const towards = new Float64Array(copies * laws * count * 4)
  const frames = observerFrames(observers)
  const turnedFrame = new Float64Array(FRAME)
  const cosTurn = new Float64Array(copies)
  const sinTurn = new Float64Array(copies)
  const walk = openWalk(walls)
  const polar = walk as SphericalWalk
  const launcher = new Launcher(medium, packets, true)
  const polarisation = new Polarisation()
  const { stokes, frame } = polarisation
  const out = new Float64Array(3)
  const golden = 0.6180339887498949

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    polarisation.reset(walk.ux, walk.uy, walk.uz)
    if (launcher.atScattering) scatterHere(walk, medium, walk.s, uniform, out, polarisation)
    const first = launcher.weight
    let weight = first
    let turned = true
    let remaining = -Math.log(uniform())
    let along = uniform()
    while (weight > 0) {
      if (turned) {
        const start = axial ? uniform() : 0
        for (let k = 0; k < copies; k++) {
          const turn = (2 * Math.PI * (start + k)) / copies
          const cos = Math.cos(turn)
          const sin = Math.sin(turn)
          cosTurn[k] = cos
          sinTurn[k] = sin
          const mirror = k % 2 === 0 ? 1 : -1
          for (let i = 0; i < FRAME; i += 3) {
            // e is a cross product: a mirror turns it round.
            const sign = i === 6 ? mirror : 1
            turnedFrame[i] = sign * (cos * frame[i] - sin * frame[i + 1])
            turnedFrame[i + 1] = sign * (sin * frame[i] + cos * frame[i + 1])
            turnedFrame[i + 2] = sign * mirror * frame[i + 2]
          }
          for (let law = 0; law < laws; law++) {
            for (let o = 0; o < count; o++) {
              const to = ((k * laws + law) * count + o) * 4
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
              for (let part = 0; part < parts; part++) towards[to + part] /= copies
            }
          }
        }
        turned = false
      }
      const cell = walk.cell
      const toWall = walk.toWall()
      const toStar = spheres.length > 0 ? pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
      const free = Math.min(toStar, toWall)
      const depth = free * extinction[cell]
      const collides = depth >= remaining
      const step = collides ? remaining / extinction[cell] : free
      let x = 0
      let y = 0
      let mirrored = cell
      if (axial) {
        along += golden
        along -= along | 0
        const s = walk.s + along * step
        x = walk.x0 + s * walk.ux
        y = walk.y0 + s * walk.uy
        const rho = Math.sqrt(x * x + y * y)
        if (rho > 0) {
          x /= rho
          y /= rho
        }
        if (cell > 0) mirrored = cell + nt - 1 - 2 * polar.it
      }
      for (let k = 0; k < copies; k++) {
        const bin = axial ? lookup[((cosTurn[k] * x - sinTurn[k] * y + 1) * scale) | 0] : 0
        const fold = sinTurn[k] * x + cosTurn[k] * y < 0 ? -1 : 1
        const base = ((k % 2 === 0 ? cell : mirrored) * azimuths + bin) * count * parts
        for (let law = 0; law < laws; law++) {
          const amount = weight * step * scattering[law * cells + cell]
          if (amount === 0) continue
          const from = (k * laws + law) * count * 4
          if (parts === 1) {
            for (let o = 0; o < count; o++) tally[base + o] += amount * towards[from + 4 * o]
            continue
          }
          for (let o = 0; o < 4 * count; o += 4) {
            tally[base + o] += amount * towards[from + o]
            tally[base + o + 1] += amount * towards[from + o + 1]
            tally[base + o + 2] += fold * amount * towards[from + o + 2]
            tally[base + o + 3] += fold * amount * towards[from + o + 3]
          }
        }
      }
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
