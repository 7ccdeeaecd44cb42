import { describe, expect, it } from 'vitest'
import { makeOpacityLaw } from '../../src/dust/opacity-law.js'
import type { OpacitySpec, PowerOpacitySpec } from '../../src/scene/types.js'

const power: PowerOpacitySpec = {
  law: 'power',
  reference: { wavelength: 0.13, absorption: 2.3 },
  slope: 1.5,
  scattering: { albedo: 0.6, asymmetry: 0.3 },
  phase: 'henyey-greenstein'
}

function table(wavelengthUm: number[], absorption: number[], scattering: number[], asymmetry: number[]): OpacitySpec {
  return {
    law: 'table',
    phase: 'henyey-greenstein',
    table: {
      file: 'made-up.csv',
      wavelength: Float64Array.from(wavelengthUm, (um) => um * 1e-4),
      absorption: Float64Array.from(absorption),
      scattering: Float64Array.from(scattering),
      asymmetry: Float64Array.from(asymmetry)
    }
  }
}

describe('power law', () => {
  it('keeps its albedo at every wavelength', () => {
    const law = makeOpacityLaw(power)
    expect(law.absorption(0.13)).toBe(2.3)
    for (const wavelength of [1e-5, 1e-3, 0.2]) {
      expect(law.absorption(wavelength)).toBeCloseTo(2.3 * (0.13 / wavelength) ** 1.5, 8)
      expect(law.scattering(wavelength) / (law.scattering(wavelength) + law.absorption(wavelength))).toBeCloseTo(0.6, 14)
      expect(law.asymmetry(wavelength)).toBe(0.3)
    }
  })

  it('gives scattering its own slope when it has one', () => {
    const law = makeOpacityLaw({ ...power, scattering: { ...power.scattering, slope: 4 } })
    expect(law.scattering(0.13)).toBeCloseTo(2.3 * 1.5, 12)
    expect(law.scattering(0.26) / law.scattering(0.13)).toBeCloseTo(1 / 16, 14)
  })

  it('scatters evenly when asked for isotropic scattering', () => {
    expect(makeOpacityLaw({ ...power, phase: 'isotropic' }).asymmetry(1e-4)).toBe(0)
  })
})

describe('table', () => {
  const law = makeOpacityLaw(table([1, 10, 100, 1000], [100, 100, 1, 0.1], [50, 0, 4, 1e-3], [0.6, 0.4, 0.2, 0]))
  const um = 1e-4

  it('interpolates in log-log, and linearly towards a zero', () => {
    expect(law.absorption(10 * Math.sqrt(10) * um)).toBeCloseTo(10, 12)
    expect(law.scattering(5.5 * um)).toBeCloseTo(25, 12)
    expect(law.scattering(55 * um)).toBeCloseTo(2, 12)
    expect(law.asymmetry(Math.sqrt(10) * um)).toBeCloseTo(0.5, 12)
  })

  it('holds the short end, and extends the last power law at the long end', () => {
    expect(law.absorption(0.01 * um)).toBe(100)
    expect(law.scattering(0.01 * um)).toBe(50)
    expect(law.absorption(1e5 * um)).toBeCloseTo(1e-3, 14)
    expect(law.scattering(2000 * um) / 1e-3).toBeCloseTo(2 ** -Math.log10(4000), 12)
    expect(law.asymmetry(0.01 * um)).toBe(0.6)
    expect(law.asymmetry(1e5 * um)).toBe(0)
    expect(law.range).toEqual([1 * um, 1000 * um])
  })

  it('extends a last zero as zero, and takes a single row', () => {
    const ended = makeOpacityLaw(table([1, 10], [5, 0], [0, 5], [0, 0]))
    expect(ended.absorption(1e-1)).toBe(0)
    expect(ended.scattering(1e-1)).toBe(5)
    const single = makeOpacityLaw(table([1], [5], [2], [0.1]))
    for (const wavelength of [1e-5, 1e-4, 1e-1]) expect(single.absorption(wavelength)).toBe(5)
  })

  it('reports where a curve bends sharply', () => {
    expect(law.kinks).toEqual([1 * um, 10 * um, 100 * um])
    const wavelengths = Array.from({ length: 50 }, (_, i) => 1.2 ** i)
    const smooth = wavelengths.map((value) => 1 / (10 + value))
    const kinks = makeOpacityLaw(table(wavelengths, smooth, smooth, smooth)).kinks
    expect(kinks).toHaveLength(0)
  })
})
