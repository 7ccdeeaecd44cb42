import { join } from 'node:path'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { runCommand } from '../command.js'
import { lightDust } from '../lit-dust.js'
import { diskScene, shellScene } from '../scenes.js'

const REPETITIONS = 2
const PACKETS = 50_000

interface Pair {
  unit: 'cell' | 'pixel'
  quantity: string
  small: { text: string; count: number }
  large: { text: string; count: number }
}

const cellsOf = (text: string) => ({ text, count: lightDust(text).model.cells })

const pairs = (): Pair[] => [
  {
    unit: 'cell',
    quantity: 'two dimensions, one camera',
    small: cellsOf(diskScene({ depth: 100, grid: [101, 40, 1], pixels: 16, packets: PACKETS })),
    large: cellsOf(diskScene({ depth: 100, grid: [401, 200, 1], pixels: 16, packets: PACKETS }))
  },
  {
    unit: 'cell',
    quantity: 'three dimensions, one camera',
    small: cellsOf(diskScene({ depth: 100, grid: [47, 46, 46], pixels: 16, packets: PACKETS })),
    large: cellsOf(diskScene({ depth: 100, grid: [101, 100, 100], pixels: 16, packets: PACKETS }))
  },
  {
    unit: 'pixel',
    quantity: 'one wavelength',
    small: { text: shellScene({ depth: 1, pixels: 64, packets: PACKETS }), count: 64 ** 2 },
    large: { text: shellScene({ depth: 1, pixels: 1024, packets: PACKETS }), count: 1024 ** 2 }
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
    const values = less.map(({ peakBytes }, i) => (more[i].peakBytes - peakBytes) / (large.count - small.count))
    measures.push({ quantity, unit: `bytes/${unit}`, values })
  }
  return measures
}

export const memory: BenchCase[] = [
  { name: 'memory', about: 'peak memory with one worker against the number of cells and pixels', native: false, run: memoryEach }
]
