import { henyeyGreenstein } from '../dust/phase-function.js'
import { SphericalWalk } from '../grid/walk.js'
import { collide, pathToStar } from './flight.js'
import { Launcher, scatterHere } from './scatter-launch.js'
import { AZIMUTH_BINS, azimuthLookup, type ScatterMedium } from './scatter-medium.js'

/**
 * Light scattered towards each observer in cells of two or three dimensions: sum of weight x path x scattering coefficient x
 * scattering law (erg/s/Hz/sr), for each cell, azimuth bin (folded about the observer's plane; one bin in three dimensions)
 * and observer: index (cell * azimuths + azimuth) * observers + observer. `observers` holds their unit vectors, three numbers
 * each; in two dimensions they lie in the half-plane of azimuth 0.
 */
export function tallyTowards(
  medium: ScatterMedium,
  observers: Float64Array,
  packets: number,
  uniform: () => number
): Float64Array {
  const { walls, cells, extinction, scattering, asymmetry } = medium
  const count = observers.length / 3
  const laws = asymmetry.length
  const azimuths = walls.phi.length === 2 ? AZIMUTH_BINS : 1
  const { lookup, scale } = azimuthLookup()
  const tally = new Float64Array(cells * azimuths * count)
  const towards = new Float64Array(laws * count)
  const walk = new SphericalWalk(walls)
  const launcher = new Launcher(medium, packets, true)
  const out = new Float64Array(3)
  const starRadius2 = medium.starRadius ** 2
  const golden = 0.6180339887498949

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    if (launcher.atScattering) scatterHere(walk, medium, walk.s, uniform, out)
    const first = launcher.weight
    let weight = first
    let turned = true
    let remaining = -Math.log(uniform())
    let along = uniform()
    while (weight > 0) {
      if (turned) {
        // The direction is constant along a flight: one value of the law for each observer.
        for (let o = 0; o < count; o++) {
          const cosine = walk.ux * observers[3 * o] + walk.uy * observers[3 * o + 1] + walk.uz * observers[3 * o + 2]
          for (let law = 0; law < laws; law++) towards[law * count + o] = henyeyGreenstein(asymmetry[law], cosine)
        }
        turned = false
      }
      const cell = walk.cell
      const toWall = walk.toWall()
      const toStar = starRadius2 > 0 ? pathToStar(walk, starRadius2) : Number.POSITIVE_INFINITY
      const free = Math.min(toStar, toWall)
      const depth = free * extinction[cell]
      const collides = depth >= remaining
      const step = collides ? remaining / extinction[cell] : free
      let base = cell * azimuths * count
      if (azimuths > 1) {
        along += golden
        if (along >= 1) along -= 1
        const s = walk.s + along * step
        const x = walk.x0 + s * walk.ux
        const y = walk.y0 + s * walk.uy
        const rho = Math.sqrt(x * x + y * y)
        base += lookup[rho > 0 ? ((x / rho + 1) * scale) | 0 : 0] * count
      }
      for (let law = 0; law < laws; law++) {
        const amount = weight * step * scattering[law * cells + cell]
        if (amount > 0) for (let o = 0; o < count; o++) tally[base + o] += amount * towards[law * count + o]
      }
      if (collides) {
        weight = collide(walk, medium, walk.s + step, weight, first, uniform, out)
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
