import { describe, expect, it } from 'vitest'
import { fitScalings, type Parameter } from '../../src/compare/fit.js'
import { goodness } from '../../src/compare/goodness.js'
import { type ComparedSet, inPlace, type Placement } from '../../src/compare/sets/compared-set.js'
import { pictureSet } from '../../src/compare/sets/picture-set.js'
import type { PictureData } from '../../src/compare/types.js'
import { chiSquareTail } from '../../src/math/chi-square.js'
import { stream } from '../../src/math/random.js'
import { makeBeam } from '../../src/observe/beam.js'
import { beamNoise } from '../../src/observe/noise.js'
import { ARCSECOND, DEGREE } from '../../src/units/angles.js'
import { MJY } from '../observe/sources.js'
import { type Layout, lopsided, noisy, pictureData } from './measured.js'

const never = (key: string, message: string): never => {
  throw new Error(`${key}: ${message}`)
}
const layout: Layout = { width: 44, height: 42, side: 0.14, turn: 25 }
const NOISE = 12
const beam = { kind: 'gaussian' as const, major: 0.5 * ARCSECOND, minor: 0.3 * ARCSECOND, positionAngle: 1 }

/** Data made of a model that is moved and scaled, with noise. */
function fictitious(seed: string, placement: Placement = inPlace, flux = 1, change: Partial<PictureData> = {}): ComparedSet {
  const source = lopsided()
  const empty = pictureSet(pictureData(layout, new Float64Array(44 * 42), NOISE, change), source, source.light, never)
  if (empty.shown.kind !== 'picture') throw new Error('no picture')
  const values = new Float64Array(44 * 42).fill(Number.NaN)
  const truth = noisy(empty.model(placement).values, 0, seed)
  const measured = noisy(
    truth.map((value) => (flux * value) / MJY),
    NOISE,
    seed
  )
  empty.shown.pixels.forEach((pixel, i) => {
    values[pixel] = measured[i]
  })
  return pictureSet(pictureData(layout, values, NOISE, change), source, source.light, never)
}

const free = (set: ComparedSet, keys: Parameter['key'][]): Parameter[] => keys.map((key) => ({ key, sets: [set], shared: false }))

describe('chi-squared of fictitious data', () => {
  it('is what the noise implies with the true model', () => {
    const set = fictitious('true')
    const count = set.data.values.length
    const { chiSquared } = goodness(set, fitScalings([set], []).models[0])
    // Mean n and variance 2 n: within 4 sigma, missed by chance once in 16 000 draws; the seed is fixed.
    expect(Math.abs(chiSquared - count)).toBeLessThan(4 * Math.sqrt(2 * count))
  })

  it('rejects a model that is turned by 25 degrees, or 20 % too faint: so much that the difference adds 8 sigma to chi-squared', () => {
    const model = fictitious('wrong').model(inPlace).values
    for (const [placement, flux] of [
      [{ ...inPlace, rotation: 25 * DEGREE }, 1],
      [inPlace, 1.25]
    ] as const) {
      const set = fictitious('wrong', placement, flux)
      const added = Array.from(set.model(placement).values).reduce(
        (sum, value, i) => sum + ((flux * value - model[i]) / set.data.sigma[i]) ** 2,
        0
      )
      expect(added).toBeGreaterThan(8 * Math.sqrt(2 * set.data.values.length))
      const { chiSquared } = goodness(set, fitScalings([set], []).models[0])
      // Of a difference that adds 8 sigma, chance takes away 4 once in about 5000 draws.
      expect(chiSquareTail(chiSquared, set.data.values.length)).toBeLessThan(1e-4)
    }
  })

  it('counts as many values as beams where errors are correlated', () => {
    const set = fictitious('beams', inPlace, 1, { beam, perBeam: true })
    const pixel = 0.14 * ARCSECOND
    expect(set.independent).toBeCloseTo(pixel ** 2 / makeBeam(beam, 1e-3).solidAngle, 4)
    // Noise correlated over the beam: chi-squared of n pixels scatters as that of n * independent values.
    const grid = { width: 40, height: 40, pixel: [pixel, pixel] as [number, number] }
    const round = makeBeam({ kind: 'gaussian', major: 4 * pixel, minor: 4 * pixel, positionAngle: 0 }, 1e-3)
    const sums = Array.from({ length: 200 }, (_, i) =>
      beamNoise(round, grid, stream(`beams/${i}`)).reduce((sum, value) => sum + value * value, 0)
    )
    const mean = sums.reduce((sum, value) => sum + value, 0) / sums.length
    const variance = sums.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (sums.length - 1)
    const independent = (pixel ** 2 / round.solidAngle) * 1600
    // The variance of 200 draws has a relative 1 sigma of 0.1 (more, as few values are independent); edges cut some correlation.
    expect((1600 * Math.sqrt(2 / independent)) / Math.sqrt(variance)).toBeGreaterThan(0.8)
    expect((1600 * Math.sqrt(2 / independent)) / Math.sqrt(variance)).toBeLessThan(1.25)
  })
})

describe('fitted scalings', () => {
  it('recover factor, centre and rotation within their errors, which are those of the scatter', () => {
    const truth = { east: 0.11 * ARCSECOND, north: -0.07 * ARCSECOND, rotation: 6 * DEGREE }
    const expected = [0.8, truth.east, truth.north, truth.rotation]
    const pulls = ['a', 'b', 'c', 'd', 'e', 'f'].flatMap((seed) => {
      const set = fictitious(seed, truth, 0.8)
      const { values, sigma, models } = fitScalings([set], free(set, ['flux', 'east', 'north', 'rotation']))
      const degrees = set.data.values.length - 4
      expect(Math.abs(goodness(set, models[0]).chiSquared - degrees)).toBeLessThan(4 * Math.sqrt(2 * degrees))
      return values.map((value, i) => (value - expected[i]) / sigma[i])
    })
    // 24 pulls: each within 4 sigma (missed once in 650 draws of all), their mean square 1 within 4 sigma of chi-squared of 24.
    for (const pull of pulls) expect(Math.abs(pull)).toBeLessThan(4)
    const square = pulls.reduce((sum, pull) => sum + pull * pull, 0) / pulls.length
    expect(Math.abs(square - 1)).toBeLessThan(4 * Math.sqrt(2 / pulls.length))
  })

  it('turn the source, not the beam, where the beam is long', () => {
    const truth = { ...inPlace, rotation: -20 * DEGREE }
    const set = fictitious('beam', truth, 1, { beam })
    const { values, sigma, models } = fitScalings([set], free(set, ['rotation']))
    expect(Math.abs(values[0] - truth.rotation)).toBeLessThan(4 * sigma[0])
    expect(chiSquareTail(goodness(set, models[0]).chiSquared, set.data.values.length - 1)).toBeGreaterThan(1e-4)
  })

  it('are common to several sets, or of each, as asked', () => {
    const [one, other] = [fictitious('one', inPlace, 1.5), fictitious('other', inPlace, 0.7)]
    const own = fitScalings([one, other], [...free(one, ['flux']), ...free(other, ['flux'])])
    expect(Math.abs(own.values[0] - 1.5)).toBeLessThan(4 * own.sigma[0])
    expect(Math.abs(own.values[1] - 0.7)).toBeLessThan(4 * own.sigma[1])
    const common = fitScalings([one, other], [{ key: 'flux', sets: [one, other], shared: true }])
    expect(common.values[0]).toBeGreaterThan(1.05)
    expect(common.values[0]).toBeLessThan(1.15)
    expect(common.sigma[0]).toBeLessThan(own.sigma[0])
  })
})
