import { describe, expect, it } from 'vitest'
import { stream, streamState } from '../../src/math/random.js'
import { chiSquareSigmas } from '../support/chi-square.js'

/** Sigmas of the counts of pairs (a, b) of uniforms in side x side equal squares. */
function pairSigmas(pairs: number, side: number, next: (i: number) => [number, number]): number {
  const counts = new Float64Array(side * side)
  for (let i = 0; i < pairs; i++) {
    const [a, b] = next(i)
    counts[Math.floor(a * side) * side + Math.floor(b * side)]++
  }
  return chiSquareSigmas(counts, new Float64Array(side * side).fill(pairs / (side * side)))
}

describe('stream', () => {
  it('gives the published first number of its generator, half a step up', () => {
    // README of the seedrandom package: alea('hello.') gives 0.4783254903741181
    expect(stream('hello.')()).toBe(0.4783254903741181 + 2 ** -33)
  })

  it('repeats for the same text and differs for another', () => {
    const take = (text: string) => Array.from({ length: 100 }, stream(text))
    expect(take('winter-1/dust/3/17')).toEqual(take('winter-1/dust/3/17'))
    expect(take('winter-1/dust/3/17')).not.toEqual(take('winter-1/dust/3/18'))
  })

  it('stays strictly between 0 and 1 with mean 1/2 and variance 1/12', () => {
    const uniform = stream('random/moments')
    const draws = 2_000_000
    let [low, high, sum, squares] = [1, 0, 0, 0]
    for (let i = 0; i < draws; i++) {
      const u = uniform()
      low = Math.min(low, u)
      high = Math.max(high, u)
      sum += u
      squares += (u - 0.5) ** 2
    }
    expect(low).toBeGreaterThan(0)
    expect(high).toBeLessThan(1)
    // 4 sigma each (chance 6e-5): sigma of u is 1/sqrt(12), of (u - 1/2)^2 1/sqrt(180)
    expect(Math.abs(sum / draws - 1 / 2)).toBeLessThan(4 / Math.sqrt(12 * draws))
    expect(Math.abs(squares / draws - 1 / 12)).toBeLessThan(4 / Math.sqrt(180 * draws))
  })

  // Fixed seeds; 4 sigma, a chance of 6e-5 each.
  it('fills pairs of successive numbers evenly', () => {
    const uniform = stream('random/pairs')
    expect(Math.abs(pairSigmas(1_000_000, 64, () => [uniform(), uniform()]))).toBeLessThan(4)
  })

  it('fills low-order digits evenly', () => {
    const uniform = stream('random/low')
    const low = () => (uniform() * 2 ** 20) % 1
    expect(Math.abs(pairSigmas(500_000, 32, () => [low(), low()]))).toBeLessThan(4)
  })

  it('starts the batches of a run independently of each other', () => {
    const starts = Array.from({ length: 40_001 }, (_, batch) => {
      const uniform = stream(`1/dust/0/${batch}`)
      return [uniform(), uniform()]
    })
    expect(Math.abs(pairSigmas(40_000, 20, (i) => [starts[i][0], starts[i + 1][0]]))).toBeLessThan(4)
    expect(Math.abs(pairSigmas(40_000, 20, (i) => [starts[i][0], starts[i][1]]))).toBeLessThan(4)
    expect(Math.abs(pairSigmas(40_000, 20, (i) => [starts[i][1], starts[i + 1][0]]))).toBeLessThan(4)
  })

  it('keeps batches apart along their length', () => {
    const [a, b] = [stream('1/dust/0/8'), stream('1/dust/0/9')]
    expect(Math.abs(pairSigmas(500_000, 50, () => [a(), b()]))).toBeLessThan(4)
  })
})

it('a stream goes on from its state by the recurrence of Alea', () => {
  const uniform = stream('state')
  let { s0, s1, s2, c } = streamState('state')
  for (let i = 0; i < 1000; i++) {
    const t = 2091639 * s0 + c * 2 ** -32
    c = Math.floor(t)
    s0 = s1
    s1 = s2
    s2 = t - c
    expect(s2 + 2 ** -33).toBe(uniform())
  }
})
