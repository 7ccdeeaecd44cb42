import { isOctree } from '../../src/grid/cells.js'
import type { Octree } from '../../src/grid/octree/octree.js'
import { OctreeWalk } from '../../src/grid/octree/octree-walk.js'
import { stream } from '../../src/math/random.js'
import { buildModel, planCells } from '../../src/model/build-model.js'
import type { Model } from '../../src/model/model.js'
import { parseScene } from '../../src/scene/read.js'
import { divide } from '../../src/solve/batches.js'
import { dustLight } from '../../src/solve/dust-light.js'
import { givenTemperatures } from '../../src/solve/dust-temperatures.js'
import { setRows } from '../../src/solve/equilibrium.js'
import { equilibriumSetup } from '../../src/solve/equilibrium-medium.js'
import { addTo } from '../../src/solve/group-sums.js'
import { scatterMedium } from '../../src/solve/scatter-medium.js'
import { MET } from '../../src/solve/scattering.js'
import { firstGuess } from '../../src/solve/temperatures.js'
import { propagateEnergy } from '../../src/transport/equilibrium.js'
import { tallyTowards } from '../../src/transport/towards.js'
import { type BenchCase, interleaved, type Measure } from '../case.js'
import { cubesScene } from '../scenes.js'
import { slopeOf } from '../slope.js'

const REPETITIONS = 3
const SIZES = [1e4, 1e5, 1e6, 1e7]
const RAYS = 30_000
/** Packets of a run, unless as many cells ask for more. */
const PACKETS = 1e6
/** um */
const WAVELENGTH = 1e-4
const OBSERVERS = { directions: Float64Array.of(Math.sin(1), 0, Math.cos(1)), places: [] }

/** A model in cubes, and batches of its packets as a run plays them, each until its tally is added to those before. */
interface Crowd {
  cells: number
  octree: Octree
  model: Model
  growingSeconds: number
  /** In a batch. */
  packets: number
  scatter: (seed: string) => void
  heat: (seed: string) => void
}

/** Processor time, s. */
function secondsOf(work: () => void): number {
  const started = process.cpuUsage()
  work()
  const { user, system } = process.cpuUsage(started)
  return (user + system) / 1e6
}

function makeCrowd(size: number): Crowd {
  const scene = parseScene(cubesScene(size), 'bench.yaml')
  let plan = undefined as ReturnType<typeof planCells> | undefined
  const growingSeconds = secondsOf(() => {
    plan = planCells(scene)
  })
  const model = buildModel(scene, plan)
  const { cells, walls } = model
  if (!isOctree(walls)) throw new Error('the scene asks for cubes')
  const scattering = scatterMedium(model, dustLight(model, givenTemperatures(model), WAVELENGTH))
  const setup = equilibriumSetup(model)
  setRows(setup, firstGuess(model, setup))
  const { packets } = divide(Math.max(PACKETS, MET * cells), cells, 1)
  const [light, heat] = [new Float64Array(cells), new Float64Array(cells)]
  return {
    cells,
    octree: walls,
    model,
    growingSeconds,
    packets,
    scatter: (seed) => addTo(light, tallyTowards(scattering, OBSERVERS, packets, stream(seed)), packets),
    heat: (seed) => addTo(heat, propagateEnergy(setup.medium, packets, stream(seed)).absorbed, packets)
  }
}

/** Rays from places where dust is, in any direction, to the outside; returns how many walls one crosses. */
function walkRays({ octree, model }: Crowd, seed: string): number {
  const { shape } = model.components[0]
  const walk = new OctreeWalk(octree)
  const uniform = stream(seed)
  const place = new Float64Array(3)
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
  return crossings / RAYS
}

const KINDS = {
  scatter: ['packets of scattered light', 'ns/packet'],
  heat: ['packets of temperatures', 'ns/packet'],
  rays: ['rays', 'ns/ray'],
  crossings: ['walls that a ray crosses', '']
} as const

function time(crowd: Crowd, seed: string): Record<keyof typeof KINDS, number> {
  let crossings = 0
  const raySeconds = secondsOf(() => {
    crossings = walkRays(crowd, seed)
  })
  const each = (play: (seed: string) => void) => (1e9 * secondsOf(() => play(seed))) / crowd.packets
  return { scatter: each(crowd.scatter), heat: each(crowd.heat), rays: (1e9 * raySeconds) / RAYS, crossings }
}

async function octreeCost(): Promise<Measure[]> {
  const crowds = SIZES.map(makeCrowd)
  const bytes = process.memoryUsage().rss
  for (let i = 0; i < 10; i++) time(crowds[0], `warm-up/${i}`)
  const times = await interleaved(REPETITIONS, ...crowds.map((crowd) => (i: number) => time(crowd, `octree/${i}`)))
  const kinds = Object.entries(KINDS) as [keyof typeof KINDS, (typeof KINDS)[keyof typeof KINDS]][]
  const measures = kinds.flatMap(([kind, [name, unit]]): Measure[] => [
    ...times.map((side, k) => ({ quantity: `${name}, ${crowds[k].cells} cells`, unit, values: side.map((each) => each[kind]) })),
    {
      quantity: `${name} as a power of the number of cells`,
      unit: '',
      values: times[0].map((_, i) =>
        slopeOf(
          crowds.map(({ cells }) => cells),
          times.map((side) => side[i][kind])
        )
      ),
      target: { atMost: 1 / 3 }
    }
  ])
  const { cells, growingSeconds } = crowds[crowds.length - 1]
  return [
    ...measures,
    { quantity: `growing ${cells} cells`, unit: 's', values: [growingSeconds] },
    { quantity: 'memory with all of these', unit: 'GB', values: [bytes / 1e9], target: { atMost: 3 } }
  ]
}

/** How the cost of a packet grows with the cells of an octree, and what ten million of them take. */
export const octree: BenchCase[] = [
  {
    name: 'octree',
    about:
      'packets with their share of a batch, and rays from the dust to the outside, through octrees of an envelope against the number of cells, processor time',
    native: false,
    run: octreeCost
  }
]
