import { rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { runScene } from '../../src/run/run-scene.js'
import { identityOf } from '../../src/run/state/identity.js'
import { StateFolder } from '../../src/run/state/state-folder.js'
import { readScene } from '../../src/scene/read.js'
import { divide } from '../../src/solve/batches.js'
import { addTally, emptySums } from '../../src/solve/group-sums.js'
import { type BenchCase, interleaved, type Measure, type Tools } from '../case.js'
import { lightDust } from '../lit-dust.js'
import { PacketPool } from '../packet-pool.js'
import { diskScene, shellScene } from '../scenes.js'

const REPETITIONS = 5
/** About a minute of processor time: temperatures and two cameras. */
const PACKETS = 1.5e6

/** Processor time of the same run with and without its state on disk. */
async function compareState({ folder }: Tools): Promise<Measure[]> {
  const file = join(folder, 'state.yaml')
  writeFileSync(file, diskScene({ depth: 100, packets: PACKETS, temperature: 'solve', inclinations: [30, 80] }))
  const scene = readScene(file)
  const path = join(folder, 'state')
  const run = async (kept: boolean) => {
    const ledger = kept ? new StateFolder(path, identityOf(scene, 'emissivity')) : undefined
    const start = process.cpuUsage()
    await runScene(scene, { workers: 2, estimator: 'emissivity', onProgress: () => {}, ...(ledger && { ledger }) })
    const { user, system } = process.cpuUsage(start)
    rmSync(path, { recursive: true, force: true })
    return (user + system) / 1e6
  }
  const [without, with_] = await interleaved(
    2,
    () => run(false),
    () => run(true)
  )
  return [
    { quantity: 'run that keeps no state, processor time', unit: 's', values: without },
    { quantity: 'run that keeps its state, processor time', unit: 's', values: with_ },
    {
      quantity: 'what keeping the state adds',
      unit: '',
      values: with_.map((seconds, i) => seconds / without[i] - 1),
      target: { atMost: 0.03 }
    }
  ]
}

/** What the main thread does with the tally of a batch against what a worker does to make it. */
async function compareReduction(text: string, observers?: Float64Array): Promise<Measure[]> {
  const { medium } = lightDust(text)
  const { packets } = divide(1e6, medium.cells)
  const pool = new PacketPool(medium, observers)
  await pool.warmUp(10 * packets)
  const sums = emptySums()
  const shares: number[] = []
  for (let i = 0; i < 20 * REPETITIONS; i++) {
    const { tally, cpuSeconds } = await pool.play(packets, `bench/${i}`)
    const start = process.cpuUsage()
    addTally(sums, i % 16, tally, packets)
    const { user, system } = process.cpuUsage(start)
    shares.push((user + system) / 1e6 / cpuSeconds)
  }
  await pool.close()
  return [{ quantity: 'ordered reduction over packets', unit: '', values: shares.slice(16), target: { atMost: 0.02 } }]
}

export const stateCases: BenchCase[] = [
  { name: 'state', about: 'a disk of about a minute with its state on disk and without', native: false, run: compareState },
  {
    name: 'reduction-shell',
    about: 'adding the tallies of a shell in their order, against making them',
    native: false,
    run: () => compareReduction(shellScene({ depth: 1, packets: 1 }))
  },
  {
    name: 'reduction-disk',
    about: 'adding the tallies of a disk in their order, against making them',
    native: false,
    run: () => compareReduction(diskScene({ depth: 100, packets: 1 }), Float64Array.of(Math.sin(1), 0, Math.cos(1)))
  }
]
