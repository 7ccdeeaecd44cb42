import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { filesIn, program, sceneWith } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'
import { visibilityPlan, visibilityText } from './example.js'

/** Sweeps killed; `npm run test:sweep` asks for 20. */
const KILLED = Number(process.env.KILLED_SWEEPS ?? 3)

const files = {
  'scene.yaml': sceneWith(['equilibrium: 8000, cameras: 2000', 'equilibrium: 20000, cameras: 20000']),
  'plan.yaml': `scene: scene.yaml
vary:
  dust.wind.amount.optical-depth: [0.5, 1, 2]
  spectra.sed.view.inclination: [0 deg, 60 deg]
${visibilityPlan}`,
  'uv.csv': visibilityText
}
const words = [program, 'sweep', 'plan.yaml', '--quiet', '--workers', '2']
const tables = (folder: string) =>
  ['models.ecsv', 'models.parquet'].map((name) => readFileSync(join(folder, 'out/plan', name)).toString('base64'))

describe('sweeps killed with SIGKILL at random moments and gone on with', () => {
  it('end with the same tables and files', { timeout: 1000 * (120 + 60 * KILLED) }, async () => {
    const undisturbed = folderWith(files)
    const start = performance.now()
    expect(await execa(process.execPath, words, { cwd: undisturbed, reject: false })).toMatchObject({ exitCode: 0, stderr: '' })
    const duration = performance.now() - start
    const uniform = stream('killed sweeps')
    let begun = 0
    let folder = folderWith(files)
    for (let kills = 0; kills < KILLED; ) {
      const run = execa(process.execPath, words, { cwd: folder, reject: false })
      const killer = new AbortController()
      setTimeout((0.1 + 0.8 * uniform()) * duration, undefined, { signal: killer.signal }).then(
        () => run.kill('SIGKILL'),
        () => {}
      )
      const { isTerminated } = await run
      killer.abort()
      if (isTerminated) {
        kills++
        if (existsSync(join(folder, 'out/plan/sweep.json'))) begun++
      } else {
        expect(tables(folder)).toEqual(tables(undisturbed))
        folder = folderWith(files)
      }
    }
    const last = await execa(process.execPath, words, { cwd: folder, reject: false })
    expect(last).toMatchObject({ exitCode: 0, stderr: '' })
    expect(last.stdout).toContain('6 of 6 models done')
    expect(tables(folder)).toEqual(tables(undisturbed))
    expect(filesIn(join(folder, 'out/plan'))).toEqual(filesIn(join(undisturbed, 'out/plan')))
    expect(begun).toBeGreaterThan(0)
  })
})
