import { expect, it } from 'vitest'
import { packetsNeeded } from '../../src/run/packets-needed.js'
import { resultWarnings } from '../../src/run/result-warnings.js'
import type { RunResult } from '../../src/run/run-result.js'
import { runScene } from '../../src/run/run-scene.js'
import { smallScene } from './small-scenes.js'

const run = (equilibrium: number, cameras: number): Promise<RunResult> =>
  runScene(
    { ...smallScene('shell'), effort: { precision: 0.01, equilibrium, cameras, equilibriumAsked: true } },
    { workers: 2, estimator: 'emissivity', onProgress: () => {} }
  )

it('tells how many packets would have reached the precision, apart for temperatures and scattered light', async () => {
  const few = await run(5000, 1000)
  const needed = packetsNeeded(few)
  expect(needed.equilibrium).toBeGreaterThan(5000)
  expect(needed.cameras).toBeGreaterThan(1000)
  const warnings = resultWarnings(few).join('\n')
  expect(warnings).toMatch(
    /dust temperatures: 5000 packets were too few for 1 %.* it would take about \d(\.\d)?e\d+: effort\.equilibrium/
  )
  expect(warnings).toMatch(
    /scattered light: 1000 packets were too few for 1 %; it would take about \d(\.\d)?e\d+ .*: effort\.cameras/
  )

  // An error from 16 groups is itself known to 18 %, the number of packets to 36 %, and so is that at which the second run finds its
  // precision reached: together 51 %. Allowed are 3.5 sigma of the logarithm, a factor of 6, exceeded by chance once in 2000 times.
  const enough = await run(6 * needed.equilibrium!, 6 * needed.cameras!)
  expect(packetsNeeded(enough)).toEqual({})
  expect(enough.equilibrium!.reached).toBe(true)
  const spent = Math.max(...enough.lightPackets.map(({ packets }) => packets))
  expect(spent).toBeGreaterThan(needed.cameras! / 6)
  // Exactly the packets given: nothing is missing then.
  expect(
    packetsNeeded(await runScene(smallScene('shell'), { workers: 1, estimator: 'emissivity', onProgress: () => {} }))
  ).toEqual({})
})
