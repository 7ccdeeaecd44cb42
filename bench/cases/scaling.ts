import { join } from 'node:path'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { runCommand } from '../command.js'
import { lightDust } from '../lit-dust.js'
import { PacketPool } from '../packet-pool.js'
import { diskScene } from '../scenes.js'
import { slopeOf } from '../slope.js'

const REPETITIONS = 2

/** Numbers of cells in radius, polar angle and azimuth: about 1e3, 1e4, 1e5 and 1e6 in all. */
const GRIDS: [number, number, number][] = [
  [11, 10, 10],
  [21, 22, 22],
  [47, 46, 46],
  [101, 100, 100]
]
const PACKETS = 40_000
const TO_OBSERVER = Float64Array.of(Math.sin(1), 0, Math.cos(1))

async function cellCost(): Promise<Measure[]> {
  const crews: { cells: number; pool: PacketPool }[] = []
  for (const grid of GRIDS) {
    const { model, medium } = lightDust(diskScene({ depth: 100, grid, packets: PACKETS }))
    const pool = new PacketPool(medium, TO_OBSERVER)
    await pool.warmUp(PACKETS)
    crews.push({ cells: model.cells, pool })
  }
  const times = await interleaved(
    REPETITIONS,
    ...crews.map(
      ({ pool }) =>
        (i: number) =>
          pool.play(PACKETS, `bench/${i}`)
    )
  )
  for (const { pool } of crews) await pool.close()
  const each = times.map((side) => side.map(({ cpuSeconds }) => (1e9 * cpuSeconds) / PACKETS))
  return [
    ...each.map((values, k) => ({ quantity: `${crews[k].cells} cells`, unit: 'ns/packet', values })),
    {
      quantity: 'power of the number of cells',
      unit: '',
      values: each[0].map((_, i) =>
        slopeOf(
          crews.map(({ cells }) => cells),
          each.map((values) => values[i])
        )
      ),
      target: { atMost: 1 / 3 }
    }
  ]
}

interface Sweep {
  name: string
  about: string
  unit: string
  sizes: number[]
  scene: (size: number) => string
  /** Most power of the size that the time may grow with. */
  power?: number
}

const LITTLE = 50_000

const sweeps: Sweep[] = [
  {
    name: 'packets',
    about: 'processor time of a whole run of a disk against packets',
    unit: 'packets',
    sizes: [5e4, 2e5, 8e5],
    scene: (packets) => diskScene({ depth: 100, packets }),
    power: 1.05
  },
  {
    name: 'wavelengths',
    about: `processor time of a whole run of a disk against wavelengths of a spectrum, ${LITTLE} packets each`,
    unit: 'wavelengths',
    sizes: [1, 4, 16],
    scene: (wavelengths) => diskScene({ depth: 100, wavelengths, packets: LITTLE }),
    power: 1.05
  },
  {
    name: 'pixels',
    about: `processor time of a whole run of a disk against pixels of its picture, ${LITTLE} packets`,
    unit: 'pixels',
    sizes: [64, 128, 256, 512].map((side) => side * side),
    scene: (pixels) => diskScene({ depth: 100, pixels: Math.sqrt(pixels), packets: LITTLE }),
    power: 1.05
  },
  {
    name: 'cameras',
    about: `processor time of a whole run of a disk against cameras, ${2 * LITTLE} packets`,
    unit: 'cameras',
    sizes: [1, 2, 4],
    scene: (cameras) =>
      diskScene({ depth: 100, inclinations: Array.from({ length: cameras }, (_, i) => 10 + 10 * i), packets: 2 * LITTLE }),
    power: 1.05
  }
]

async function sweepCost({ unit, sizes, scene, power }: Sweep, { folder }: Tools): Promise<Measure[]> {
  const times = await interleaved(
    REPETITIONS,
    ...sizes.map((size, k) => (seed: number) => runCommand({ text: scene(size) }, join(folder, `sweep-${k}`), { seed }))
  )
  const seconds = times.map((side) => side.map(({ cpuSeconds }) => cpuSeconds))
  return [
    ...seconds.map((values, k) => ({ quantity: `${sizes[k]} ${unit}`, unit: 's', values })),
    {
      quantity: `power of the number of ${unit}`,
      unit: '',
      values: seconds[0].map((_, i) =>
        slopeOf(
          sizes,
          seconds.map((values) => values[i])
        )
      ),
      ...(power && { target: { atMost: power } })
    }
  ]
}

/** How the cost grows with the size of the task. */
export const scaling: BenchCase[] = [
  {
    name: 'cost-cells',
    about: 'packet loop in three-dimensional cells of a disk against their number, processor time',
    native: false,
    run: cellCost
  },
  ...sweeps.map((sweep) => ({
    name: `cost-${sweep.name}`,
    about: sweep.about,
    native: false,
    run: (tools: Tools) => sweepCost(sweep, tools)
  }))
]
