import { SobolSequence } from './sobol.js'

/**
 * Uniform numbers of which the first few of every packet are a scrambled point of the Sobol sequence, so that all packets of a batch
 * together start more evenly than at random; the others come from the stream. Each batch is scrambled anew by its stream (Owen 1997,
 * Ann. Stat. 25, 1541), so batches are independent and their scatter is an honest error.
 */
export class LeadingDraws {
  private readonly sequence: SobolSequence
  private at: number

  constructor(
    private readonly dimensions: number,
    private readonly uniform: () => number
  ) {
    this.sequence = new SobolSequence(dimensions, uniform)
    this.at = dimensions
  }

  /** Begins the next packet. */
  begin(): void {
    this.sequence.next()
    this.at = 0
  }

  readonly draw = (): number => (this.at < this.dimensions ? this.sequence.point[this.at++] : this.uniform())
}
