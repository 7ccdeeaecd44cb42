import { join } from 'node:path'
import { memoryEstimate, totalMemory } from '../../src/run/memory.js'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { runCommand } from '../command.js'
import { lightDust } from '../lit-dust.js'
import { diskScene, shellScene } from '../scenes.js'

const REPETITIONS = 2
const PACKETS = 50_000

interface Pair {
  unit: 'cell' | 'pixel'
  quantity: string
  small: Size
  large: Size
}

interface Size {
  text: string
  count: number
  /** What the program states before it runs, bytes. */
  stated: number
}

function sizeOf(text: string, pixels?: number): Size {
  const { model } = lightDust(text)
  return { text, count: pixels ?? model.cells, stated: totalMemory(memoryEstimate(model, 1), 1) }
}

const pairs = (): Pair[] => [
  {
    unit: 'cell',
    quantity: 'two dimensions, one camera',
    small: sizeOf(diskScene({ depth: 100, grid: [101, 40, 1], pixels: 16, packets: PACKETS })),
    large: sizeOf(diskScene({ depth: 100, grid: [401, 200, 1], pixels: 16, packets: PACKETS }))
  },
  {
    unit: 'cell',
    quantity: 'three dimensions, one camera',
    small: sizeOf(diskScene({ depth: 100, grid: [47, 46, 46], pixels: 16, packets: PACKETS })),
    large: sizeOf(diskScene({ depth: 100, grid: [81, 80, 80], pixels: 16, packets: PACKETS }))
  },
  {
    unit: 'cell',
    quantity: 'cubes, one camera and point star',
    small: sizeOf(diskScene({ depth: 100, cubes: 3e4, pixels: 16, packets: PACKETS })),
    large: sizeOf(diskScene({ depth: 100, cubes: 3e5, pixels: 16, packets: PACKETS }))
  },
  {
    unit: 'pixel',
    quantity: 'one wavelength',
    small: sizeOf(shellScene({ depth: 1, pixels: 64, packets: PACKETS }), 64 ** 2),
    large: sizeOf(shellScene({ depth: 1, pixels: 512, packets: PACKETS }), 512 ** 2)
  }
]

/** Peak memory of a large run less that of a small one, over the difference in size. */
async function memoryEach({ folder }: Tools): Promise<Measure[]> {
  const measures: Measure[] = []
  for (const { unit, quantity, small, large } of pairs()) {
    const [less, more] = await interleaved(
      REPETITIONS,
      (seed) => runCommand(small, join(folder, 'small'), { seed }),
      (seed) => runCommand(large, join(folder, 'large'), { seed })
    )
    const extra = large.count - small.count
    const values = less.map(({ peakBytes }, i) => (more[i].peakBytes - peakBytes) / extra)
    const stated = (large.stated - small.stated) / extra
    measures.push(
      { quantity, unit: `bytes/${unit}`, values },
      { quantity: `${quantity}, as stated before a run`, unit: `bytes/${unit}`, values: [stated] },
      {
        quantity: `${quantity}, used over stated`,
        unit: '',
        values: values.map((value) => value / stated),
        target: { atMost: 2 }
      }
    )
  }
  return measures
}

export const memory: BenchCase[] = [
  { name: 'memory', about: 'peak memory with one worker against the number of cells and pixels', native: false, run: memoryEach }
]
