import { describe, expect, it } from 'vitest'
import type { Grain } from '../../../src/dust/grains/grain.js'
import { grainOptics } from '../../../src/dust/grains/grain-optics.js'
import { mixByMass } from '../../../src/dust/grains/mix-by-mass.js'
import { lognormalSizes, powerSizes } from '../../../src/dust/grains/size-distribution.js'
import type { Material } from '../../../src/dust/materials/material.js'
import { efficiencies } from '../../../src/dust/mie/efficiencies.js'
import { makeMatrix, writeMatrix } from '../../../src/dust/mie/scattering-matrix.js'
import { gaussLegendre } from '../../../src/math/quadrature.js'
import { amplitudesAt, type Index, sphere } from '../mie/sphere.js'

const um = 1e-4
const constant = ([re, im]: Index): Material => ({ index: () => ({ re, im }), range: [0, Number.POSITIVE_INFINITY] })
const rock: Index = [1.7, 0.03]
const interstellar: Grain = { material: constant(rock), sizes: powerSizes(0.005 * um, 0.25 * um), density: 3.3 }
const elements = ['s11', 's12', 's33', 's34'] as const

/** The slow and obvious way: sums over very many radii, evenly spaced in their logarithm. */
function bySums({ sizes, density }: Grain, index: Index, wavelength: number, degrees: number[], steps: number) {
  const matrix = makeMatrix(degrees.length)
  const total = { mass: 0, absorption: 0, scattering: 0, forward: 0, s11: degrees.map(() => 0), s12: degrees.map(() => 0) }
  for (let i = 0; i < steps; i++) {
    const radius = sizes.smallest * (sizes.largest / sizes.smallest) ** ((i + 0.5) / steps)
    const weight = sizes.density(radius) * radius
    const series = sphere((2 * Math.PI * radius) / wavelength, index)
    const q = efficiencies(series)
    const area = weight * Math.PI * radius ** 2
    total.mass += ((weight * 4 * Math.PI) / 3) * density * radius ** 3
    total.absorption += area * q.absorption
    total.scattering += area * q.scattering
    total.forward += area * q.scattering * q.asymmetry
    writeMatrix(amplitudesAt(series, degrees), matrix)
    degrees.forEach((_, j) => {
      total.s11[j] += weight * matrix.s11[j]
      total.s12[j] += weight * matrix.s12[j]
    })
  }
  return total
}

describe('grainOptics', () => {
  it('agrees with plain sums over many radii to the 1e-4 it aims at', () => {
    const degrees = [0, 20, 90, 150, 180]
    const cosines = degrees.map((angle) => Math.cos((angle * Math.PI) / 180))
    const cases: [Grain, Index, number][] = [
      [interstellar, rock, 0.1 * um],
      [{ ...interstellar, material: constant([1.5, 0]) }, [1.5, 0], 0.2 * um],
      [{ ...interstellar, material: constant([2, 1.2]), sizes: powerSizes(0.005 * um, 2 * um) }, [2, 1.2], 0.3 * um],
      [{ ...interstellar, sizes: lognormalSizes(0.01 * um, 2 * um, 0.1 * um, 0.5) }, rock, 0.5 * um]
    ]
    for (const [grain, index, wavelength] of cases) {
      const optics = grainOptics(grain, [wavelength], cosines)
      const sums = bySums(grain, index, wavelength, degrees, 10000)
      expect(optics.error[0]).toBeLessThanOrEqual(1e-4)
      if (index[1] > 0) expect(Math.abs((optics.absorption[0] * sums.mass) / sums.absorption - 1)).toBeLessThan(1e-4)
      else expect(optics.absorption[0]).toBe(0)
      expect(Math.abs((optics.scattering[0] * sums.mass) / sums.scattering - 1)).toBeLessThan(1e-4)
      expect(Math.abs(optics.asymmetry[0] - sums.forward / sums.scattering)).toBeLessThan(1e-4)
      const perScattering = (wavelength / (2 * Math.PI)) ** 2 / sums.scattering
      degrees.forEach((_, j) => {
        const allowed = 1e-4 * Math.max(optics.matrix.s11[j], 1 / (4 * Math.PI))
        expect(Math.abs(optics.matrix.s11[j] - sums.s11[j] * perScattering)).toBeLessThan(allowed)
        expect(Math.abs(optics.matrix.s12[j] - sums.s12[j] * perScattering)).toBeLessThan(allowed)
      })
    }
  })

  it('has the closed form of small grains, whatever their sizes', () => {
    // Rayleigh: kappa = 6 pi Im L / (lambda rho), L = (m^2 - 1) / (m^2 + 2), and |L|^2 <a^6> / <a^3> for scattering
    const wavelength = 1000 * um
    const { absorption, scattering, asymmetry } = grainOptics(interstellar, [wavelength])
    const [n, k] = rock
    const [re, im] = [n * n - k * k, 2 * n * k]
    const size = (re + 2) ** 2 + im ** 2
    expect(absorption[0] / ((6 * Math.PI * 3 * im) / size / (wavelength * 3.3))).toBeCloseTo(1, 5)
    const [a, b] = [0.005 * um, 0.25 * um]
    const moments = (b ** 3.5 - a ** 3.5) / 3.5 / ((b ** 0.5 - a ** 0.5) / 0.5)
    const expected = (2 / 3.3) * ((2 * Math.PI) / wavelength) ** 4 * (((re - 1) ** 2 + im ** 2) / size) * moments
    expect(scattering[0] / expected).toBeCloseTo(1, 5)
    expect(asymmetry[0]).toBeLessThan(1e-5)
  })

  it('removes twice the light that large grains meet, and what their edges add', () => {
    const grain = { ...interstellar, material: constant([1.5, 1]), sizes: powerSizes(100 * um, 101 * um) }
    const { absorption, scattering } = grainOptics(grain, [0.1 * um])
    // Q_ext = 2 + 1.9924 x^(-2/3) (Nussenzveig & Wiscombe 1980, Phys. Rev. Lett. 45, 1490; recalled), kappa = 3 Q / (4 a rho)
    const efficiency = 2 + 1.9924 * (2 * Math.PI * 1005) ** (-2 / 3)
    expect((absorption[0] + scattering[0]) / ((0.75 * efficiency) / (3.3 * 100.5 * um))).toBeCloseTo(1, 3)
  })

  it('normalises S11 to 1 over all directions, with the asymmetry as its mean cosine', () => {
    const { nodes, weights } = gaussLegendre(64)
    const { matrix, asymmetry } = grainOptics(interstellar, [0.3 * um, 3 * um], nodes)
    for (const w of [0, 1]) {
      const sum = (power: number) =>
        nodes.reduce((total, node, j) => total + 2 * Math.PI * weights[j] * matrix.s11[w * 64 + j] * node ** power, 0)
      expect(sum(0)).toBeCloseTo(1, 8)
      expect(sum(1)).toBeCloseTo(asymmetry[w], 8)
    }
  })

  it('takes a coat: of the same material it changes nothing, of vacuum it dilutes', () => {
    const plain = grainOptics(interstellar, [0.5 * um], [1, 0, -1])
    const same = grainOptics({ ...interstellar, coat: { material: constant(rock), volume: 0.4 } }, [0.5 * um], [1, 0, -1])
    expect(same.absorption[0] / plain.absorption[0]).toBeCloseTo(1, 10)
    for (const element of elements)
      plain.matrix[element].forEach((value, j) => {
        expect(same.matrix[element][j]).toBeCloseTo(value, 10)
      })
    // the cores are 1 / 8 of the volume: half the radius
    const void7 = { ...interstellar, coat: { material: constant([1, 0]), volume: 7 / 8 } }
    const half = { ...interstellar, sizes: powerSizes(0.0025 * um, 0.125 * um), density: 8 * 3.3 }
    const [hollow, small] = [void7, half].map((grain) => grainOptics(grain, [0.5 * um]))
    expect(hollow.absorption[0] / small.absorption[0]).toBeCloseTo(1, 8)
    expect(hollow.scattering[0] / small.scattering[0]).toBeCloseTo(1, 8)
  })
})

describe('mixByMass', () => {
  const kinds = [interstellar, { ...interstellar, material: constant([2, 1]), density: 2 }]
  const [rocky, sooty] = kinds.map((grain) => grainOptics(grain, [0.3 * um, 30 * um], [1, 0.5, -1]))

  it('adds opacities by mass, asymmetry and matrix by scattering', () => {
    const mixed = mixByMass([
      { optics: rocky, share: 0.7 },
      { optics: sooty, share: 0.3 }
    ])
    for (const w of [0, 1]) {
      const scattering = 0.7 * rocky.scattering[w] + 0.3 * sooty.scattering[w]
      expect(mixed.absorption[w]).toBeCloseTo(0.7 * rocky.absorption[w] + 0.3 * sooty.absorption[w], 10)
      expect(mixed.scattering[w]).toBeCloseTo(scattering, 10)
      const average = (of: (optics: typeof rocky) => number) =>
        (0.7 * rocky.scattering[w] * of(rocky) + 0.3 * sooty.scattering[w] * of(sooty)) / scattering
      expect(mixed.asymmetry[w]).toBeCloseTo(
        average(({ asymmetry }) => asymmetry[w]),
        12
      )
      for (const element of elements)
        for (let j = 3 * w; j < 3 * w + 3; j++)
          expect(mixed.matrix[element][j]).toBeCloseTo(
            average(({ matrix }) => matrix[element][j]),
            12
          )
    }
  })

  it('gives back a kind that is mixed with itself', () => {
    const mixed = mixByMass([
      { optics: rocky, share: 0.5 },
      { optics: rocky, share: 0.5 }
    ])
    expect(mixed).toEqual(rocky)
  })
})
