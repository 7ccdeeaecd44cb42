import { join } from 'node:path'
import { readDoubles } from './doubles.js'
import { type LitDust, writeMedium } from './lit-dust.js'
import type { Native } from './native.js'
import type { Times } from './times.js'

/** The packet loop in C: native/flights.c. */
export class Twin {
  private readonly medium: string
  private readonly tally: string

  constructor(
    private readonly native: Native,
    folder: string,
    dust: LitDust
  ) {
    this.medium = join(folder, 'medium.bin')
    this.tally = join(folder, 'tally.bin')
    writeMedium(this.medium, dust)
  }

  play(packets: number, seed: string): Times & { tally: Float64Array } {
    const times = this.native(...this.words(packets, seed))
    return { ...times, tally: readDoubles(this.tally) }
  }

  /** The same without its tally; several twins may play at a time, each with a folder of its own. */
  start(packets: number, seed: string): Promise<Times> {
    return this.native.start(...this.words(packets, seed))
  }

  private words(packets: number, seed: string): [string, ...(string | number)[]] {
    return ['flights', this.medium, this.tally, seed, packets, Math.round(packets / 5)]
  }
}

/** Largest difference of two tallies, relative to the largest value. */
export function tallyDifference(a: Float64Array, b: Float64Array): number {
  const most = a.reduce((high, value) => Math.max(high, value), 0)
  return a.reduce((worst, value, i) => Math.max(worst, Math.abs(value - b[i])), 0) / most
}
