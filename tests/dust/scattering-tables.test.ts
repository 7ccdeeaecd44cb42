import { describe, expect, it } from 'vitest'
import { meanCosine, normalised, rayleighMatrix, scalarMatrix, twoTermMatrix } from '../../src/dust/matrices.js'
import { henyeyGreenstein } from '../../src/dust/phase-function.js'
import {
  cosineAt,
  drawPlace,
  elementAt,
  S11,
  S12,
  scatteringTables,
  TABLE_STEPS,
  tablePosition
} from '../../src/dust/scattering-tables.js'
import { stream } from '../../src/math/random.js'
import { chiSquareSigmas } from '../support/chi-square.js'

const laws = [rayleighMatrix(), twoTermMatrix(0.9, -0.4, 0.8), scalarMatrix((cosine) => henyeyGreenstein(0.6, cosine))]
const tables = scatteringTables(laws)

describe('tables of scattering laws', () => {
  it('find the place of an angle and its cosine', () => {
    for (const cosine of [1, 0.999999, 0.3, 0, -0.3, -0.999999, -1])
      expect(cosineAt(tablePosition(cosine))).toBeCloseTo(cosine, 12)
    expect(tablePosition(1)).toBe(0)
    expect(tablePosition(-1)).toBe(TABLE_STEPS)
  })

  it('give the laws back', () => {
    for (let i = 0; i <= 1000; i++) {
      const mu = -1 + i / 500
      // Bohren & Huffman (1983, eq. 5.4), 3 / (16 pi) (1 + mu^2): integrates to 1.
      expect(elementAt(tables, 0, S11, mu)).toBeCloseTo((3 * (1 + mu * mu)) / (16 * Math.PI), 6)
      expect(elementAt(tables, 0, S12, mu)).toBeCloseTo((-3 * (1 - mu * mu)) / (16 * Math.PI), 6)
      const exact = 0.8 * henyeyGreenstein(0.9, mu) + 0.2 * henyeyGreenstein(-0.4, mu)
      expect(elementAt(tables, 1, S11, mu) / exact).toBeCloseTo(1, 3)
    }
    expect(tables.polarising).toBe(true)
    expect(Array.from(tables.keeps)).toEqual([1, 0, 0])
  })

  it('are normalised exactly, by a sum that knows nothing of their steps', () => {
    for (let law = 0; law < laws.length; law++) {
      let sum = 0
      const steps = 200_000
      for (let i = 0; i < steps; i++) sum += (4 * Math.PI * elementAt(tables, law, S11, -1 + (2 * (i + 0.5)) / steps)) / steps
      expect(sum).toBeCloseTo(1, 6)
    }
  })

  it.each([0, 1, 2])('are drawn from as they are: law %d', (law) => {
    const uniform = stream(`tables/${law}`)
    const bins = 50
    const draws = 200_000
    const found = new Float64Array(bins)
    const expected = new Float64Array(bins)
    for (let n = 0; n < draws; n++) {
      found[Math.min(bins - 1, Math.floor(((cosineAt(drawPlace(tables, law, uniform)) + 1) / 2) * bins))]++
    }
    const fine = 4000
    for (let i = 0; i < bins * fine; i++) {
      expected[Math.floor(i / fine)] +=
        (draws * 4 * Math.PI * elementAt(tables, law, S11, -1 + (2 * (i + 0.5)) / (bins * fine))) / (bins * fine)
    }
    // By chance once in 3e6 tries.
    expect(chiSquareSigmas(found, expected)).toBeLessThan(5)
  })
})

describe('scattering matrices', () => {
  it('have the mean cosine of the Henyey-Greenstein laws in them, which is their parameter', () => {
    expect(meanCosine(rayleighMatrix())).toBeCloseTo(0, 9)
    expect(meanCosine(twoTermMatrix(0.7, -0.3, 0.9))).toBeCloseTo(0.9 * 0.7 - 0.1 * 0.3, 5)
  })

  it('of any scale are brought to 1 over 4 pi sr', () => {
    const angles = Float64Array.from({ length: 181 }, (_, i) => (i * Math.PI) / 180)
    const one = angles.map(() => 7)
    const { s11, s34 } = normalised({ angles, s11: one, s12: one, s33: one, s34: one })
    expect(s11[90]).toBeCloseTo(1 / (4 * Math.PI), 12)
    expect(s34[3]).toBe(s11[3])
  })
})
