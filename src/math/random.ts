import seedrandom from 'seedrandom'

/** Half of the generator's step, 2^-33: keeps every number off 0 and 1. */
const HALF_STEP = 1 / 2 ** 33

/**
 * Stream of uniform random numbers that depends on nothing but a text, such as `seed/phase/round/batch`.
 * Baagoe's Alea generator of the seedrandom package: period near 2^116, seeded by a hash of the text. 32 bits a number, at the
 * middles of 2^32 equal steps, so 0 and 1 never occur and -ln(u) is at most 22.9.
 */
export function stream(seedText: string): () => number {
  const next = seedrandom.alea(seedText)
  return () => next() + HALF_STEP
}

/** What Alea keeps between numbers: t = 2091639 s0 + c 2^-32 gives the next c, its whole part, and s2, the rest. */
export interface StreamState {
  s0: number
  s1: number
  s2: number
  c: number
}

/** Where `stream` begins, for a loop that draws its numbers itself. */
export function streamState(seedText: string): StreamState {
  return seedrandom.alea(seedText, { state: true }).state() as unknown as StreamState
}
