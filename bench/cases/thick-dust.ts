import { join } from 'node:path'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { type CommandRun, runCommand } from '../command.js'
import { diskScene } from '../scenes.js'

const REPETITIONS = 2
const PACKETS = 3e5

/** Packets of the temperatures of a disk with a midplane optical depth of 1e6 against those of one with 1e2. */
async function compareDepths({ folder }: Tools): Promise<Measure[]> {
  const run = (depth: number) => (seed: number) =>
    runCommand({ text: diskScene({ depth, temperature: 'solve', wavelengths: 1, packets: PACKETS }) }, join(folder, 'thick'), {
      seed
    })
  const [thin, thick] = await interleaved(REPETITIONS, run(1e2), run(1e6))
  const each = ({ record }: CommandRun) => (1e6 * record.times.dust.cpuSeconds) / record.packets.equilibrium
  return [
    { quantity: 'midplane optical depth 1e2, processor time', unit: 'us/packet', values: thin.map(each) },
    { quantity: 'midplane optical depth 1e6, processor time', unit: 'us/packet', values: thick.map(each) },
    {
      quantity: 'ratio',
      unit: '',
      values: thick.map((deep, i) => each(deep) / each(thin[i])),
      target: { atMost: 10 }
    }
  ]
}

export const thickDust: BenchCase = {
  name: 'thick-dust',
  about: `temperatures of disks with ${PACKETS} packets, by their optical depth`,
  native: false,
  run: compareDepths
}
