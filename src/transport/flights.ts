import { sampleHenyeyGreenstein } from '../dust/phase-function.js'
import { sampleBin } from '../math/cdf.js'
import { keepAfterCollision } from './flight.js'
import { drawLaw, scatteringOf } from './scatter-launch.js'
import { FLIGHT_BINS, type ScatterMedium } from './scatter-medium.js'

/** Steps of the lookup from the cosine of a flight to its bin: a hundredth of the narrowest bin's share of the sphere. */
const LOOKUP = 1 << 16
const GOLDEN = 0.6180339887498949

/** Bin of a flight by (cosine + 1) * LOOKUP / 2: bins even in the sine of half the angle. */
const binOfCosine = Uint8Array.from({ length: LOOKUP + 1 }, (_, i) => {
  const cosine = Math.min(1, -1 + (2 * (i + 0.5)) / LOOKUP)
  return Math.min(FLIGHT_BINS - 1, Math.floor(Math.sqrt(0.5 * (1 - cosine)) * FLIGHT_BINS))
})

/**
 * Light in flight in cells of one dimension: sum of weight x path (erg/s/Hz cm) by radial cell and by the angle between the
 * flight and the radius; cells x FLIGHT_BINS. The point of a segment that decides its bin is drawn along it, so that long
 * segments are shared out without bias.
 *
 * By symmetry a packet is known by its radius and the cosine of its direction with it. Along a flight of impact parameter b and
 * path s from the closest approach, r^2 = b^2 + s^2 and the cosine is s / r.
 */
export function tallyFlights(medium: ScatterMedium, packets: number, uniform: () => number): Float64Array {
  const { cells, extinction, launch, launchTable, asymmetry } = medium
  const radii = medium.walls.r
  const squares = radii.map((r) => r * r)
  const tally = new Float64Array(cells * FLIGHT_BINS)
  const starRadius2 = medium.starRadius ** 2
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
      const scattering = scatteringOf(medium, cell)
      weight = (chosen.removed * scale * scattering) / extinction[cell]
      mu = sampleHenyeyGreenstein(asymmetry[drawLaw(medium, cell, scattering, uniform)], uniform())
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
    const first = weight
    let s = radius * mu
    let b2 = radius * radius * (1 - mu * mu)
    let remaining = -Math.log(uniform())
    let along = uniform()
    while (weight > 0) {
      // The wall ahead: inwards while the flight comes closer and passes below the inner wall.
      const inwards = s < 0 && b2 < squares[cell]
      const reach = (inwards ? squares[cell] : squares[cell + 1]) - b2
      const wall = inwards ? -Math.sqrt(reach) : reach > 0 ? Math.sqrt(reach) : 0
      let step = wall > s ? wall - s : 0
      let ends = false
      if (s < 0 && b2 < starRadius2) {
        const toStar = -Math.sqrt(starRadius2 - b2) - s
        if (toStar < step) {
          step = toStar > 0 ? toStar : 0
          ends = true
        }
      }
      const opacity = extinction[cell]
      const depth = step * opacity
      const collides = depth >= remaining
      if (collides) step = remaining / opacity
      along += GOLDEN
      if (along >= 1) along -= 1
      const at = s + along * step
      const cosine = at / Math.sqrt(b2 + at * at)
      tally[cell * FLIGHT_BINS + binOfCosine[((cosine + 1) * (LOOKUP / 2)) | 0]] += weight * step
      if (collides) {
        weight = keepAfterCollision(medium, cell, weight, first, uniform)
        s += step
        const r2 = b2 + s * s
        const r = Math.sqrt(r2)
        const before = Math.min(1, Math.max(-1, s / r))
        const law = drawLaw(medium, cell, scatteringOf(medium, cell), uniform)
        const turn = sampleHenyeyGreenstein(asymmetry[law], uniform())
        const across = Math.sqrt((1 - before * before) * (1 - turn * turn))
        mu = Math.min(1, Math.max(-1, before * turn + across * Math.cos(2 * Math.PI * uniform())))
        s = r * mu
        b2 = r2 * (1 - mu * mu)
        remaining = -Math.log(uniform())
      } else if (ends) weight = 0
      else {
        remaining -= depth
        s += step
        cell += inwards ? -1 : 1
        if (cell === cells) weight = 0
      }
    }
  }
  return tally
}
