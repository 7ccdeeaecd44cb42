import { setTimeout } from 'node:timers/promises'
import { tallyFlights } from '../../src/transport/flights.js'
import { type BenchCase, interleaved, type Measure } from '../case.js'
import { lightDust } from '../lit-dust.js'
import { shellScene } from '../scenes.js'
import { Twin, tallyDifference } from '../twin.js'

const REPETITIONS = 9
const PACKETS = 500_000
/** Ours and the twin round differently where a compiler fuses a product and a sum. */
const SAME = 1e-12

/** The packet loop of a spherical shell against the same operations in C: neither side counts what comes before and after it. */
export const packetLoop: BenchCase[] = [1, 10].map((depth) => ({
  name: `packet-loop-${depth}`,
  about: `packet loop of a shell of optical depth ${depth} against its twin in C, processor time`,
  native: true,
  run: async ({ native, folder }): Promise<Measure[]> => {
    const dust = lightDust(shellScene({ depth, packets: PACKETS }))
    const twin = new Twin(native!, folder, dust)
    const play = (packets: number, seed: string) => {
      const cpu = process.cpuUsage()
      const tally = tallyFlights(dust.medium, packets, seed)
      const { user, system } = process.cpuUsage(cpu)
      return { tally, cpuSeconds: (user + system) / 1e6 }
    }
    // Small batches, and a pause, so that the loop is compiled as it is in a long run.
    for (let i = 0; i < 5; i++) play(PACKETS / 20, `warm-up/${i}`)
    await setTimeout(200)
    const [ours, theirs] = await interleaved(
      REPETITIONS,
      (i) => play(PACKETS, `bench/${i}`),
      (i) => twin.play(PACKETS, `bench/${i}`)
    )
    const nanoseconds = (seconds: number) => (1e9 * seconds) / PACKETS
    return [
      { quantity: 'ours', unit: 'ns/packet', values: ours.map(({ cpuSeconds }) => nanoseconds(cpuSeconds)) },
      { quantity: 'twin', unit: 'ns/packet', values: theirs.map(({ cpuSeconds }) => nanoseconds(cpuSeconds)) },
      {
        quantity: 'speed relative to the twin',
        unit: '',
        values: ours.map(({ cpuSeconds }, i) => theirs[i].cpuSeconds / cpuSeconds),
        target: { atLeast: 0.85 }
      },
      {
        quantity: 'difference of the tallies',
        unit: '',
        values: ours.map(({ tally }, i) => tallyDifference(tally, theirs[i].tally)),
        target: { atMost: SAME }
      }
    ]
  }
}))
