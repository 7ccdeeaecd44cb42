import { describe, expect, it } from 'vitest'
import { bruggemanMaterial, maxwellGarnettMaterial, vacuum } from '../../../src/dust/materials/mixed-material.js'
import { bruggeman, type Ingredient, maxwellGarnett } from '../../../src/dust/materials/mixing-rules.js'
import { add, type Complex, complex, divide, multiply, scale, squareRoot, subtract } from '../../../src/math/complex.js'
import { stream } from '../../../src/math/random.js'

const part = (share: number, re: number, im = 0): Ingredient => ({ permittivity: complex(re, im), share })
const size = ({ re, im }: Complex) => Math.hypot(re, im)

/** sum share (e_i - e) / (e_i + 2 e) */
const mismatch = (parts: Ingredient[], e: Complex) =>
  parts
    .map(({ permittivity, share }) => scale(divide(subtract(permittivity, e), add(permittivity, scale(e, 2))), share))
    .reduce(add)

describe('Bruggeman', () => {
  it('solves the quadratic of two ingredients (Bohren & Huffman 1983, section 8.5)', () => {
    for (const [e1, e2] of [
      [complex(10), complex(1)],
      [complex(-20, 5), complex(1)],
      [complex(2.5, 0.01), complex(40, 900)]
    ]) {
      for (const f of [0.01, 0.2, 1 / 3, 0.5, 0.9]) {
        // 2 e^2 - b e - e1 e2 = 0, b = (3 f - 1) e1 + (2 - 3 f) e2
        const b = add(scale(e1, 3 * f - 1), scale(e2, 2 - 3 * f))
        const root = squareRoot(add(multiply(b, b), scale(multiply(e1, e2), 8)))
        const roots = [add(b, root), subtract(b, root)].map((value) => scale(value, 0.25))
        const found = bruggeman([
          { permittivity: e1, share: f },
          { permittivity: e2, share: 1 - f }
        ])
        expect(Math.min(...roots.map((value) => size(subtract(value, found)) / size(value)))).toBeLessThan(1e-12)
        expect(found.im).toBeGreaterThanOrEqual(0)
        if (e1.im === 0) expect(found.re).toBeGreaterThan(1)
      }
    }
  })

  it('solves its equation in the upper half plane for any number of ingredients', () => {
    const random = stream('mixtures-1')
    for (let trial = 0; trial < 500; trial++) {
      const weights = Array.from({ length: 2 + Math.floor(4 * random()) }, () => random())
      const total = weights.reduce((sum, weight) => sum + weight)
      const parts = weights.map((weight) => part(weight / total, 60 * random() - 30, 10 ** (4 * random() - 3)))
      const e = bruggeman(parts)
      expect(e.im).toBeGreaterThan(0)
      expect(size(mismatch(parts, e))).toBeLessThan(1e-10)
    }
  })

  it('does not depend on the order, and mixes a material with itself', () => {
    const parts = [part(0.2, 3, 0.1), part(0.3, -8, 2), part(0.5, 1)]
    const [one, other] = [bruggeman(parts), bruggeman([...parts].reverse())]
    expect(size(subtract(one, other))).toBeLessThan(1e-12)
    const same = bruggeman([part(0.4, 5, 0.2), part(0.6, 5, 0.2)])
    expect(size(subtract(same, complex(5, 0.2)))).toBeLessThan(1e-12)
  })

  it('conducts beyond a third of metal only (percolation threshold of the rule, common practice)', () => {
    const mixed = (share: number) => bruggeman([part(share, 1, 1e8), part(1 - share, 1)]).im
    expect(mixed(0.3)).toBeLessThan(1)
    expect(mixed(0.4) / 1e8).toBeCloseTo(0.1, 3) // (3 f - 1) / 2
  })
})

describe('Maxwell Garnett', () => {
  it('obeys Clausius and Mossotti in vacuum', () => {
    const e = maxwellGarnett(complex(1), [part(0.1, 4), part(0.2, 9)])
    expect((e.re - 1) / (e.re + 2)).toBeCloseTo((0.1 * 3) / 6 + (0.2 * 8) / 11, 14)
  })

  it('gives the inclusion when it fills the volume, the matrix when there is none', () => {
    const full = maxwellGarnett(complex(2, 0.1), [part(1, -3, 0.5)])
    expect(size(subtract(full, complex(-3, 0.5)))).toBeLessThan(1e-13)
    expect(maxwellGarnett(complex(2, 0.1), [])).toEqual({ re: 2, im: 0.1 })
  })

  it('agrees with Bruggeman to first order in a small share', () => {
    const [garnett, brugge] = [maxwellGarnett(complex(2), [part(1e-4, 6, 1)]), bruggeman([part(1e-4, 6, 1), part(1 - 1e-4, 2)])]
    expect(size(subtract(garnett, brugge))).toBeLessThan(1e-7)
    expect(size(subtract(garnett, complex(2)))).toBeGreaterThan(1e-4)
  })
})

describe('mixed materials', () => {
  it('work at each wavelength and know the range they share', () => {
    const solid = { index: (wavelength: number) => complex(1.5 + wavelength, 0.1), range: [1, 5] as [number, number] }
    const porous = bruggemanMaterial([
      { material: solid, share: 0.4 },
      { material: vacuum, share: 0.6 }
    ])
    const wanted = bruggeman([{ permittivity: multiply(solid.index(2), solid.index(2)), share: 0.4 }, part(0.6, 1)])
    expect(porous.index(2)).toEqual(squareRoot(wanted))
    expect(porous.range).toEqual([1, 5])
    const holes = maxwellGarnettMaterial(solid, [{ material: vacuum, share: 0.2 }])
    expect(holes.index(2).re).toBeLessThan(3.5)
    expect(holes.range).toEqual([1, 5])
  })
})
