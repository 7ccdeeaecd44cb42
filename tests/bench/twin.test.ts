import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { lightDust } from '../../bench/lit-dust.js'
import { compileNative } from '../../bench/native.js'
import { shellScene } from '../../bench/scenes.js'
import { Twin, tallyDifference } from '../../bench/twin.js'
import { tallyFlights } from '../../src/transport/flights.js'
import { folderWith } from '../support/folder-with.js'

const folder = folderWith()
const native = compileNative(fileURLToPath(new URL('../../bench/native', import.meta.url)), folder)
const PACKETS = 20_000

/** The twin in C was written apart from the loop and draws the same random numbers: only rounding may tell the tallies apart. */
describe.skipIf(!native)('the twin of the packet loop in C', () => {
  it.each([0.1, 1, 10])('has the same tally at optical depth %f', (depth) => {
    const dust = lightDust(shellScene({ depth, packets: PACKETS }))
    const ours = tallyFlights(dust.medium, PACKETS, 'twin')
    const { tally, wallSeconds, cpuSeconds } = new Twin(native!, folder, dust).play(PACKETS, 'twin')
    expect(tally.length).toBe(ours.length)
    expect(tallyDifference(ours, tally)).toBeLessThan(1e-12)
    expect(wallSeconds).toBeGreaterThan(0)
    expect(cpuSeconds).toBeGreaterThan(0)
  })

  it('differs with another stream, so that the comparison could fail', () => {
    const dust = lightDust(shellScene({ depth: 1, packets: PACKETS }))
    const ours = tallyFlights(dust.medium, PACKETS, 'twin')
    const { tally } = new Twin(native!, folder, dust).play(PACKETS, 'another')
    expect(tallyDifference(ours, tally)).toBeGreaterThan(1e-4)
  })
})
