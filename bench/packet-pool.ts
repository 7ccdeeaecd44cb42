import type { Observers } from '../src/transport/observers.js'
import type { ScatterMedium } from '../src/transport/scatter-medium.js'
import { WorkerPool } from '../src/workers/pool.js'
import type { Times } from './times.js'

const thread = new URL('../src/run/thread.js', import.meta.url)

/** A worker of the program that plays batches of packets in one medium, timed. */
export class PacketPool {
  private readonly pool = new WorkerPool(1, thread)

  private readonly observers?: Observers

  /** `directions`: unit vectors to observers of cells of two or three dimensions, see `tallyTowards`; none in one dimension. */
  constructor(medium: ScatterMedium, directions?: Float64Array) {
    if (directions) this.observers = { directions, places: [] }
    this.pool.share('scattering', medium)
  }

  async play(packets: number, seed: string): Promise<Times & { tally: Float64Array }> {
    const name = this.observers ? 'towards' : 'flights'
    const input = { packets, seed, observers: this.observers }
    let tally = new Float64Array(0)
    const wall = performance.now()
    const cpu = process.cpuUsage()
    await this.pool.run([{ name, input }], (output) => {
      tally = output as Float64Array<ArrayBuffer>
    })
    const { user, system } = process.cpuUsage(cpu)
    return { tally, wallSeconds: (performance.now() - wall) / 1000, cpuSeconds: (user + system) / 1e6 }
  }

  /** Many small batches, so that the loop runs as it does in a long run. */
  async warmUp(packets: number): Promise<void> {
    for (let i = 0; i < 10; i++) await this.play(packets / 10, `warm-up/${i}`)
  }

  close(): Promise<void> {
    return this.pool.close()
  }
}
