import type { DustLayer } from '../dust-layer.js'
import type { MassPoints } from './mass-points.js'
import { LEVELS } from './octree.js'
import type { OctreeBuilder } from './octree-builder.js'
import { STEEPEST } from './profile.js'

/** Samples along each side of a cube, at the middles of equal parts. */
const SAMPLES = 3
/** Corners, just inside. */
const CORNER = 0.4999
/** Where a cube of side 1 about the origin is looked at: samples, then corners, three numbers each. */
const PLACES = Float64Array.from([
  ...Array.from({ length: SAMPLES ** 3 }, (_, k) => [
    k % SAMPLES,
    Math.floor(k / SAMPLES) % SAMPLES,
    Math.floor(k / SAMPLES ** 2)
  ])
    .flat()
    .map((digit) => (digit + 0.5) / SAMPLES - 0.5),
  ...Array.from({ length: 8 }, (_, k) => [k & 1, k & 2, k & 4].map((upper) => (upper ? CORNER : -CORNER))).flat()
])
/** Points that must lie in a cube before they count against its samples. */
const FEW = 4
/**
 * What the squares of roughness, angle at a star (rad) and optical depth of a cell make of its light. Roughness is how far the density is from
 * the even change that a cell has, rms over the mean; where the edge of the dust cuts the cell this share of it remains.
 */
const ROUGH = 2
const ANGLE = 1 / 6
const DEPTH = 1 / 100
const CUT_ROUGH = 0.3
/** Densities below, far out in a Gaussian, are none: their squares are no numbers. */
const LEAST = 1e-150
/** Mean square of a coordinate over the samples, in sides. */
const SPREAD = (1 - 1 / SAMPLES ** 2) / 12
/** Cells that hold details smaller than themselves come before all others: until they are divided nothing is known of them. */
const DETAIL = 1000
/** The way from a star is halved so often, and looked at in the middles of so many parts of each half. */
const HALVES = 8
const PARTS = 2

/**
 * Tells what share of the light of all dust a cell may get wrong because its density changes evenly and its temperature not at all:
 * second orders of how rough the dust is, of its angle at the nearest star, and of its optical depth where starlight comes.
 */
export class CellError {
  private readonly unit: number
  /** Shares of the light of the stars that dust takes out. */
  private readonly caught: number[]
  // What the samples of the present cell say.
  private sum = 0
  private rough = 0
  private most = 0

  constructor(
    private readonly layers: DustLayer[],
    private readonly stars: readonly (readonly [number, number, number])[],
    private readonly builder: OctreeBuilder,
    private readonly points: MassPoints
  ) {
    this.unit = builder.side / 2 ** LEVELS
    this.caught = stars.map((star) => points.caughtFrom(star))
  }

  /** `detail`: radius of the smallest detail in the node that is smaller than itself, cm. */
  of(node: number, detail: number): number {
    const { builder, unit, points, stars, caught } = this
    const { origin, corner, level, side } = builder
    const length = side / 2 ** level[node]
    const x = origin[0] + corner[3 * node] * unit + 0.5 * length
    const y = origin[1] + corner[3 * node + 1] * unit + 0.5 * length
    const z = origin[2] + corner[3 * node + 2] * unit + 0.5 * length
    this.lookInto(x, y, z, length)
    const { sum, most } = this
    const volume = length ** 3
    // Dust that shows in a corner alone fills a part of it.
    const known = Math.max(sum / SAMPLES ** 3, most / (2 * SAMPLES) ** 3) * volume
    const counted = points.count(node) >= FEW ? points.crossSection(node) : 0
    const dust = Math.max(known, counted)
    const unknown = detail < length ? (DETAIL * length) / detail : 0
    if (dust === 0) return unknown
    const hidden = counted > 2 * known || sum === 0
    const rough = hidden ? 1 : this.rough
    const depth = dust / (length * length)
    let near = 0
    let lit = 0
    for (let k = 0; k < stars.length; k++) {
      const [sx, sy, sz] = stars[k]
      const distance = Math.max(0.5 * length, Math.hypot(x - sx, y - sy, z - sz))
      const angle = length / distance
      near = Math.max(near, angle)
      const light = (Math.min(1, depth) * angle * angle) / (4 * Math.PI * caught[k])
      lit += light * Math.exp(-this.depthFrom(sx, sy, sz, x, y, z, distance - 0.5 * length))
    }
    const share = dust / points.total
    const uneven = ANGLE * near * near + ROUGH * rough * rough
    const thick = Math.min(1, DEPTH * depth * depth)
    return unknown + Math.max(share, lit) * Math.min(1, uneven) + (stars.length > 0 ? lit : share) * thick
  }

  /** Samples the cube of such a side about (x, y, z): extinction, cm-1, and how far it is from an even change, over its mean. */
  private lookInto(x: number, y: number, z: number, length: number): void {
    let [sum, squares, most, empty] = [0, 0, 0, 0]
    let [mx, my, mz] = [0, 0, 0]
    for (let k = 0; k < PLACES.length; k += 3) {
      const [a, b, c] = [PLACES[k], PLACES[k + 1], PLACES[k + 2]]
      const chi = this.extinctionAt(x + a * length, y + b * length, z + c * length)
      most = Math.max(most, chi)
      if (chi === 0) empty++
      if (k >= 3 * SAMPLES ** 3) continue
      sum += chi
      squares += chi * chi
      mx += chi * a
      my += chi * b
      mz += chi * c
    }
    this.sum = sum
    this.most = most
    const count = SAMPLES ** 3
    const scale = sum * SPREAD
    const [gx, gy, gz] = [mx / scale, my / scale, mz / scale]
    // Of a steeper change cells have as much as leaves no corner below nothing.
    const share = Math.min(1, STEEPEST / (Math.abs(gx) + Math.abs(gy) + Math.abs(gz)))
    const explained = (2 - share) * share * SPREAD * (gx * gx + gy * gy + gz * gz)
    const remains = empty > 0 ? CUT_ROUGH : 1
    this.rough = sum > LEAST ? remains * Math.sqrt(Math.max(0, (squares / sum / sum) * count - 1 - explained)) : 0
  }

  private extinctionAt(x: number, y: number, z: number): number {
    const { layers } = this
    let chi = 0
    for (let k = 0; k < layers.length; k++) {
      const { shape, scale, extinction } = layers[k]
      const density = shape.relativeDensity(x, y, z)
      chi += scale * extinction * density
    }
    return chi
  }

  /** Optical depth over a path from a star towards (x, y, z), by a few samples, more of them near the star. */
  private depthFrom(sx: number, sy: number, sz: number, x: number, y: number, z: number, path: number): number {
    const distance = Math.hypot(x - sx, y - sy, z - sz)
    if (!(path > 0)) return 0
    const [ux, uy, uz] = [(x - sx) / distance, (y - sy) / distance, (z - sz) / distance]
    let depth = 0
    for (let half = 1; half <= HALVES; half++) {
      const width = path / 2 ** half
      for (let part = 0; part < PARTS; part++) {
        const s = width * (1 + (part + 0.5) / PARTS)
        depth += (width / PARTS) * this.extinctionAt(sx + s * ux, sy + s * uy, sz + s * uz)
      }
    }
    return depth
  }
}
