import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { sampleBin } from '../math/cdf.js'
import { ROULETTE_BELOW, SURVIVAL } from './flight.js'
import { impactParameter } from './launch.js'
import { drawLaw, scatteringOf } from './scatter-launch.js'
import { FLIGHT_BINS, type ScatterMedium } from './scatter-medium.js'

/** Steps of the lookup from the cosine of a flight to its bin: many times finer than the narrowest bin. */
const LOOKUP = 1 << 16

/** Bin of a flight by (cosine + 1) * LOOKUP / 2: bins even in the sine of half the angle. */
const binOfCosine = Uint8Array.from({ length: LOOKUP + 1 }, (_, i) => {
  const cosine = Math.min(1, -1 + (2 * (i + 0.5)) / LOOKUP)
  return Math.min(FLIGHT_BINS - 1, Math.floor(Math.sqrt(0.5 * (1 - cosine)) * FLIGHT_BINS))
})

/** Bin of a flight by its cosine with the radius. */
export function flightBin(cosine: number): number {
  return binOfCosine[((cosine + 1) * (LOOKUP / 2)) | 0]
}

/**
 * Light in flight in cells of one dimension: sum of weight x path (erg/s/Hz cm) by radial cell and by the angle between the
 * flight and the radius; cells x FLIGHT_BINS. The point of a segment that decides its bin is drawn along it, so that long
 * segments are shared out without bias.
 *
 * By symmetry a packet is known by its radius and the cosine of its direction with it. Along a flight of impact parameter b and
 * path s from the closest approach, r^2 = b^2 + s^2 and the cosine is s / r. Inward and outward steps have a loop each, with
 * nothing in it but what every step needs: 1.3 times as many packets a second as one loop for all.
 */
export function tallyFlights(medium: ScatterMedium, packets: number, uniform: () => number): Float64Array {
  const { cells, launch, launchTable, asymmetry } = medium
  // Constants of this module and shared memory are slower to reach from the loops than these.
  const extinction = Float64Array.from(medium.extinction)
  const radii = Float64Array.from(medium.walls.r)
  const squares = radii.map((r) => r * r)
  const albedo = extinction.map((value, cell) => (value > 0 ? scatteringOf(medium, cell) / value : 0))
  const table = binOfCosine
  const bins = FLIGHT_BINS
  const half = LOOKUP / 2
  const golden = 0.6180339887498949
  const single = asymmetry.length === 1
  const tally = new Float64Array(cells * bins)
  const starRadius2 = medium.starRadius ** 2
  const impact = new Float64Array(2)
  let lattice = -1
  const launchCumulative = launchTable.cumulative

  for (let n = 0; n < packets; n++) {
    // n chooses the kind of source evenly among the packets.
    const choice = (n + uniform()) / packets
    const index = sampleBin(launchTable, 0, choice)
    const chosen = launch[index]
    const scale = 1 / ((launchCumulative[index] - (index === 0 ? 0 : launchCumulative[index - 1])) * packets)
    let cell = 0
    let radius = 0
    let mu = 1
    let weight = 0
    if (chosen.kind === 'point-star') {
      // Straight to the first scattering, which is certain.
      const depths = chosen.opticalDepth
      const depth = -Math.log1p(uniform() * Math.expm1(-depths[cells]))
      let high = cells
      while (high - cell > 1) {
        const middle = (cell + high) >> 1
        if (depths[middle] <= depth) cell = middle
        else high = middle
      }
      const share = Math.min(1, (depth - depths[cell]) / (depths[cell + 1] - depths[cell]))
      radius = radii[cell] + share * (radii[cell + 1] - radii[cell])
      weight = chosen.removed * scale * albedo[cell]
      mu = sampleHenyeyGreenstein(asymmetry[single ? 0 : drawLaw(medium, cell, uniform)], uniform())
    } else if (chosen.kind === 'ambient') {
      if (lattice < 0) lattice = uniform()
      impactParameter(impact, radii[cells], radii[1], (lattice + n * golden) % 1)
      cell = cells - 1
      radius = radii[cells]
      mu = -Math.sqrt(1 - (impact[0] / radius) ** 2)
      weight = chosen.luminosity * scale * impact[1]
    } else if (chosen.kind === 'sphere-star') {
      radius = chosen.radius
      while (radii[cell + 1] <= radius) cell++
      mu = Math.sqrt(uniform())
      weight = chosen.luminosity * scale
    } else {
      cell = sampleBin(chosen.cells, 0, uniform())
      const inner3 = radii[cell] * squares[cell]
      radius = Math.cbrt(inner3 + uniform() * (radii[cell + 1] * squares[cell + 1] - inner3))
      mu = 2 * uniform() - 1
      weight = chosen.luminosity * scale
    }
    const least = ROULETTE_BELOW * weight
    let s = radius * mu
    let b2 = radius * radius * (1 - mu * mu)
    let remaining = -Math.log(uniform())
    let along = uniform()
    flight: while (weight > 0) {
      let opacity = 0
      let collides = false
      while (s < 0) {
        const below = squares[cell] - b2
        const inwards = below > 0
        const wall = inwards ? -Math.sqrt(below) : Math.sqrt(Math.max(0, squares[cell + 1] - b2))
        let step = Math.max(0, wall - s)
        let ends = false
        if (b2 < starRadius2) {
          const toStar = Math.max(0, -Math.sqrt(starRadius2 - b2) - s)
          if (toStar < step) {
            step = toStar
            ends = true
          }
        }
        opacity = extinction[cell]
        const depth = step * opacity
        collides = depth >= remaining
        if (collides) break
        along += golden
        along -= along | 0
        const at = s + along * step
        tally[cell * bins + table[((at / Math.sqrt(b2 + at * at) + 1) * half) | 0]] += weight * step
        if (ends) break flight
        remaining -= depth
        s += step
        cell += inwards ? -1 : 1
        if (cell === cells) break flight
      }
      while (!collides) {
        const step = Math.max(0, Math.sqrt(Math.max(0, squares[cell + 1] - b2)) - s)
        opacity = extinction[cell]
        const depth = step * opacity
        collides = depth >= remaining
        if (collides) break
        along += golden
        along -= along | 0
        const at = s + along * step
        tally[cell * bins + table[((at / Math.sqrt(b2 + at * at) + 1) * half) | 0]] += weight * step
        remaining -= depth
        s += step
        cell++
        if (cell === cells) break flight
      }
      const step = remaining / opacity
      along += golden
      along -= along | 0
      const at = s + along * step
      tally[cell * bins + table[((at / Math.sqrt(b2 + at * at) + 1) * half) | 0]] += weight * step
      weight *= albedo[cell]
      if (weight < least) weight = uniform() < SURVIVAL ? weight / SURVIVAL : 0
      s += step
      const r2 = b2 + s * s
      const r = Math.sqrt(r2)
      const before = Math.min(1, Math.max(-1, s / r))
      const turn = sampleHenyeyGreenstein(asymmetry[single ? 0 : drawLaw(medium, cell, uniform)], uniform())
      const across = Math.sqrt((1 - before * before) * (1 - turn * turn))
      mu = Math.min(1, Math.max(-1, before * turn + across * Math.cos(2 * Math.PI * uniform())))
      s = r * mu
      b2 = r2 * (1 - mu * mu)
      remaining = -Math.log(uniform())
    }
  }
  return tally
}
