import { chmodSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { itWith } from '../support/python.js'
import { Cluster, slurmTool } from './cluster.js'
import { sweep, sweepFolder, tablesOf } from './sweeps.js'

const onePath = 'vary: {dust.wind.amount.optical-depth: [0.5, 1]}\n'

describe('sweeps on Slurm', () => {
  let cluster: Cluster
  beforeAll(async () => {
    if (slurmTool.present) cluster = await Cluster.start({ nodes: 2, cpus: 4, maxArraySize: 4 })
  })
  afterAll(() => cluster?.stop())
  const jobs = () => cluster.call('squeue', '--noheader', '--states=all', '--format=%j %T').stdout.trim().split('\n')
  const live = () => jobs().filter((line) => /PENDING|RUNNING/.test(line))

  itWith(slurmTool, 'arrays beyond MaxArraySize give the bits of one machine', async () => {
    const here = sweepFolder()
    const local = await sweep(here, cluster.env)
    expect(local).toMatchObject({ exitCode: 0, stderr: '' })
    const there = sweepFolder()
    const sent = await sweep(there, cluster.env, '--on', 'slurm')
    expect(sent).toMatchObject({ exitCode: 0, stderr: '' })
    // Eight models of one task each in arrays of at most four, four dust temperatures, and the table.
    expect(new Set(jobs().map((line) => line.split(' ')[0])).size).toBe(4)
    const waited = await sweep(there, cluster.env, '--wait')
    expect(waited).toMatchObject({ exitCode: 0, stderr: '' })
    expect(waited.stdout).toContain('8 of 8 models done')
    expect(tablesOf(there)).toEqual(tablesOf(here))
    const done = await sweep(there, cluster.env, '--on', 'slurm')
    expect(done.stdout).toContain('8 of 8 models done')
    expect(live()).toEqual([])
  })

  itWith(slurmTool, 'a dependency that can never be met is reported, not waited for', async () => {
    const failed = cluster.call('sbatch', '--parsable', '--output=/dev/null', '--wrap=false').stdout.trim()
    const folder = sweepFolder(`scene: scene.yaml\n${onePath}slurm: {lines: ["#SBATCH --dependency=afterok:${failed}"]}\n`)
    await sweep(folder, cluster.env, '--on', 'slurm')
    const twice = await sweep(folder, cluster.env, '--on', 'slurm')
    expect(twice).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('in the queue already') })
    const too = await sweep(folder, cluster.env)
    expect(too).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('in the queue of Slurm') })
    const waited = await sweep(folder, cluster.env, '--wait')
    expect(waited.exitCode).toBe(3)
    expect(waited.stdout).toContain('waits for what can never come (DependencyNeverSatisfied)')
    const cancelled = await sweep(folder, cluster.env, '--cancel')
    expect(cancelled.exitCode).toBe(0)
    expect(live()).toEqual([])
  })

  itWith(slurmTool, 'what Slurm refuses is told, and nothing is left behind', async () => {
    const folder = sweepFolder(`scene: scene.yaml\n${onePath}`)
    const refused = await sweep(folder, cluster.env, '--on', 'slurm', '--slurm', 'partition=nowhere')
    expect(refused.exitCode).toBe(2)
    expect(refused.stderr).toMatch(/^sbatch: .*invalid partition.*; nothing was submitted$/s)
    const unknown = await sweep(folder, cluster.env, '--on', 'slurm', '--slurm', 'partitoin=test')
    expect(unknown).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('did you mean `partition`?') })
    // A stand-in that lets the first job pass and refuses the second.
    const bin = folderWith({
      sbatch:
        '#!/bin/sh\nif [ -e "$0.called" ]; then echo "no more jobs" >&2; exit 1; fi\ntouch "$0.called"\nexec /usr/bin/sbatch "$@"\n'
    })
    chmodSync(join(bin, 'sbatch'), 0o755)
    const half = await sweep(folder, { ...cluster.env, PATH: `${bin}:${cluster.env.PATH}` }, '--on', 'slurm')
    expect(half).toMatchObject({ exitCode: 2, stderr: 'sbatch: no more jobs; nothing was submitted' })
    expect(live()).toEqual([])
    expect(readdirSync(join(folder, 'out/plan/slurm')).filter((name) => name.startsWith('submission'))).toEqual([])
    // The sweep is as before: it can be made.
    expect(await sweep(folder, cluster.env)).toMatchObject({ exitCode: 0 })
  })

  itWith(slurmTool, 'large models are cut into parts, and have the bits of whole ones', async () => {
    const here = sweepFolder(`scene: scene.yaml\n${onePath}`, 20_000)
    const there = sweepFolder(`scene: scene.yaml\n${onePath}slurm: {parts: 3}\n`, 20_000)
    await sweep(there, cluster.env, '--on', 'slurm')
    expect((await sweep(there, cluster.env, '--wait')).stdout).toContain('2 of 2 models done')
    await sweep(here, cluster.env)
    expect(tablesOf(there)).toEqual(tablesOf(here))
    const precise = sweepFolder(`scene: scene.yaml\n${onePath}precision: 5 %\n`)
    const refused = await sweep(precise, cluster.env, '--on', 'slurm', '--slurm', 'parts=2')
    expect(refused).toMatchObject({ exitCode: 2, stderr: expect.stringContaining('parts need `precision: none`') })
  })

  itWith(slurmTool, 'names with quotes, blanks and per cents go through scripts and paths', async () => {
    const folder = sweepFolder(`scene: scene.yaml\n${onePath}`, 2000, `it's 100% "$HOME" \`x\``)
    expect(await sweep(folder, cluster.env, '--on', 'slurm')).toMatchObject({ exitCode: 0, stderr: '' })
    expect((await sweep(folder, cluster.env, '--wait')).stdout).toContain('2 of 2 models done')
  })
})

describe('without Slurm', () => {
  it('says so, and the sweep can be made here', async () => {
    const folder = sweepFolder(`scene: scene.yaml\n${onePath}`)
    const { exitCode, stderr } = await sweep(folder, { PATH: folderWith() }, '--on', 'slurm')
    expect({ exitCode, stderr }).toEqual({ exitCode: 2, stderr: 'this machine has no Slurm: there is no `scontrol`' })
    expect(await sweep(folder, { PATH: folderWith() })).toMatchObject({ exitCode: 0, stderr: '' })
  })
})
