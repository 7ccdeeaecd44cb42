import { mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { runCommand } from '../command.js'
import { lightDust } from '../lit-dust.js'
import type { Native } from '../native.js'
import { PacketPool } from '../packet-pool.js'
import { diskScene, shellScene } from '../scenes.js'
import type { Times } from '../times.js'
import { Twin } from '../twin.js'

const REPETITIONS = 3
const PACKETS = 1e6
/** Packets of the yardstick, some seconds of work. */
const ROD_PACKETS = 2e6

/** A scene and how its run is called. */
interface Load {
  name: string
  about: string
  text: string
}

const loads: Load[] = [
  { name: 'workers', about: `a disk with ${PACKETS} packets`, text: diskScene({ depth: 100, packets: PACKETS }) },
  {
    name: 'workers-spectrum',
    about: `a disk with ${PACKETS} packets for its temperatures and at each of 4 wavelengths`,
    text: diskScene({ depth: 100, packets: PACKETS, temperature: 'solve', wavelengths: 4 })
  }
]

const least = (runs: Times[]) => Math.min(...runs.map(({ wallSeconds }) => wallSeconds))

/**
 * One worker against two. What the main thread does may be done by it alone, so that by Amdahl's law (1967, AFIPS Conf. Proc. 30, 483)
 * n workers take at most main + (all - main) / n of the processor times of a run with one worker: that holds on a busy machine too.
 * Of the times by the clock the shortest count, which others have disturbed least.
 */
async function compareWorkers(text: string, { native, folder }: Tools): Promise<Measure[]> {
  const [one, two] = await interleaved(
    REPETITIONS,
    (seed) => runCommand({ text }, join(folder, 'one'), { workers: 1, seed }),
    (seed) => runCommand({ text }, join(folder, 'two'), { workers: 2, seed })
  )
  const serial = one.map(({ cpuSeconds, mainCpuSeconds }) => mainCpuSeconds / cpuSeconds)
  const speedUp = (workers: number) => serial.map((share) => 1 / (share + (1 - share) / workers))
  return [
    { quantity: 'one worker, wall time', unit: 's', values: one.map(({ wallSeconds }) => wallSeconds) },
    { quantity: 'one worker, processor time', unit: 's', values: one.map(({ cpuSeconds }) => cpuSeconds) },
    { quantity: 'two workers, wall time', unit: 's', values: two.map(({ wallSeconds }) => wallSeconds) },
    { quantity: 'two workers, processor time', unit: 's', values: two.map(({ cpuSeconds }) => cpuSeconds) },
    {
      quantity: 'speed of two workers over one, wall time',
      unit: '',
      values: [least(one) / least(two)],
      target: { atLeast: 1.9 }
    },
    ...(native ? await machineItself(native, folder) : []),
    {
      quantity: 'share of two cores that two workers use',
      unit: '',
      values: two.map(({ cpuSeconds, wallSeconds }) => cpuSeconds / (2 * wallSeconds))
    },
    {
      // Nothing of this is waiting: a machine shared with others cannot spoil it.
      quantity: 'processor time of one worker over that of two',
      unit: '',
      values: one.map(({ cpuSeconds }, i) => cpuSeconds / two[i].cpuSeconds)
    },
    { quantity: 'share of the main thread (serial at most)', unit: '', values: serial },
    { quantity: 'speed of 2 workers by that share', unit: '', values: speedUp(2), target: { atLeast: 1.9 } },
    { quantity: 'speed of 64 workers by that share', unit: '', values: speedUp(64) }
  ]
}

/** What the machine allows: two processes of the packet loop in C, which share nothing, over one. */
async function machineItself(native: Native, folder: string): Promise<Measure[]> {
  const dust = lightDust(shellScene({ depth: 1, packets: ROD_PACKETS }))
  const twins = ['a', 'b'].map((name) => {
    const own = join(folder, name)
    mkdirSync(own, { recursive: true })
    return new Twin(native, own, dust)
  })
  const [alone, together] = await interleaved(
    REPETITIONS,
    () => twins[0].start(ROD_PACKETS, 'yardstick'),
    async () => {
      const both = await Promise.all(twins.map((twin) => twin.start(ROD_PACKETS, 'yardstick')))
      return both[0].wallSeconds > both[1].wallSeconds ? both[0] : both[1]
    }
  )
  return [
    {
      quantity: 'the same of two processes in C that share nothing',
      unit: '',
      values: [(2 * least(alone)) / least(together)]
    }
  ]
}

/** Shares of a run of ten seconds that are not packets or rays. */
async function shareOut({ folder }: Tools): Promise<Measure[]> {
  const text = diskScene({ depth: 100, packets: PACKETS / 4 })
  const { medium } = lightDust(shellScene({ depth: 1, packets: 1 }))
  const startWorker = async () => {
    const start = process.cpuUsage()
    const pool = new PacketPool(medium)
    await pool.play(1, 'start')
    const { user, system } = process.cpuUsage(start)
    await pool.close()
    return (user + system) / 1e6
  }
  const [runs, starts] = await interleaved(
    REPETITIONS,
    (seed) => runCommand({ text }, join(folder, 'shares'), { seed }),
    startWorker
  )
  const share = (quantity: string, seconds: (i: number) => number): Measure => ({
    quantity,
    unit: '',
    values: runs.map((_, i) => seconds(i) / 10),
    target: { atMost: 0.05 }
  })
  const phases = ({ record }: (typeof runs)[0]) =>
    Object.values(record.times).reduce((sum, { cpuSeconds }) => sum + cpuSeconds, 0)
  return [
    { quantity: 'whole run, processor time', unit: 's', values: runs.map(({ cpuSeconds }) => cpuSeconds) },
    share('start of a worker', (i) => starts[i]),
    share('model', (i) => runs[i].record.times.model.cpuSeconds),
    share('products', (i) => runs[i].record.times.files.cpuSeconds),
    { quantity: 'start and end of the program', unit: 's', values: runs.map((run) => run.cpuSeconds - phases(run)) }
  ]
}

export const workerCases: BenchCase[] = [
  ...loads.map(({ name, about, text }) => ({
    name,
    about: `${about} on one worker and on two`,
    native: false,
    run: (tools: Tools) => compareWorkers(text, tools)
  })),
  {
    name: 'shares',
    about: 'processor time of the parts of a run that are not packets or rays, as shares of ten seconds',
    native: false,
    run: shareOut
  }
]
