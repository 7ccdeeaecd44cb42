import { describe, expect, it } from 'vitest'
import type { Estimator } from '../../src/run/estimator.js'
import { Stopped } from '../../src/run/progress.js'
import { runScene } from '../../src/run/run-scene.js'
import type { Ledger, Piece } from '../../src/workers/ledger.js'
import { digest } from './digest.js'
import { smallScene, type smallScenes } from './small-scenes.js'

class Killed extends Error {}

/** A ledger for which a state is always due, and which dies after some words with it. What it held stays in `pieces`. */
class MortalLedger implements Ledger {
  words = 0

  constructor(
    readonly pieces: Map<string, Piece>,
    private readonly life: number
  ) {}

  take(name: string): Piece | undefined {
    return structuredClone(this.pieces.get(name))
  }

  keep(name: string, piece: Piece): void {
    this.live()
    this.pieces.set(name, structuredClone(piece))
  }

  offer(name: string, make: () => Piece): void {
    this.keep(name, make())
  }

  forget(name: string): void {
    this.live()
    this.pieces.delete(name)
  }

  async settle(): Promise<void> {}

  private live(): void {
    if (++this.words > this.life) throw new Killed()
  }
}

const cases: [keyof typeof smallScenes, Estimator][] = [
  ['shell', 'emissivity'],
  ['disk', 'emissivity'],
  ['precise', 'emissivity'],
  ['fitted', 'emissivity'],
  ['polarised', 'emissivity'],
  ['shell', 'peel'],
  ['precise', 'exit']
]

describe('a run that dies and is gone on with', () => {
  it.each(cases)('%s, %s: ends with the same bits wherever it dies', async (kind, estimator) => {
    const options = { workers: 2, estimator, onProgress: () => {} }
    const whole = await runScene(smallScene(kind), options)
    const all = new MortalLedger(new Map(), Number.POSITIVE_INFINITY)
    expect(digest(await runScene(smallScene(kind), { ...options, ledger: all }))).toBe(digest(whole))
    // Dies every so many words, each time with a state a little further, until it comes to its end.
    const life = Math.ceil(all.words / 4)
    const pieces = new Map<string, Piece>()
    let deaths = 0
    for (;;) {
      const ledger = new MortalLedger(pieces, life + deaths)
      const outcome = await runScene(smallScene(kind), { ...options, workers: 1 + (deaths % 3), ledger }).catch((error) => error)
      if (!(outcome instanceof Error)) {
        expect(digest(outcome)).toBe(digest(whole))
        break
      }
      expect(outcome).toBeInstanceOf(Killed)
      deaths++
    }
    expect(deaths).toBeGreaterThanOrEqual(2)
    // Of what was half done nothing is left.
    for (const name of pieces.keys()) expect(name).toMatch(/^(dust|light-\d)$/)
  })

  it('a stop keeps all that was done', async () => {
    const pieces = new Map<string, Piece>()
    const forever = {
      ...smallScene('shell'),
      effort: { precision: null, equilibrium: 5000, cameras: 1e9, equilibriumAsked: true }
    }
    const stop = new AbortController()
    let seen = 0
    const onProgress = ({ stage, done }: { stage: string; done: number }) => {
      if (stage === 'light') seen = done
      if (stage === 'light' && done > 2e5) stop.abort()
    }
    // Offers come to nothing here: only the stop itself keeps.
    const ledger: Ledger = Object.assign(new MortalLedger(pieces, Number.POSITIVE_INFINITY), { offer: () => {} })
    const run = runScene(forever, { workers: 2, estimator: 'emissivity', onProgress, stop: stop.signal, ledger })
    await expect(run).rejects.toThrow(Stopped)
    const kept = pieces.get('packets-0') as { done: number; sums: { packets: number[] } }
    expect(kept.sums.packets.reduce((sum, packets) => sum + packets)).toBe(seen)
    expect(kept.done).toBeGreaterThan(0)
  })
})
