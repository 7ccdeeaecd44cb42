import { describe, expect, it } from 'vitest'
import { efficiencies } from '../../../src/dust/mie/efficiencies.js'
import { makeMatrix, writeMatrix } from '../../../src/dust/mie/scattering-matrix.js'
import { add, complex, divide, multiply, subtract } from '../../../src/math/complex.js'
import { gaussLegendre } from '../../../src/math/quadrature.js'
import { amplitudesAt, coated, type Index, sphere, sphereEfficiencies } from './sphere.js'

const INDICES: Index[] = [
  [1.5, 0],
  [1.33, 1e-5],
  [1.5, 1],
  [10, 10],
  [0.06, 1.4],
  [1.7, 0.03]
]
const degrees = Array.from({ length: 37 }, (_, i) => 5 * i)

/** (m^2 - 1) / (m^2 + 2) */
function clausiusMossotti([n, k]: Index) {
  const permittivity = multiply(complex(n, k), complex(n, k))
  return divide(subtract(permittivity, complex(1)), add(permittivity, complex(2)))
}

describe('laws', () => {
  it('conserves energy: the integral of S11 over all directions is the scattering', () => {
    for (const index of INDICES) {
      for (const x of [1e-6, 0.01, 1, 30, 200]) {
        const rule = gaussLegendre(Math.ceil(x + 6 * Math.cbrt(x)) + 8)
        const angles = Array.from(rule.nodes, (cosine) => (Math.acos(cosine) * 180) / Math.PI)
        const series = sphere(x, index)
        const matrix = makeMatrix(angles.length)
        writeMatrix(amplitudesAt(series, angles), matrix)
        const moment = (power: number) => matrix.s11.reduce((sum, s, j) => sum + rule.weights[j] * s * rule.nodes[j] ** power, 0)
        const q = efficiencies(series)
        expect((2 * moment(0)) / x ** 2 / q.scattering).toBeCloseTo(1, 10)
        // the quadrature carries an error of 1e-15 or so of the whole
        expect(moment(1) / moment(0) - q.asymmetry).toBeCloseTo(0, 12)
      }
    }
  })

  it('obeys the optical theorem, Q_ext = 4 Re S(0) / x^2', () => {
    for (const index of INDICES) {
      for (const x of [0.01, 1, 30, 1000, 1e5]) {
        const series = sphere(x, index)
        const forward = amplitudesAt(series, [0])
        expect((4 * forward.s1.re[0]) / x ** 2 / efficiencies(series).extinction).toBeCloseTo(1, 11)
        expect(forward.s2.re[0]).toBeCloseTo(forward.s1.re[0], 14)
      }
    }
  })

  it('keeps S11^2 = S12^2 + S33^2 + S34^2, as every single sphere does', () => {
    for (const index of INDICES) {
      for (const x of [1e-4, 0.3, 5, 300]) {
        const matrix = makeMatrix(degrees.length)
        writeMatrix(amplitudesAt(sphere(x, index), degrees), matrix)
        degrees.forEach((_, j) => {
          expect(Math.hypot(matrix.s12[j], matrix.s33[j], matrix.s34[j]) / matrix.s11[j]).toBeCloseTo(1, 12)
        })
      }
    }
  })

  it('absorbs in proportion to k when k is weak, down to 1e-18', () => {
    for (const x of [1e-5, 1, 50]) {
      const absorption = (k: number) => sphereEfficiencies(x, [1.6, k]).absorption / k
      expect(absorption(1e-18) / absorption(1e-10)).toBeCloseTo(1, 6)
      expect(sphereEfficiencies(x, [1.6, 0]).absorption).toBe(0)
    }
  })

  it('stays finite and within bounds from x = 1e-6 to 1e5', () => {
    for (const index of [...INDICES, [100, 100], [1e-3, 3], [1.0000001, 0]] as Index[]) {
      for (let exponent = -6; exponent <= 5; exponent += 0.7) {
        const q = sphereEfficiencies(10 ** exponent, index)
        expect(q.scattering).toBeGreaterThan(0)
        expect(q.absorption).toBeGreaterThanOrEqual(0)
        expect(Math.abs(q.asymmetry)).toBeLessThan(1)
        expect(q.backscattering).toBeGreaterThanOrEqual(0)
      }
    }
  })
})

describe('small spheres', () => {
  it('scatter and absorb as Rayleigh (1871) has it', () => {
    for (const index of [
      [1.5, 0],
      [1.5, 1],
      [2.5, 1.5],
      [0.06, 1.5]
    ] as Index[]) {
      const { re, im } = clausiusMossotti(index)
      for (const x of [1e-6, 1e-4]) {
        const q = sphereEfficiencies(x, index)
        expect(q.scattering / ((8 / 3) * x ** 4 * (re * re + im * im))).toBeCloseTo(1, 6)
        if (im > 0) expect(q.absorption / (4 * x * im)).toBeCloseTo(1, 6)
        expect(q.backscattering / q.scattering).toBeCloseTo(1.5, 6)
      }
    }
  })

  it('depart from it at x = 0.01 by the amounts computed outside this project', () => {
    const rows: [Index, number, number][] = [
      [[1.5, 0], 1.000007058, 0],
      [[1.5, 1], 1.00003964, 1.000089579],
      [[2.5, 1.5], 1.000088459, 1.000218373]
    ]
    for (const [index, scattering, absorption] of rows) {
      const { re, im } = clausiusMossotti(index)
      const q = sphereEfficiencies(0.01, index)
      expect(q.scattering / ((8 / 3) * 1e-8 * (re * re + im * im))).toBeCloseTo(scattering, 8)
      if (im > 0) expect(q.absorption / (0.04 * im)).toBeCloseTo(absorption, 8)
    }
    expect(sphereEfficiencies(0.01, [1.5, 0]).asymmetry).toBeCloseTo(1.98332e-5, 10)
  })

  it('polarise by (1 - cos^2) / (1 + cos^2)', () => {
    const matrix = makeMatrix(degrees.length)
    writeMatrix(amplitudesAt(sphere(1e-5, [1.7, 0.03]), degrees), matrix)
    degrees.forEach((angle, j) => {
      const cosine = Math.cos((angle * Math.PI) / 180)
      expect(-matrix.s12[j] / matrix.s11[j]).toBeCloseTo((1 - cosine ** 2) / (1 + cosine ** 2), 9)
    })
  })

  it('resonate where the permittivity is -2 (Froehlich mode; Bohren & Huffman 1983, section 12.1)', () => {
    const absorption = (permittivity: number) => {
      const size = Math.hypot(permittivity, 0.01)
      const k = Math.sqrt((size - permittivity) / 2)
      return sphereEfficiencies(1e-4, [0.01 / (2 * k), k]).absorption
    }
    const peak = absorption(-2)
    // |Im (e - 1) / (e + 2)| = 3 Im e / |e + 2|^2: half as high where Re e is off by Im e
    expect(peak / (4e-4 * (3 / 0.01))).toBeCloseTo(1, 3)
    expect(absorption(-1.99) / peak).toBeCloseTo(0.5, 3)
    expect(absorption(-2.01) / peak).toBeCloseTo(0.5, 3)
  })
})

describe('large spheres', () => {
  it('remove twice the light they meet', () => {
    // the edge adds 1.9924 x^(-2/3) to Q_ext (Nussenzveig & Wiscombe 1980, Phys. Rev. Lett. 45, 1490; recalled)
    for (const x of [1e4, 1e5]) {
      const q = sphereEfficiencies(x, [1.5, 1])
      expect((q.extinction - 2) / (1.9924 * x ** (-2 / 3))).toBeGreaterThan(0.9)
      expect((q.extinction - 2) / (1.9924 * x ** (-2 / 3))).toBeLessThan(1.1)
    }
  })

  it('follow anomalous diffraction when m is near 1 (van de Hulst 1957, section 11.22)', () => {
    const delta = 1e-4
    for (const rho of [0.5, 2, 4.08557388548, 7.6, 12]) {
      const formula = 2 - (4 / rho) * Math.sin(rho) + (4 / rho ** 2) * (1 - Math.cos(rho))
      expect(sphereEfficiencies(rho / (2 * delta), [1 + delta, 0]).extinction / formula).toBeCloseTo(1, 3)
    }
    // height of the first maximum, computed outside this project
    expect(sphereEfficiencies(4.08557388548 / (2 * delta), [1 + delta, 0]).extinction).toBeCloseTo(3.17313656668, 3)
  })
})

describe('coat', () => {
  const core: Index = [1.7, 0.03]
  const coat: Index = [1.3, 1e-3]

  it('of the same material, of no thickness, or without a core makes a homogeneous sphere', () => {
    for (const x of [1e-6, 0.1, 3, 40, 1000]) {
      const same = (found: ReturnType<typeof efficiencies>, index: Index) => {
        const wanted = sphereEfficiencies(x, index)
        for (const key of ['extinction', 'scattering', 'absorption', 'asymmetry'] as const)
          expect(found[key] / wanted[key], `${key} at ${x}`).toBeCloseTo(1, 10)
      }
      for (const index of INDICES.slice(2))
        for (const part of [0.01, 0.5, 1]) same(efficiencies(coated(part * x, x, index, index)), index)
      same(efficiencies(coated(x, x, core, coat)), core)
      same(efficiencies(coated(0, x, core, coat)), coat)
      same(efficiencies(coated(1e-5 * x, x, core, coat)), coat)
    }
  })

  it('makes a small sphere as polarisable as the formula (Bohren & Huffman 1983, eq. 5.36)', () => {
    const [e1, e2] = [core, coat].map((m) => multiply(complex(...m), complex(...m)))
    const f = 0.6 ** 3
    const one = complex(1)
    const times = (factor: number, value: typeof one) => multiply(complex(factor), value)
    const sum2 = add(e1, times(2, e2))
    const difference = times(f, subtract(e1, e2))
    const top = add(multiply(subtract(e2, one), sum2), multiply(difference, add(one, times(2, e2))))
    const bottom = add(multiply(add(e2, times(2, one)), sum2), multiply(times(2, difference), subtract(e2, one)))
    const { re, im } = divide(top, bottom)
    const x = 1e-5
    const q = efficiencies(coated(0.6 * x, x, core, coat))
    expect(q.absorption / (4 * x * im)).toBeCloseTo(1, 8)
    expect(q.scattering / ((8 / 3) * x ** 4 * (re * re + im * im))).toBeCloseTo(1, 8)
  })

  it('hides the core when it is opaque', () => {
    const bare = sphereEfficiencies(300, [2, 3])
    const hidden = efficiencies(coated(200, 300, [1.2, 0], [2, 3]))
    expect(hidden.extinction / bare.extinction).toBeCloseTo(1, 12)
    expect(hidden.asymmetry / bare.asymmetry).toBeCloseTo(1, 12)
  })
})
