import { dimensionsOf, openWalk, type Walk } from '../grid/cells.js'
import { type Detector, detectorPixels, pixelOf } from './detector.js'
import { collide, ROULETTE_BELOW, SURVIVAL } from './flight.js'
import type { PixelTally } from './peel.js'
import { Polarisation } from './polarisation.js'
import { Launcher } from './scatter-launch.js'
import type { ScatterMedium } from './scatter-medium.js'
import { pathToStar } from './star-spheres.js'

/** Half width, in the cosine of the inclination, of the directions that count as the observer's. */
const HALF_WIDTH = 0.04

/**
 * Exit bins: packets that leave are sorted by direction and place. In one dimension every packet is turned to face the
 * observer; in two, those within a band of inclinations about the observer's are turned about the axis into the observer's
 * plane; in three, only a cone about the observer counts. Values as in peel-off; `direct` is unscattered starlight.
 */
export function tallyExits(
  medium: ScatterMedium,
  detectors: Detector[],
  packets: number,
  uniform: () => number
): PixelTally & { direct: Float64Array } {
  const { extinction, walls, spheres } = medium
  const pixels = detectorPixels(detectors)
  const direct = new Float64Array(pixels)
  const emitted = new Float64Array(pixels)
  const scattered = new Float64Array(pixels)
  const unseen = new Float64Array(pixels)
  const walk = openWalk(walls)
  const launcher = new Launcher(medium, packets, false)
  const polarisation = medium.tables && new Polarisation()
  const out = new Float64Array(3)
  const dimension = dimensionsOf(walls)

  for (let n = 0; n < packets; n++) {
    launcher.next(walk, n, uniform, out)
    polarisation?.reset(walk.ux, walk.uy, walk.uz)
    const first = launcher.weight
    let weight = first
    // Ambient light that meets nothing is no light of the source.
    let tally = launcher.from === 'star' ? direct : launcher.from === 'dust' ? emitted : unseen
    let remaining = -Math.log(uniform())
    while (weight > 0) {
      const cell = walk.cell
      const toWall = walk.toWall()
      const toStar = spheres.length > 0 ? pathToStar(walk, spheres) : Number.POSITIVE_INFINITY
      const free = Math.min(toStar, toWall)
      const depth = walk.weighed(free) * extinction[cell]
      if (depth >= remaining) {
        weight = collide(
          walk,
          medium,
          walk.s + walk.stepOf(remaining / extinction[cell]),
          weight,
          ROULETTE_BELOW * first,
          SURVIVAL,
          uniform,
          out,
          polarisation
        )
        tally = scattered
        remaining = -Math.log(uniform())
      } else {
        remaining -= depth
        if (toStar < toWall) weight = 0
        else if (walk.cross() < 0) {
          if (dimension === 1) catchSpherical(walk, detectors, weight, tally, uniform)
          else if (dimension === 2) catchAxial(walk, detectors, weight, tally)
          else catchAny(walk, detectors, weight, tally)
          weight = 0
        }
      }
    }
  }
  return { direct, emitted, scattered }
}

/** By symmetry the packet leaves towards any observer, at its impact parameter, anywhere around it. */
function catchSpherical(walk: Walk, detectors: Detector[], weight: number, tally: Float64Array, uniform: () => number) {
  const angle = 2 * Math.PI * uniform()
  const b = Math.sqrt(walk.b2)
  const a = b * Math.cos(angle)
  const c = b * Math.sin(angle)
  let offset = 0
  for (const detector of detectors) {
    const { right, up } = detector
    const pixel = pixelOf(detector, a * right[0] + c * up[0], a * right[1] + c * up[1], a * right[2] + c * up[2])
    if (pixel >= 0) tally[offset + pixel] += weight / (4 * Math.PI)
    offset += detector.width * detector.height
  }
}

function catchAxial(walk: Walk, detectors: Detector[], weight: number, tally: Float64Array) {
  let offset = 0
  for (const detector of detectors) {
    const [nx, ny, nz] = detector.observer
    const low = Math.max(-1, nz - HALF_WIDTH)
    const high = Math.min(1, nz + HALF_WIDTH)
    if (walk.uz >= low && walk.uz <= high) {
      // Turn about z by the angle that brings the packet's azimuth to the observer's.
      const from = Math.hypot(walk.ux, walk.uy)
      const to = Math.hypot(nx, ny)
      const cos0 = from > 0 ? walk.ux / from : 1
      const sin0 = from > 0 ? walk.uy / from : 0
      // Looking down the axis, the observer's azimuth is that of the direction which is down in the picture.
      const cos1 = to > 1e-12 ? nx / to : -detector.up[0] * Math.sign(nz)
      const sin1 = to > 1e-12 ? ny / to : -detector.up[1] * Math.sign(nz)
      const cos = cos0 * cos1 + sin0 * sin1
      const sin = cos0 * sin1 - sin0 * cos1
      // Slide along the packet's own direction to its closest approach, then project on the picture.
      const x = walk.x0 * cos - walk.y0 * sin
      const y = walk.x0 * sin + walk.y0 * cos
      const pixel = project(detector, x, y, walk.z0, walk.ux * cos - walk.uy * sin, walk.ux * sin + walk.uy * cos, walk.uz)
      if (pixel >= 0) tally[offset + pixel] += weight / (2 * Math.PI * (high - low))
    }
    offset += detector.width * detector.height
  }
}

function catchAny(walk: Walk, detectors: Detector[], weight: number, tally: Float64Array) {
  let offset = 0
  for (const detector of detectors) {
    const [nx, ny, nz] = detector.observer
    if (walk.ux * nx + walk.uy * ny + walk.uz * nz >= 1 - HALF_WIDTH) {
      const pixel = project(detector, walk.x0, walk.y0, walk.z0, walk.ux, walk.uy, walk.uz)
      if (pixel >= 0) tally[offset + pixel] += weight / (2 * Math.PI * HALF_WIDTH)
    }
    offset += detector.width * detector.height
  }
}

/**
 * Pixel of a packet that leaves nearly towards the observer: its offset across its own direction (the closest approach),
 * measured along the picture's axes carried over to that direction by the smallest turn.
 */
function project(detector: Detector, x: number, y: number, z: number, ux: number, uy: number, uz: number): number {
  const [nx, ny, nz] = detector.observer
  // Rotation that takes u to n: v' = v + w x v + (w x (w x v)) / (1 + u.n), with w = u x n.
  const wx = uy * nz - uz * ny
  const wy = uz * nx - ux * nz
  const wz = ux * ny - uy * nx
  const f = 1 / (1 + ux * nx + uy * ny + uz * nz)
  const cx = wy * z - wz * y
  const cy = wz * x - wx * z
  const cz = wx * y - wy * x
  return pixelOf(detector, x + cx + f * (wy * cz - wz * cy), y + cy + f * (wz * cx - wx * cz), z + cz + f * (wx * cy - wy * cx))
}
