import { describe, expect, it } from 'vitest'
import { azimuthalHenyeyGreenstein, henyeyGreenstein, sampleHenyeyGreenstein } from '../../src/dust/phase-function.js'
import { integrate } from '../../src/math/quadrature.js'
import { stream } from '../../src/math/random.js'

const ASYMMETRIES = [-0.95, -0.3, -1e-9, 0, 1e-6, 0.3, 0.6, 0.95]

/** Legendre polynomial P_l(x) by its recurrence (Abramowitz & Stegun 1964, 8.5.3). */
function legendre(l: number, x: number): number {
  let [previous, value] = [1, x]
  for (let k = 2; k <= l; k++) [previous, value] = [value, ((2 * k - 1) * x * value - (k - 1) * previous) / k]
  return l === 0 ? 1 : value
}

describe('henyeyGreenstein', () => {
  it('has Legendre moments g^l', () => {
    // Henyey & Greenstein 1941, ApJ 93, 70: int p P_l dOmega = g^l; l = 0 is the norm, l = 1 the mean cosine
    for (const g of ASYMMETRIES) {
      for (const l of [0, 1, 2, 5]) {
        const moment = 2 * Math.PI * integrate((mu) => henyeyGreenstein(g, mu) * legendre(l, mu), -1, 1, 1e-12)
        expect(moment).toBeCloseTo(g ** l, 9)
      }
    }
  })

  it('gives p(1), p(0), p(-1) of the formula in decimals', () => {
    // computed apart from this program, per sr
    const rows = [
      [0, 0.07957747, 0.07957747, 0.07957747],
      [0.3, 0.2111239, 0.06363437, 0.03296108],
      [0.6, 0.79577472, 0.03211159, 0.01243398],
      [0.9, 15.11971959, 0.00620906, 0.00220436],
      [-0.3, 0.03296108, 0.06363437, 0.2111239]
    ]
    for (const [g, forward, side, back] of rows) {
      expect(henyeyGreenstein(g, 1)).toBeCloseTo(forward, 8)
      expect(henyeyGreenstein(g, 0)).toBeCloseTo(side, 8)
      expect(henyeyGreenstein(g, -1)).toBeCloseTo(back, 8)
    }
  })
})

describe('sampleHenyeyGreenstein', () => {
  it('inverts the cumulative law', () => {
    // g = 0.6: {1 + g^2 - [(1 - g^2)/(1 - g + 2 g R)]^2}/(2 g), evaluated to 8 decimals
    for (const [u, cosine] of [
      [0.1, -0.12899408],
      [0.25, 0.43673469],
      [0.5, 0.792],
      [0.75, 0.93136095],
      [0.9, 0.97750183]
    ]) {
      expect(sampleHenyeyGreenstein(0.6, u)).toBeCloseTo(cosine, 8)
    }
    for (const g of ASYMMETRIES) {
      for (const u of [0.01, 0.2, 0.5, 0.93]) {
        const cosine = sampleHenyeyGreenstein(g, u)
        expect(2 * Math.PI * integrate((mu) => henyeyGreenstein(g, mu), -1, cosine, 1e-12)).toBeCloseTo(u, 9)
      }
    }
  })

  it('spans exactly -1 to 1', () => {
    for (const g of ASYMMETRIES) {
      expect(sampleHenyeyGreenstein(g, 0)).toBeCloseTo(-1, 12)
      expect(sampleHenyeyGreenstein(g, 1)).toBeCloseTo(1, 12)
      for (const u of [0, 1e-17, 1 - 2 ** -53, 1]) expect(Math.abs(sampleHenyeyGreenstein(g, u))).toBeLessThanOrEqual(1)
    }
  })

  it('has mean g and mean square (1 + 2 g^2) / 3', () => {
    // fixed seed; 4 sigma of the mean of values within [-1, 1]: a chance below 6e-5 each
    const uniform = stream('phase/moments')
    const draws = 200_000
    for (const g of [-0.5, 0, 0.6, 0.9]) {
      let [sum, squares] = [0, 0]
      for (let i = 0; i < draws; i++) {
        const cosine = sampleHenyeyGreenstein(g, uniform())
        sum += cosine
        squares += cosine * cosine
      }
      const meanSquare = (1 + 2 * g * g) / 3
      expect(Math.abs(sum / draws - g)).toBeLessThan(4 * Math.sqrt((meanSquare - g * g) / draws))
      expect(Math.abs(squares / draws - meanSquare)).toBeLessThan(4 * Math.sqrt((meanSquare * (1 - meanSquare)) / draws))
    }
  })
})

describe('azimuthalHenyeyGreenstein', () => {
  const pairs = [
    [0.3, 0.4],
    [0.999, 0.998],
    [-0.7, 0.2],
    [0.5, 0.5],
    [1, 1],
    [0.1, -1]
  ]

  it('is the average of the law over azimuth, by equal steps', () => {
    const steps = 4000 // the midpoint rule converges exponentially for a periodic function
    for (const g of ASYMMETRIES) {
      for (const [mu, muPrime] of pairs) {
        let sum = 0
        for (let i = 0; i < steps; i++) {
          const psi = (2 * Math.PI * (i + 0.5)) / steps
          sum += henyeyGreenstein(g, mu * muPrime + Math.sqrt((1 - mu * mu) * (1 - muPrime * muPrime)) * Math.cos(psi))
        }
        expect(azimuthalHenyeyGreenstein(g, mu, muPrime) / (sum / steps)).toBeCloseTo(1, 10)
      }
    }
  })

  it('is the Legendre sum of the addition theorem', () => {
    // Chandrasekhar 1960, Radiative Transfer, section 48 (recalled): sum (2 l + 1) g^l P_l(mu) P_l(mu') / 4 pi
    for (const [mu, muPrime] of pairs) {
      let sum = 0
      for (let l = 0; l < 80; l++) sum += ((2 * l + 1) * 0.6 ** l * legendre(l, mu) * legendre(l, muPrime)) / (4 * Math.PI)
      expect(azimuthalHenyeyGreenstein(0.6, mu, muPrime)).toBeCloseTo(sum, 11)
    }
  })
})
