import { describe, expect, it } from 'vitest'
import { grainOptics } from '../../src/dust/grains/grain-optics.js'
import { makeGrain } from '../../src/dust/grains/make-grain.js'
import { makeOpacityLaw } from '../../src/dust/opacity-law.js'
import { interpolateLinear } from '../../src/math/interp.js'
import { gaussLegendre } from '../../src/math/quadrature.js'
import type { ConstantsSpec, GrainPopulation, GrainsOpacitySpec } from '../../src/scene/types.js'

const um = 1e-4
const rock: ConstantsSpec = {
  kind: 'oscillators',
  infinity: 2.6,
  terms: [
    { at: 1000, strength: 0.8, damping: 200 },
    { at: 526, strength: 1.6, damping: 180 },
    { at: 50000, strength: 0.3, damping: 20000 }
  ]
}
const interstellar: GrainPopulation = {
  massFraction: 1,
  constants: rock,
  sizes: { kind: 'power', smallest: 0.005 * um, largest: 0.25 * um, slope: -3.5 },
  density: 3.3,
  porosity: 0
}
const spec = (populations: GrainPopulation[], phase: GrainsOpacitySpec['phase'] = 'henyey-greenstein'): GrainsOpacitySpec => ({
  law: 'grains',
  populations,
  phase
})

describe('law: grains', () => {
  it.each([
    ['silicate-like oscillators', interstellar],
    ['a crystal with bands half a percent wide', { ...interstellar, constants: { kind: 'handbook', name: 'silicon-carbide' } }],
    ['porous grains', { ...interstellar, porosity: 0.5 }],
    [
      'coated grains',
      { ...interstellar, coat: { constants: { kind: 'constant', n: 1.3, k: 0.1 }, volumeFraction: 0.3, density: 1 } }
    ]
  ] as [string, GrainPopulation][])('interpolates Mie theory to half a percent: %s', (_, population) => {
    const law = makeOpacityLaw(spec([population]))
    // Places that are no rows: golden-section steps through the range that dust emits and stars shine in, and through the bands.
    const between = (from: number, to: number, i: number) => from * (to / from) ** ((0.618034 * i) % 1)
    const wavelengths = [
      ...Array.from({ length: 40 }, (_, i) => between(0.06 * um, 2000 * um, i + 1)),
      ...Array.from({ length: 40 }, (_, i) => between(9 * um, 13 * um, i + 1))
    ]
    const { absorption, scattering, asymmetry } = grainOptics(makeGrain(population), wavelengths)
    wavelengths.forEach((wavelength, w) => {
      const extinction = absorption[w] + scattering[w]
      expect(Math.abs(law.absorption(wavelength) - absorption[w])).toBeLessThan(0.005 * (absorption[w] + 1e-3 * extinction))
      expect(Math.abs(law.scattering(wavelength) - scattering[w])).toBeLessThan(0.005 * (scattering[w] + 1e-3 * extinction))
      expect(Math.abs(law.asymmetry(wavelength) - asymmetry[w])).toBeLessThan(0.005)
    })
  })

  it('has the resonance of small spheres of silicon carbide at 10.736 um, 4.76 cm-1 wide', () => {
    // Bohren & Huffman (1983), section 12.1: Re(eps) = -2 at 931.5 cm-1 for the oscillator of section 9.1; FWHM equals the damping.
    const law = makeOpacityLaw(
      spec([
        {
          ...interstellar,
          constants: { kind: 'handbook', name: 'silicon-carbide' },
          sizes: { kind: 'power', smallest: 1e-7, largest: 2e-7, slope: -3.5 }
        }
      ])
    )
    const wavenumbers = Array.from({ length: 2001 }, (_, i) => 921.5 + 0.01 * i)
    const perVolume = wavenumbers.map((wavenumber) => law.absorption(1 / wavenumber))
    const most = Math.max(...perVolume)
    const half = wavenumbers.filter((_, i) => perVolume[i] > most / 2)
    expect(Math.abs(wavenumbers[perVolume.indexOf(most)] - 931.49)).toBeLessThan(0.3)
    expect(half[half.length - 1] - half[0]).toBeGreaterThan(4.6)
    expect(half[half.length - 1] - half[0]).toBeLessThan(4.95)
  })

  it('adds several kinds by mass, whatever the digits of their fractions', () => {
    const sooty: GrainPopulation = { ...interstellar, constants: { kind: 'constant', n: 2, k: 1 }, density: 2 }
    const mixed = makeOpacityLaw(
      spec([
        { ...interstellar, massFraction: 0.666 },
        { ...sooty, massFraction: 0.333 }
      ])
    )
    const [rocky, black] = [interstellar, sooty].map((kind) => makeOpacityLaw(spec([kind])))
    for (const wavelength of [0.2 * um, 2 * um, 10 * um, 100 * um]) {
      const expected = (2 * rocky.absorption(wavelength) + black.absorption(wavelength)) / 3
      expect(Math.abs(mixed.absorption(wavelength) / expected - 1)).toBeLessThan(0.01)
    }
  })

  it('dilutes by pores: Rayleigh absorption per gram of vacuum mixed into a solid that hardly polarises is unchanged', () => {
    // For |m - 1| << 1 absorption is that of the mass alone (any text on small particles; Bohren & Huffman 1983, section 5.2).
    const faint: GrainPopulation = { ...interstellar, constants: { kind: 'constant', n: 1.001, k: 1e-4 } }
    const [solid, porous] = [faint, { ...faint, porosity: 0.7 }].map((kind) => makeOpacityLaw(spec([kind])))
    expect(porous.absorption(100 * um) / solid.absorption(100 * um)).toBeCloseTo(1, 2)
  })

  it('knows where its constants end', () => {
    const table = {
      file: 'x.csv',
      wavelength: Float64Array.of(1e-5, 1e-3),
      n: Float64Array.of(1.6, 1.5),
      k: Float64Array.of(0.5, 0.8)
    }
    expect(makeOpacityLaw(spec([{ ...interstellar, constants: { kind: 'table', table } }])).range).toEqual([1e-5, 1e-3])
  })
})

describe('its scattering matrix', () => {
  const law = makeOpacityLaw(spec([interstellar], 'computed'))

  it('is absent unless it is asked for', () => {
    expect(makeOpacityLaw(spec([interstellar])).matrix).toBeUndefined()
  })

  it('is normalised and has the mean cosine of the law, between rows too', () => {
    const { nodes, weights } = gaussLegendre(400)
    for (const wavelength of [0.11 * um, 0.3456 * um, 1.2 * um, 33 * um]) {
      const { angles, s11 } = law.matrix!(wavelength)
      const moment = (power: number) =>
        nodes.reduce((sum, x, j) => sum + 2 * Math.PI * weights[j] * interpolateLinear(angles, s11, Math.acos(x)) * x ** power, 0)
      expect(Math.abs(moment(0) - 1)).toBeLessThan(0.003)
      expect(Math.abs(moment(1) - law.asymmetry(wavelength))).toBeLessThan(0.005)
    }
  })

  it('is that of Rayleigh for long waves', () => {
    // Bohren & Huffman (1983), eq. 5.4
    const { angles, s11, s12, s33, s34 } = law.matrix!(500 * um)
    angles.forEach((angle, j) => {
      const cosine = Math.cos(angle)
      const exact = [1 + cosine ** 2, cosine ** 2 - 1, 2 * cosine, 0]
      ;[s11, s12, s33, s34].forEach((element, e) => {
        expect(Math.abs(element[j] - (3 / (16 * Math.PI)) * exact[e])).toBeLessThan(1e-5)
      })
    })
  })

  it('obeys s11^2 = s12^2 + s33^2 + s34^2 at most, as sums of spheres must', () => {
    // Bohren & Huffman (1983), eq. 4.77 and the inequality of Fry & Kattawar (1981) for mixtures.
    const { s11, s12, s33, s34, angles } = law.matrix!(0.4 * um)
    expect(angles[0]).toBe(0)
    expect(angles[angles.length - 1]).toBeCloseTo(Math.PI, 12)
    s11.forEach((value, j) => {
      expect(Math.hypot(s12[j], s33[j], s34[j])).toBeLessThanOrEqual(value * (1 + 1e-9))
    })
    expect(s12[0]).toBeCloseTo(0, 10)
  })
})
