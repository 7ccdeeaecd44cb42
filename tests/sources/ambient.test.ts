import { describe, expect, it } from 'vitest'
import { integrate } from '../../src/math/quadrature.js'
import type { AmbientSpec } from '../../src/scene/types.js'
import { ambientField, inflow } from '../../src/sources/ambient.js'
import { LIGHT_SPEED, STEFAN_BOLTZMANN } from '../../src/units/constants.js'

const fieldOf = (spectrum: AmbientSpec['spectrum'], strength = 1) =>
  ambientField({ name: 'sky', kind: 'ambient', spectrum, strength })
const blackbody = (temperature: number, dilution = 1) => fieldOf({ kind: 'blackbodies', terms: [{ temperature, dilution }] })
const at = (um: number) => LIGHT_SPEED / (um * 1e-4)

/** 4 pi J_lambda, erg/s/cm2/um. */
function perMicrometre({ intensityNu }: ReturnType<typeof ambientField>, um: number): number {
  const cm = um * 1e-4
  return (4 * Math.PI * intensityNu(at(um)) * LIGHT_SPEED) / cm ** 2 / 1e4
}

describe('cosmic background', () => {
  // T = 2.72548 K (Fixsen 2009, ApJ 707, 916); intensity and energy density of that blackbody computed apart from this program.
  const background = blackbody(2.72548)

  it('has the intensity of its blackbody', () => {
    expect(background.intensityNu(at(1000)) / 203.559828758e-17).toBeCloseTo(1, 8)
    expect((4 * Math.PI * background.intensity) / LIGHT_SPEED / 4.174678e-13).toBeCloseTo(1, 6)
  })

  it('is diluted and strengthened in proportion', () => {
    expect(blackbody(2.72548, 0.25).intensityNu(3e11) / background.intensityNu(3e11)).toBeCloseTo(0.25, 14)
    const terms = [{ temperature: 2.72548, dilution: 0.5 }]
    expect(fieldOf({ kind: 'blackbodies', terms }, 6).intensity / background.intensity).toBeCloseTo(3, 12)
  })

  it('sends sigma T^4 into each square centimetre', () => {
    expect(inflow(blackbody(40), 7).luminosity / (4 * Math.PI * 49 * STEFAN_BOLTZMANN * 40 ** 4)).toBeCloseTo(1, 7)
  })
})

describe('interstellar starlight', () => {
  const field = fieldOf({ kind: 'interstellar' })

  // Diluted blackbodies of Mathis, Mezger & Panagia 1983 (A&A 128, 212) beyond 0.246 um, evaluated apart from this program.
  it.each([
    [0.25, 7.219356e-3],
    [0.4, 1.435939e-2],
    [0.55, 1.562121e-2],
    [1, 1.178221e-2],
    [2.2, 2.392586e-3],
    [5, 1.747425e-4]
  ])('4 pi J_lambda at %d um', (um, expected) => {
    expect(perMicrometre(field, um) / expected).toBeCloseTo(1, 5)
  })

  // nu u_nu in erg/cm3 with E in eV, another form of the same field: Weingartner & Draine 2001 (ApJS 134, 263, eq. 31), from memory.
  it.each([
    [12, 3.328e-9, -4.4172],
    [10, 8.463e-13, -1],
    [7, 2.055e-14, 0.6678]
  ])('nu u_nu at %d eV', (energy, factor, power) => {
    const nu = (energy * 1.602176634e-12) / 6.62607015e-27
    const density = (4 * Math.PI * nu * field.intensityNu(nu)) / LIGHT_SPEED
    expect(Math.abs(density / (factor * energy ** power) - 1)).toBeLessThan(2e-3)
  })

  it('is dark below the Lyman limit', () => {
    expect(field.intensityNu(at(0.0911))).toBe(0)
    expect(field.range[0]).toBe(0.0912e-4)
  })

  it('has 1.14 of the energy of Habing between 6 and 13.6 eV', () => {
    // 1.14 x 5.29e-14 erg/cm3: Draine 2011 (Physics of the Interstellar and Intergalactic Medium, sect. 12.5), from memory.
    const eV = 1.602176634e-12 / 6.62607015e-27
    const density = (4 * Math.PI * integrate(field.intensityNu, 6 * eV, 13.6 * eV, 1e-6)) / LIGHT_SPEED
    expect(Math.abs(density / 5.29e-14 - 1.14)).toBeLessThan(0.006)
  })

  it('adds up over its pieces', () => {
    // 2.205e-2 erg/s/cm2 from 0.0912 to 8 um and 3 % more beyond... each piece integrated apart: 2.13733e-3 and 2.03318e-2 less
    // what the blackbodies have below 0.246 um.
    const beyond = integrate((um) => perMicrometre(field, um), 0.246, 8, 1e-8)
    const below = integrate((um) => perMicrometre(field, um), 0.0912, 0.246, 1e-8)
    expect(beyond / 1.99165e-2).toBeCloseTo(1, 4)
    expect(Math.abs(below / 2.13733e-3 - 1)).toBeLessThan(1e-3)
  })
})

describe('a tabulated field', () => {
  const wavelength = Float64Array.from([1e-4, 2e-4, 4e-4])
  const field = fieldOf({ kind: 'table', table: { file: 'made-up.csv', wavelength, intensityNu: Float64Array.of(1, 4, 4) } }, 2)

  it('is log-log between its rows, nothing beyond, and an intensity as it stands', () => {
    expect(field.intensityNu(LIGHT_SPEED / Math.sqrt(2e-8))).toBeCloseTo(4, 10)
    expect(field.intensityNu(LIGHT_SPEED / 0.9e-4)).toBe(0)
    expect(field.intensityNu(LIGHT_SPEED / 4.1e-4)).toBe(0)
    // I ~ nu^-2 from nu1 to 2 nu1, then constant: 2 x 4 nu1 (1 - 1/2) + 2 x 4 (nu1 - nu1 / 2), nu1 = c / 2 um.
    expect(field.intensity / (8 * (LIGHT_SPEED / 2e-4))).toBeCloseTo(1, 9)
  })
})
