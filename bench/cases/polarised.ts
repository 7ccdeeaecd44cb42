import { join } from 'node:path'
import { type BenchCase, interleaved } from '../case.js'
import { runCommand } from '../command.js'
import { diskScene, shellScene } from '../scenes.js'

const REPETITIONS = 3

/** Whole runs with Stokes parameters against the same without: the mean cosine of both laws is 0. */
const scenes = [
  { name: 'shell-1', scene: (phase: string) => shellScene({ depth: 1, packets: 1e6, phase }) },
  { name: 'shell-10', scene: (phase: string) => shellScene({ depth: 10, packets: 3e5, phase }) },
  { name: 'disk', scene: (phase: string) => diskScene({ depth: 100, packets: 3e4, grid: [60, 40, 1], phase }) }
]

export const polarisedCases: BenchCase[] = scenes.map(({ name, scene }) => ({
  name: `polarised-${name}`,
  about: 'a run with polarisation (Rayleigh) against one without (isotropic), processor time',
  native: false,
  run: async ({ folder }) => {
    const run = (phase: string, seed: number) => runCommand({ text: scene(phase) }, join(folder, phase), { seed })
    const [polarised, plain] = await interleaved(
      REPETITIONS,
      (seed) => run('rayleigh', seed),
      (seed) => run('isotropic', seed)
    )
    return [
      { quantity: 'polarised', unit: 's', values: polarised.map(({ cpuSeconds }) => cpuSeconds) },
      { quantity: 'unpolarised', unit: 's', values: plain.map(({ cpuSeconds }) => cpuSeconds) },
      {
        quantity: 'polarised over unpolarised',
        unit: '',
        values: polarised.map(({ cpuSeconds }, i) => cpuSeconds / plain[i].cpuSeconds),
        target: { atMost: 2.5 }
      },
      {
        quantity: 'the same, scattered light and pictures alone',
        unit: '',
        values: polarised.map(({ record }, i) => record.times.light.cpuSeconds / plain[i].record.times.light.cpuSeconds)
      }
    ]
  }
}))
