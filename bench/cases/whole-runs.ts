import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { parse, stringify } from 'yaml'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { type CommandRun, runCommand } from '../command.js'
import { diskScene, envelopeScene } from '../scenes.js'
import { openYardstick } from '../yardstick.js'

const REPETITIONS = 1

interface WholeRun {
  name: string
  about: string
  scene: { text: string } | { file: string }
  workers?: number
  /** Most wall time, s. */
  atMost?: number
  measures?: (runs: CommandRun[]) => Measure[]
}

const lastRound = ({ record }: CommandRun) => record.equilibrium!.rounds.at(-1)!

const temperatures =
  (precision: number) =>
  (runs: CommandRun[]): Measure[] => [
    { quantity: 'temperature phase, processor time', unit: 's', values: runs.map(({ record }) => record.times.dust.cpuSeconds) },
    { quantity: 'packets', unit: '', values: runs.map(({ record }) => record.packets.equilibrium) },
    {
      quantity: 'relative error of temperatures',
      unit: '',
      values: runs.map((run) => lastRound(run).relativeError),
      target: { atMost: precision }
    },
    {
      quantity: 'interactions a packet',
      unit: '',
      values: runs.map((run) => lastRound(run).interactions / lastRound(run).packets)
    }
  ]

const files = (name: string) => fileURLToPath(new URL(`../../../scenes/${name}`, import.meta.url))

/** The example of a disk with one of its cameras, 90 wavelengths, and 1 %. */
function wholeDisk(): string {
  const scene = parse(readFileSync(files('young-disk.yaml'), 'utf8'))
  scene.opacities.grains.file = files(scene.opacities.grains.file)
  scene.effort = { precision: '1 %' }
  scene.cameras = scene.cameras.filter(({ name }: { name: string }) => name === 'slant')
  scene.spectra[0].wavelengths = { from: '0.45 um', to: '2 mm', count: 90 }
  return stringify(scene)
}

const wholeRuns: WholeRun[] = [
  ...[1, 10, 100].map((depth) => ({
    name: `temperature-${depth}`,
    about: `temperatures of the spherical benchmark, optical depth ${depth} at 1 um, to 1 %`,
    scene: { text: envelopeScene(depth, '1 %') },
    measures: temperatures(0.01)
  })),
  ...[1e2, 1e4, 1e6].map((depth) => ({
    name: `temperature-disk-${depth.toExponential(0).replace('+', '')}`,
    about: `temperatures of a disk of midplane optical depth ${depth.toExponential(0)}, to 1 %`,
    scene: { text: diskScene({ depth, temperature: 'solve', wavelengths: 1, precision: '1 %' }) },
    measures: temperatures(0.01)
  })),
  {
    name: 'spectrum-90',
    about: 'spectrum of a disk at 90 wavelengths to 1 %, temperatures included, two workers',
    scene: { text: diskScene({ depth: 1e4, temperature: 'solve', wavelengths: 90, precision: '1 %' }) },
    workers: 2
  },
  {
    name: 'disk-whole',
    about: 'young-disk.yaml with a spectrum of 90 wavelengths and one picture at three, to 1 %, two workers',
    scene: { text: wholeDisk() },
    workers: 2,
    atMost: 30
  },
  {
    name: 'young-disk',
    about: 'the example scene young-disk.yaml, two workers',
    scene: { file: files('young-disk.yaml') },
    workers: 2
  }
]

async function measureRun({ scene, workers, atMost, measures }: WholeRun, tools: Tools): Promise<Measure[]> {
  const yardstick = await openYardstick(tools)
  const [runs, rods] = await interleaved(
    REPETITIONS,
    (seed) => runCommand(scene, join(tools.folder, 'run'), { workers, seed }),
    () => yardstick.measure()
  )
  await yardstick.close()
  return [
    {
      quantity: 'wall time',
      unit: 's',
      values: runs.map(({ wallSeconds }) => wallSeconds),
      ...(atMost && { target: { atMost } })
    },
    { quantity: 'processor time', unit: 's', values: runs.map(({ cpuSeconds }) => cpuSeconds) },
    {
      quantity: 'processor time over that of the yardstick',
      unit: '',
      values: runs.map(({ cpuSeconds }, i) => cpuSeconds / rods[i].cpuSeconds)
    },
    ...(measures?.(runs) ?? [])
  ]
}

/** Runs as a user starts them, timed against a fixed piece of work. */
export const wholeRunCases: BenchCase[] = wholeRuns.map((run) => ({
  name: run.name,
  about: run.about,
  native: false,
  run: (tools) => measureRun(run, tools)
}))
