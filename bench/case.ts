import type { Native } from './native.js'

/** A case of the bench: what it is called, what it shows, and how it is measured. */
export interface BenchCase {
  name: string
  about: string
  /** Needs the yardsticks in C. */
  native: boolean
  run: (tools: Tools) => Promise<Measure[]>
}

export interface Tools {
  /** Absent where there is no compiler. */
  native?: Native
  /** A folder to write in; it goes when the bench ends. */
  folder: string
}

/** One quantity, once for each repetition. */
export interface Measure {
  quantity: string
  unit: string
  values: number[]
  /** What the project asks for. */
  target?: { atLeast: number } | { atMost: number }
}

/** Runs the sides in turn, A B A B, so that a machine that slows down slows all of them; one list of results for each side. */
export async function interleaved<T extends unknown[]>(
  repetitions: number,
  ...sides: { [K in keyof T]: (repetition: number) => Promise<T[K]> | T[K] }
): Promise<{ [K in keyof T]: T[K][] }> {
  const results = sides.map((): unknown[] => [])
  for (let i = 0; i < repetitions; i++) {
    for (const [k, side] of sides.entries()) results[k].push(await side(i))
  }
  return results as { [K in keyof T]: T[K][] }
}
