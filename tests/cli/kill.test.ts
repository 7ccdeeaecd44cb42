import { createHash } from 'node:crypto'
import { existsSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { setTimeout } from 'node:timers/promises'
import { execa } from 'execa'
import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, program, sceneWith } from './motelight.js'

/** Runs killed in all; `npm run test:kill` asks for 50. */
const KILLED = Number(process.env.KILLED ?? 4)
/** Kills of one run at most, so that it comes to its end. */
const MOST_KILLS = 3

const shell = '{kind: shell, inner: 10 au, outer: 1000 au, slope: -2}'
const disk = '{kind: disk, inner: 10 au, outer: 1000 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.1}}'
const scenes: [string, string][] = [
  ['shell', sceneWith(['equilibrium: 8000, cameras: 2000', 'equilibrium: 2e5, cameras: 1e5'])],
  [
    'disk',
    sceneWith(
      [shell, disk],
      ['radial: 20', 'radial: 20, polar: 12'],
      ['equilibrium: 8000, cameras: 2000', 'equilibrium: 3e4, cameras: 5000']
    )
  ]
]
const words = ['run', 'scene.yaml', '--quiet']

function digests(folder: string): string[] {
  return ['images/face.fits', 'spectra/sed.ecsv', 'dust/cells.fits', 'images/face-2.2um.png'].map((file) =>
    createHash('sha256')
      .update(readFileSync(join(folder, 'out/scene', file)))
      .digest('hex')
  )
}

describe('runs killed with SIGKILL at random moments and gone on with', () => {
  it.each(scenes)('%s: end with the same files', { timeout: 1000 * (60 + 60 * KILLED) }, async (kind, text) => {
    const undisturbed = folderWith({ 'scene.yaml': text })
    const start = performance.now()
    await motelight(undisturbed, ...words)
    const duration = performance.now() - start
    const expected = digests(undisturbed)
    const uniform = stream(`kill/${kind}`)
    let withState = 0
    for (let n = 0; n < KILLED / scenes.length; n++) {
      const folder = folderWith({ 'scene.yaml': text })
      for (let kills = 0; ; kills++) {
        const all = kills === 0 ? words : [...words, '--resume']
        const run = execa('node', [program, ...all], { cwd: folder, reject: false })
        const killer = new AbortController()
        if (kills < MOST_KILLS)
          setTimeout((0.1 + 0.9 * uniform()) * duration, undefined, { signal: killer.signal }).then(
            () => run.kill('SIGKILL'),
            () => {}
          )
        const { exitCode, isTerminated, stderr } = await run
        killer.abort()
        if (isTerminated) {
          if (existsSync(join(folder, 'out/scene/state'))) withState++
          continue
        }
        expect({ exitCode, stderr }).toEqual({ exitCode: 0, stderr: '' })
        break
      }
      expect(digests(folder), `run ${n}`).toEqual(expected)
      expect(filesIn(join(folder, 'out/scene')), `run ${n}`).toEqual(filesIn(join(undisturbed, 'out/scene')))
    }
    // Some were killed after they had kept something, or nothing was tested.
    expect(withState).toBeGreaterThan(0)
  })
})
