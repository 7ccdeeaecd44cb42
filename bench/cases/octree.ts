import { growOctree } from '../../src/grid/octree/grow-octree.js'
import type { Octree } from '../../src/grid/octree/octree.js'
import { OctreeWalk } from '../../src/grid/octree/octree-walk.js'
import { stream } from '../../src/math/random.js'
import { makeShape } from '../../src/shapes/make-shape.js'
import type { Shape } from '../../src/shapes/shape.js'
import { type BenchCase, interleaved, type Measure } from '../case.js'
import { slopeOf } from '../slope.js'

const REPETITIONS = 3
const SIZES = [1e4, 1e5, 1e6, 1e7]
const RAYS = 30_000

/** Processor time of rays from places where dust is, in any direction, to the outside. */
function walkRays(shape: Shape, octree: Octree, seed: string): { nanoseconds: number; crossings: number; path: number } {
  const walk = new OctreeWalk(octree)
  const uniform = stream(seed)
  const place = new Float64Array(3)
  const started = process.cpuUsage()
  let [crossings, path] = [0, 0]
  for (let n = 0; n < RAYS; n++) {
    shape.place(uniform(), uniform(), uniform(), place)
    const mu = 2 * uniform() - 1
    const sin = Math.sqrt(1 - mu * mu)
    const azimuth = 2 * Math.PI * uniform()
    walk.startAt(place[0], place[1], place[2], sin * Math.cos(azimuth), sin * Math.sin(azimuth), mu)
    do {
      path += walk.toWall()
      crossings++
    } while (walk.cross() >= 0)
  }
  const { user, system } = process.cpuUsage(started)
  return { nanoseconds: (1000 * (user + system)) / RAYS, crossings: crossings / RAYS, path }
}

async function octreeCost(): Promise<Measure[]> {
  const shape = makeShape({ kind: 'shell', inner: 5, outer: 1000, slope: -1.5 })
  const layers = [{ shape, scale: 1e8 / shape.column, extinction: 1 }]
  const grown = SIZES.map((cells) => {
    const started = process.cpuUsage()
    const octree = growOctree({ layers, stars: [[0, 0, 0]], width: 0, finest: 25, cellsAtMost: cells })
    return { octree, seconds: process.cpuUsage(started).user / 1e6, bytes: process.memoryUsage().rss }
  })
  for (const { octree } of grown) walkRays(shape, octree, 'warm-up')
  const times = await interleaved(
    REPETITIONS,
    ...grown.map(
      ({ octree }) =>
        (i: number) =>
          walkRays(shape, octree, `octree/${i}`)
    )
  )
  const largest = grown[grown.length - 1]
  return [
    ...times.map((side, k) => ({
      quantity: `${grown[k].octree.cells} cells`,
      unit: 'ns/packet',
      values: side.map(({ nanoseconds }) => nanoseconds)
    })),
    ...(['nanoseconds', 'crossings'] as const).map((key) => ({
      quantity: `${key} as a power of the number of cells`,
      unit: '',
      values: times[0].map((_, i) =>
        slopeOf(
          grown.map(({ octree }) => octree.cells),
          times.map((side) => side[i][key])
        )
      ),
      target: { atMost: 1 / 3 }
    })),
    { quantity: `growing ${largest.octree.cells} cells`, unit: 's', values: [largest.seconds] },
    { quantity: `memory with ${largest.octree.cells} cells`, unit: 'GB', values: [largest.bytes / 1e9], target: { atMost: 3 } }
  ]
}

/** How the cost of a packet grows with the cells of an octree, and what ten million of them take. */
export const octree: BenchCase[] = [
  {
    name: 'octree',
    about: 'walks through octrees of an envelope, from its dust to the outside, against the number of cells, processor time',
    native: false,
    run: octreeCost
  }
]
