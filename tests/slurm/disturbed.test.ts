import { setTimeout } from 'node:timers/promises'
import { expect } from 'vitest'
import { itWith } from '../support/python.js'
import { Cluster, slurmTool } from './cluster.js'
import { planText, sweep, sweepFolder, tablesOf, tasksOf } from './sweeps.js'

/** Resolves to the first thing found; `seen` tells what there was instead. */
async function found<Thing>(what: string, look: () => Thing | undefined, seen: () => string = () => ''): Promise<Thing> {
  for (const start = Date.now(); Date.now() - start < 120_000; await setTimeout(100)) {
    const thing = look()
    if (thing !== undefined) return thing
  }
  throw new Error(`not found in time: ${what} ${seen()}`)
}

/*
 * One sweep meets all that may happen to jobs: the controller killed and started again, a task killed, a node lost and back, a task
 * over its time (it is stopped, and Slurm counts on), then what is left submitted again, cancelled, and submitted once more.
 */
itWith(slurmTool, 'a sweep that everything happens to has the table of an undisturbed one', async () => {
  const packets = 60_000
  const here = sweepFolder(planText, packets)
  const folder = sweepFolder(planText, packets)
  const cluster = await Cluster.start({ nodes: 2, cpus: 2 })
  try {
    const motelight = (...words: string[]) => sweep(folder, cluster.env, ...words)
    const states = () => cluster.call('squeue', '--noheader', '--array', '--states=all', '--format=%T').stdout.split('\n')
    const task = (kind: string, node = '') => found(`a task of ${kind}`, () => tasksOf(folder, kind, node)[0])
    await motelight('--on', 'slurm', '--slurm', 'time=1')

    const first = await task('dust')
    process.kill(first, 'SIGSTOP')
    // What a controller was told within its last seconds it may forget when it dies; it saves its state every few.
    await setTimeout(8000)
    await cluster.kill('slurmctld')
    cluster.launch('slurmctld')
    await found('the controller', () => (cluster.call('sinfo').status === 0 ? true : undefined))
    process.kill(first, 'SIGKILL')
    await found('the end of the killed task', () => states().find((state) => state === 'FAILED'))

    process.kill(await task('models', 'n2'), 'SIGSTOP')
    // The process on the lost node waits until Slurm has given its task away, and goes on beside the other.
    const orphan = await task('models', 'n1')
    process.kill(orphan, 'SIGSTOP')
    await cluster.kill('n1')
    // By its log: sinfo calls a lost node `mixed*` when only some of its processors had been given away.
    const log = () => cluster.log('slurmctld')
    await found('the loss of the node', () => (log().includes('n1 not responding, setting DOWN') ? true : undefined), log)
    process.kill(orphan, 'SIGCONT')
    cluster.launch('n1')

    const waited = await motelight('--wait')
    expect(waited.stdout).toMatch(/\d ended: TIMEOUT/)
    expect(waited.exitCode).toBe(3)

    const status = JSON.parse((await motelight('--status', '--json')).stdout) as { unfinished: number }
    expect(status.unfinished).toBeGreaterThan(0)
    await motelight('--on', 'slurm')
    await task('models')
    expect(await motelight('--cancel')).toMatchObject({ exitCode: 0 })
    expect(tasksOf(folder, 'models')).toEqual([])

    await motelight('--on', 'slurm')
    expect(await motelight('--wait')).toMatchObject({ exitCode: 0, stdout: expect.stringContaining('8 of 8 models done') })
  } finally {
    await cluster.stop()
  }
  await sweep(here, {})
  expect(tablesOf(folder)).toEqual(tablesOf(here))
})
