import type { DustLayer } from '../dust-layer.js'
import type { MassPoints } from './mass-points.js'
import { LEVELS } from './octree.js'
import type { OctreeBuilder } from './octree-builder.js'

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
/** What the squares of contrast, angle at a star (rad) and optical depth of a cell make of its light: the sum is above what was measured of shells and disks. */
const CONTRAST = 1 / 25
const ANGLE = 1 / 6
const DEPTH = 1 / 12
/** Cells that hold details smaller than themselves come before all others: until they are divided nothing is known of them. */
const DETAIL = 1000
/** The way from a star is halved so often, and looked at in the middles of so many parts of each half. */
const HALVES = 8
const PARTS = 2

/**
 * Tells what share of the light of all dust a cell may get wrong because it holds one density and one temperature. What it does wrong
 * follows from how far the middle of its dust lies from its own, over the lengths in which light varies; second orders of its angle at the
 * nearest star and of its contrast; and of its optical depth where starlight comes.
 */
export class CellError {
  private readonly unit: number
  private readonly sizes: number[]
  /** Shares of the light of the stars that dust takes out. */
  private readonly caught: number[]
  // What the samples of the present cell say.
  private sum = 0
  private least = 0
  private most = 0
  private readonly moment = new Float64Array(3)
  private size = 0

  constructor(
    private readonly layers: DustLayer[],
    private readonly stars: readonly (readonly [number, number, number])[],
    private readonly builder: OctreeBuilder,
    private readonly points: MassPoints
  ) {
    this.unit = builder.side / 2 ** LEVELS
    this.sizes = layers.map(({ shape: { innerRadius, outerRadius } }) => 0.5 * (outerRadius - innerRadius))
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
    const { sum, least, most, moment, size } = this
    const volume = length ** 3
    // Dust that shows in a corner alone fills a part of it.
    const known = Math.max(sum / SAMPLES ** 3, most / (2 * SAMPLES) ** 3) * volume
    const counted = points.count(node) >= FEW ? points.crossSection(node) : 0
    const dust = Math.max(known, counted)
    const unknown = detail < length ? (DETAIL * length) / detail : 0
    if (dust === 0) return unknown
    const hidden = counted > 2 * known || sum === 0
    const contrast = hidden ? 1 : (most - least) / (most + least)
    const lean = hidden ? 0.25 : Math.hypot(moment[0], moment[1], moment[2]) / sum
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
    const uneven = lean * (2 * near + length / size) + ANGLE * near * near + CONTRAST * contrast * contrast
    const thick = Math.min(1, DEPTH * depth * depth)
    return unknown + Math.max(share, lit) * Math.min(1, uneven) + (stars.length > 0 ? lit : share) * thick
  }

  /** Samples the cube of such a side about (x, y, z): extinction, cm-1, and its moment about the middle, in sides. */
  private lookInto(x: number, y: number, z: number, length: number): void {
    this.sum = 0
    this.least = Number.POSITIVE_INFINITY
    this.most = 0
    this.moment.fill(0)
    this.size = Number.POSITIVE_INFINITY
    for (let k = 0; k < PLACES.length; k += 3) {
      const [a, b, c] = [PLACES[k], PLACES[k + 1], PLACES[k + 2]]
      const chi = this.extinctionAt(x + a * length, y + b * length, z + c * length)
      this.least = Math.min(this.least, chi)
      this.most = Math.max(this.most, chi)
      if (k >= 3 * SAMPLES ** 3) continue
      this.sum += chi
      this.moment[0] += chi * a
      this.moment[1] += chi * b
      this.moment[2] += chi * c
    }
  }

  private extinctionAt(x: number, y: number, z: number): number {
    const { layers, sizes } = this
    let chi = 0
    for (let k = 0; k < layers.length; k++) {
      const { shape, scale, extinction } = layers[k]
      const density = shape.relativeDensity(x, y, z)
      if (density > 0 && sizes[k] < this.size) this.size = sizes[k]
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
