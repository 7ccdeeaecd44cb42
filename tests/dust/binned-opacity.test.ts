import { describe, expect, it } from 'vitest'
import { binOpacity } from '../../src/dust/binned-opacity.js'
import { makeOpacityLaw } from '../../src/dust/opacity-law.js'
import { transportWavelengths } from '../../src/dust/wavelength-grid.js'
import { LIGHT_SPEED } from '../../src/units/constants.js'

describe('binOpacity', () => {
  const grid = transportWavelengths(1e-5, 1, [])

  it('averages a power law over frequency as its closed form says', () => {
    const law = makeOpacityLaw({
      law: 'power',
      reference: { wavelength: 1e-4, absorption: 10 },
      slope: 2,
      scattering: { albedo: 0.5, asymmetry: 0.4 },
      phase: 'henyey-greenstein'
    })
    const binned = binOpacity(law, grid)
    for (let k = 0; k < grid.count; k++) {
      const [high, low] = [LIGHT_SPEED / grid.edges[k], LIGHT_SPEED / grid.edges[k + 1]]
      const average = (10 * (high * high + high * low + low * low)) / 3 / (LIGHT_SPEED / 1e-4) ** 2
      expect(binned.absorption[k] / average).toBeCloseTo(1, 12)
      expect(binned.scattering[k] / average).toBeCloseTo(1, 12)
      expect(binned.asymmetry[k]).toBeCloseTo(0.4, 12)
    }
  })

  it('weights the asymmetry by scattering, and keeps it where nothing is scattered', () => {
    const constant = { absorption: () => 1, phase: 'henyey-greenstein' as const, range: [0, 1] as [number, number], kinks: [] }
    const middle = grid.centres[100]
    const oneSided = binOpacity(
      { ...constant, scattering: (at) => (at > middle ? 1 : 0), asymmetry: (at) => (at > middle ? 0.8 : 0.1) },
      grid
    )
    expect(oneSided.asymmetry[100]).toBeCloseTo(0.8, 14)
    expect(binOpacity({ ...constant, scattering: () => 0, asymmetry: () => 0.7 }, grid).asymmetry[50]).toBe(0.7)
  })
})
