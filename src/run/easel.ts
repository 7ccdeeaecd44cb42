import { setImmediate } from 'node:timers/promises'
import type { Scene } from '../scene/types.js'
import type { Shown } from './shown.js'

/** Draws the pictures of a run as soon as what they show is known, while threads are at work on something else. */
export class Easel {
  /** Contents of files that are drawn, by their names. */
  private readonly drawn = new Map<string, string | Uint8Array>()
  private turn: Promise<void> = Promise.resolve()
  private ended = false

  constructor(
    private readonly scene: Scene,
    private readonly edges: boolean
  ) {}

  begin(shown: Shown): void {
    // What fails is made again when it has to be written, and told then.
    this.turn = this.turn.then(() => this.draw(shown)).catch(() => {})
  }

  /** All that was begun, when it is drawn. */
  async all(): Promise<ReadonlyMap<string, string | Uint8Array>> {
    await this.turn
    return this.drawn
  }

  /** Draws no more. */
  end(): void {
    this.ended = true
  }

  private async draw(shown: Shown): Promise<void> {
    // Drawing needs large packages; other commands start faster without them.
    const { picturesOf } = await import('./pictures.js')
    for (const { file, make } of picturesOf(shown, this.scene, this.edges)) {
      // Between two pictures threads get their next tasks.
      await setImmediate()
      if (this.ended) return
      this.drawn.set(file, await make())
    }
  }
}
