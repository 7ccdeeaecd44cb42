import { henyeyGreenstein } from '../dust/phase-function.js'
import { openWalk, type Walk } from '../grid/cells.js'
import { type Detector, detectorPixels, pixelOf } from './detector.js'
import { collide, ROULETTE_BELOW, SURVIVAL } from './flight.js'
import { Polarisation } from './polarisation.js'
import { Launcher, scatterHere } from './scatter-launch.js'
import { type ScatterMedium, scatteringOf } from './scatter-medium.js'
import { scatterTowards } from './scatter-towards.js'
import { pathToStar } from './star-spheres.js'

/** Two values a pixel: light emitted by dust and never scattered, and scattered light; all detectors one after another. */
export interface PixelTally {
  emitted: Float64Array
  scattered: Float64Array
  /** Stokes parameters beside it, where a law polarises and they are followed; signs as in Stokes, from the detector's north. */
  stokes?: [q: Float64Array, u: Float64Array, v: Float64Array]
}

/**
 * Peel-off: every emission and every scattering sends its share, dimmed on the way, straight to each detector
 * (Yusef-Zadeh, Morris & White 1984, ApJ 278, 186). Values are luminosities per sr towards the observer (erg/s/Hz/sr): divided
 * by the squared distance they are fluxes. Starlight that is not scattered is left out.
 */
export function tallyPeeled(medium: ScatterMedium, detectors: Detector[], packets: number, uniform: () => number): PixelTally {
  const { extinction, spheres } = medium
  const pixels = detectorPixels(detectors)
  const emitted = new Float64Array(pixels)
  const scattered = new Float64Array(pixels)
  const walk = openWalk(medium.walls)
  const sight = openWalk(medium.walls)
  const launcher = new Launcher(medium, packets, true)
  const out = new Float64Array(3)
  const polarisation = medium.tables && new Polarisation()
  const stokes = medium.tables?.polarising
    ? ([new Float64Array(pixels), new Float64Array(pixels), new Float64Array(pixels)] satisfies PixelTally['stokes'])
    : undefined
  const frames = detectors.map(detectorFrame)
  const seen = new Float64Array(4)

  /** Sends the packet at path s to every detector; `weight` is what is emitted or scattered there. */
  const peel = (tally: Float64Array, s: number, weight: number, scatters: boolean) => {
    const x = walk.x0 + s * walk.ux
    const y = walk.y0 + s * walk.uy
    const z = walk.z0 + s * walk.uz
    let offset = 0
    for (const [index, detector] of detectors.entries()) {
      const pixel = pixelOf(detector, x, y, z)
      if (pixel >= 0) {
        const [nx, ny, nz] = detector.observer
        sight.startIn(x, y, z, nx, ny, nz, walk.cell)
        const depth = depthToObserver(sight, extinction, spheres)
        if (depth < 80 && scatters && polarisation) {
          towardsDetector(medium, walk.cell, polarisation, frames[index], seen)
          tally[offset + pixel] += weight * seen[0] * Math.exp(-depth)
          stokes?.forEach((part, i) => {
            part[offset + pixel] += weight * seen[i + 1] * Math.exp(-depth)
          })
        } else if (depth < 80) {
          const law = scatters ? meanLaw(medium, walk.cell, walk.ux * nx + walk.uy * ny + walk.uz * nz) : 1 / (4 * Math.PI)
          tally[offset + pixel] += weight * law * Math.exp(-depth)
        }
      }
      offset += detector.width * detector.height
    }
  }

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    polarisation?.reset(walk.ux, walk.uy, walk.uz)
    const first = launcher.weight
    let weight = first
    if (launcher.atScattering) {
      peel(scattered, walk.s, weight, true)
      scatterHere(walk, medium, walk.s, uniform, out, polarisation)
    } else if (launcher.from === 'dust') peel(emitted, walk.s, weight, false)
    let remaining = -Math.log(uniform())
    while (weight > 0) {
      const cell = walk.cell
      const toWall = walk.toWall()
      const toStar = spheres.length > 0 ? pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
      const free = Math.min(toStar, toWall)
      const depth = walk.weighed(free) * extinction[cell]
      if (depth >= remaining) {
        const s = walk.s + walk.stepOf(remaining / extinction[cell])
        peel(scattered, s, (weight * scatteringOf(medium, cell)) / extinction[cell], true)
        weight = collide(walk, medium, s, weight, ROULETTE_BELOW * first, SURVIVAL, uniform, out, polarisation)
        remaining = -Math.log(uniform())
      } else {
        remaining -= depth
        if (toStar < toWall || walk.cross() < 0) weight = 0
      }
    }
  }
  return { emitted, scattered, ...(stokes && { stokes }) }
}

/** Optical depth along the rest of the walk; infinite behind a star. */
function depthToObserver(sight: Walk, extinction: Float64Array, spheres: Float64Array): number {
  let depth = 0
  do {
    if (pathToStar(sight, spheres) < Number.POSITIVE_INFINITY) return Number.POSITIVE_INFINITY
    depth += sight.weighed(sight.toWall()) * extinction[sight.cell]
  } while (depth < 80 && sight.cross() >= 0)
  return depth
}

/** The frame of scatterTowards for a detector. */
function detectorFrame({ observer, up, right }: Detector): Float64Array {
  return Float64Array.of(...observer, ...up, ...right.map((value) => -value))
}

/** Stokes parameters, per sr, that a cell's mixture of dust sends to a detector. */
function towardsDetector(
  medium: ScatterMedium,
  cell: number,
  { stokes, frame }: Polarisation,
  detector: Float64Array,
  out: Float64Array
): void {
  const { scattering, cells, tables } = medium
  const one = new Float64Array(4)
  const total = scatteringOf(medium, cell)
  out.fill(0)
  for (let law = 0; law < tables!.laws; law++) {
    const share = scattering[law * cells + cell] / total
    if (!(share > 0)) continue
    scatterTowards(tables!, law, frame, 0, stokes.q, stokes.u, stokes.v, detector, 0, one, 0)
    for (let i = 0; i < 4; i++) out[i] += share * one[i]
  }
}

/** Scattering law of a cell's mixture of dust, per sr. */
function meanLaw(medium: ScatterMedium, cell: number, cosine: number): number {
  const { asymmetry, scattering, cells } = medium
  let sum = 0
  let total = 0
  for (let law = 0; law < asymmetry.length; law++) {
    const amount = scattering[law * cells + cell]
    sum += amount * henyeyGreenstein(asymmetry[law], cosine)
    total += amount
  }
  return total > 0 ? sum / total : 0
}
