import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, program, sceneWith } from './motelight.js'

const long = sceneWith(['precision: none, equilibrium: 8000', 'precision: none, equilibrium: 1e9'])

describe('stopping', () => {
  it.each(['SIGINT', 'SIGTERM'] as const)('%s: exit code 3, the command that goes on with it, no products', async (signal) => {
    const folder = folderWith({ 'scene.yaml': long })
    const run = execa('node', [program, 'run', 'scene.yaml'], { cwd: folder, reject: false, stdin: 'ignore' })
    // Progress is shown once the run is under way.
    run.stderr.once('data', () => run.kill(signal))
    const { exitCode, stderr, stdout } = await run
    expect(exitCode).toBe(3)
    expect(stderr).toMatch(/dust temperatures, round 1: \d+ % of \d+ packets/)
    expect(stderr).toMatch(/Stopped before the end\..*\n +motelight run scene\.yaml --resume$/)
    expect(stdout).toBe('')
    expect(filesIn(folder).filter((file) => /\.(json|fits|png|ecsv|svg)$/.test(file))).toEqual([])
  })

  it('a reader that goes away early is no error', async () => {
    const folder = folderWith({ 'scene.yaml': long })
    const { stdout, stderr, exitCode } = await execa({
      cwd: folder,
      shell: '/bin/bash'
    })`set -o pipefail; node ${program} schema | head -n 1`
    expect({ stdout, stderr, exitCode }).toEqual({ stdout: '{', stderr: '', exitCode: 0 })
  })
})

describe('schema', () => {
  it('prints the JSON Schema', async () => {
    const { stdout, exitCode } = await motelight(folderWith(), 'schema')
    expect(exitCode).toBe(0)
    expect(JSON.parse(stdout)).toMatchObject({ $schema: 'https://json-schema.org/draft/2020-12/schema', type: 'object' })
  })
})
