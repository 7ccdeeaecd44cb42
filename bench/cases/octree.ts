import { growOctree } from '../../src/grid/octree/grow-octree.js'
import { cellCube, type Octree } from '../../src/grid/octree/octree.js'
import { OctreeWalk } from '../../src/grid/octree/octree-walk.js'
import { allocateShared } from '../../src/math/allocate.js'
import { makeSamplingTable } from '../../src/math/cdf.js'
import { stream } from '../../src/math/random.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import type { Shape } from '../../src/shapes/shape.js'
import type { ScatterMedium } from '../../src/transport/scatter-medium.js'
import { type BenchCase, interleaved, type Measure } from '../case.js'
import { PacketPool } from '../packet-pool.js'
import { slopeOf } from '../slope.js'

const REPETITIONS = 3
const SIZES = [1e4, 1e5, 1e6, 1e7]
const RAYS = 30_000
/** About a batch of the program. */
const PACKETS = 8000
const OPTICAL_DEPTH = 2
const ALBEDO = 0.6
const TO_OBSERVER = Float64Array.of(Math.sin(1), 0, Math.cos(1))

/** Processor time of rays from places where dust is, in any direction, to the outside. */
function walkRays(shape: Shape, octree: Octree, seed: string): { nanoseconds: number; crossings: number } {
  const walk = new OctreeWalk(octree)
  const uniform = stream(seed)
  const place = new Float64Array(3)
  const started = process.cpuUsage()
  let crossings = 0
  for (let n = 0; n < RAYS; n++) {
    shape.place(uniform(), uniform(), uniform(), place)
    const mu = 2 * uniform() - 1
    const sin = Math.sqrt(1 - mu * mu)
    const azimuth = 2 * Math.PI * uniform()
    walk.startAt(place[0], place[1], place[2], sin * Math.cos(azimuth), sin * Math.sin(azimuth), mu)
    do {
      walk.toWall()
      crossings++
    } while (walk.cross() >= 0)
  }
  const { user, system } = process.cpuUsage(started)
  return { nanoseconds: (1000 * (user + system)) / RAYS, crossings: crossings / RAYS }
}

/** A star in scattering dust of moderate depth, with the density at the middle of each cell. */
function litMedium(shape: Shape, octree: Octree): ScatterMedium {
  const { cells } = octree
  const extinction = new Float64Array(allocateShared(8 * cells))
  const scattering = new Float64Array(allocateShared(8 * cells))
  const cube = new Float64Array(4)
  for (let cell = 0; cell < cells; cell++) {
    const [x, y, z] = cellCube(octree, cell, cube)
    extinction[cell] = (OPTICAL_DEPTH / shape.column) * shape.relativeDensity(x, y, z)
    scattering[cell] = ALBEDO * extinction[cell]
  }
  return {
    walls: octree,
    cells,
    extinction,
    asymmetry: Float64Array.of(0.5),
    scattering,
    launch: [{ kind: 'free-star', luminosity: 1, at: [0, 0, 0] }],
    launchTable: makeSamplingTable(Float64Array.of(1), 1, 1),
    spheres: new Float64Array()
  }
}

async function octreeCost(): Promise<Measure[]> {
  const shape = makeShape({ kind: 'shell', inner: 5, outer: 1000, slope: -1.5 })
  // Without tolerance cells are divided until the number is reached.
  const layers = [{ shape, scale: 1e8 / shape.column, extinction: 1 }]
  const grown = SIZES.map((cells) => {
    const started = process.cpuUsage()
    const octree = growOctree(
      { layers, stars: [[0, 0, 0]], width: 0, finest: 25, cellsAtMost: cells, tolerance: 0 },
      allocateShared
    )
    const seconds = process.cpuUsage(started).user / 1e6
    return { octree, seconds, bytes: process.memoryUsage().rss, pool: new PacketPool(litMedium(shape, octree), TO_OBSERVER) }
  })
  for (const { octree, pool } of grown) {
    walkRays(shape, octree, 'warm-up')
    await pool.warmUp(PACKETS)
  }
  const times = await interleaved(
    REPETITIONS,
    ...grown.map(({ octree, pool }) => async (i: number) => {
      const { cpuSeconds } = await pool.play(PACKETS, `octree/${i}`)
      const { nanoseconds, crossings } = walkRays(shape, octree, `octree/${i}`)
      return { packets: (1e9 * cpuSeconds) / PACKETS, rays: nanoseconds, crossings }
    })
  )
  for (const { pool } of grown) await pool.close()
  const largest = grown[grown.length - 1]
  const each = (key: 'packets' | 'rays', unit: string): Measure[] =>
    times.map((side, k) => ({ quantity: `${grown[k].octree.cells} cells`, unit, values: side.map((time) => time[key]) }))
  const powers = (['packets', 'rays', 'crossings'] as const).map(
    (key): Measure => ({
      quantity: `${key} as a power of the number of cells`,
      unit: '',
      values: times[0].map((_, i) =>
        slopeOf(
          grown.map(({ octree }) => octree.cells),
          times.map((side) => side[i][key])
        )
      ),
      target: { atMost: 1 / 3 }
    })
  )
  return [
    ...each('packets', 'ns/packet'),
    ...each('rays', 'ns/ray'),
    ...powers,
    { quantity: `growing ${largest.octree.cells} cells`, unit: 's', values: [largest.seconds] },
    { quantity: `memory with ${largest.octree.cells} cells`, unit: 'GB', values: [largest.bytes / 1e9], target: { atMost: 3 } }
  ]
}

/** How the cost of a packet grows with the cells of an octree, and what ten million of them take. */
export const octree: BenchCase[] = [
  {
    name: 'octree',
    about:
      'scattered packets, and rays from the dust to the outside, through octrees of an envelope against the number of cells, processor time',
    native: false,
    run: octreeCost
  }
]
