import { describe, expect, it } from 'vitest'
import { handbook } from '../../../src/dust/materials/handbook.js'
import { longitudinalTerm, oscillatorMaterial, oscillatorPermittivity } from '../../../src/dust/materials/oscillator-material.js'
import type { HandbookName } from '../../../src/scene/types.js'
import { sphereEfficiencies } from '../mie/sphere.js'

const um = 1e-4

/** Q_abs / radius, um^-1, of a sphere much smaller than the wavelength, by Mie theory. */
function absorptionPerRadius(name: HandbookName, wavenumber: number): number {
  const { re, im } = oscillatorMaterial(handbook[name]).index(1 / wavenumber)
  const radiusUm = 1e-6
  const x = 2 * Math.PI * radiusUm * um * wavenumber
  return sphereEfficiencies(x, [re, im]).absorption / radiusUm
}

/** Wavenumber of the highest value between two. */
function peak(f: (wavenumber: number) => number, from: number, to: number): number {
  let [low, high] = [from, to]
  const golden = (Math.sqrt(5) - 1) / 2
  while (high - low > 1e-6) {
    const [a, b] = [high - golden * (high - low), low + golden * (high - low)]
    if (f(a) > f(b)) high = b
    else low = a
  }
  return 0.5 * (low + high)
}

describe('silicon carbide (Spitzer, Kleinman & Walsh 1959; parameters as in Bohren & Huffman 1983, section 9.1)', () => {
  const material = oscillatorMaterial(handbook['silicon-carbide'])

  it('has the optical constants computed outside this project', () => {
    // wavelength (um), permittivity, n, k, Q_abs / a of a small sphere (um^-1)
    const rows = [
      [5, 6.083672, 0.00174, 2.46651, 0.000353, 4.016466e-4],
      [10, 1.102794, 0.071784, 1.050695, 0.03416, 5.61889e-2],
      [10.5, -0.76709, 0.121687, 0.069253, 0.878571, 0.5693004],
      [10.7, -1.79203, 0.154453, 0.057636, 1.339907, 16.21826],
      [11.3, -6.755827, 0.36735, 0.07064, 2.600157, 0.1077275],
      [12.5, -160.168693, 56.984664, 2.217546, 12.848588, 1.216092e-2],
      [12.61, 1.748552, 550.38471, 16.615295, 16.562592, 1.086324e-2],
      [15, 17.964013, 0.193837, 4.238459, 0.022866, 2.44439e-3],
      [100, 10.057441, 0.002582, 3.171347, 0.000407, 1.339311e-5]
    ]
    for (const [wavelengthUm, re, im, n, k, absorption] of rows) {
      const permittivity = oscillatorPermittivity(handbook['silicon-carbide'], 1e4 / wavelengthUm)
      const index = material.index(wavelengthUm * um)
      for (const [found, listed] of [
        [permittivity.re, re],
        [permittivity.im, im],
        [index.re, n],
        [index.im, k]
      ])
        expect(Math.abs(found - listed)).toBeLessThan(6e-7)
      expect(absorptionPerRadius('silicon-carbide', 1e4 / wavelengthUm) / absorption).toBeCloseTo(1, 5)
    }
  })

  it('resonates at 931.4885 cm-1 with the height and width of the formula (the book has 932 cm-1, recalled)', () => {
    const absorption = (wavenumber: number) => absorptionPerRadius('silicon-carbide', wavenumber)
    const at = peak(absorption, 900, 960)
    expect(at).toBeCloseTo(931.4885, 3)
    expect(absorption(at)).toBeCloseTo(43.48195, 3)
    // Q_abs / a ~ w^2 damping / ((wF^2 - w^2)^2 + damping^2 w^2): half of it where wF^2 - w^2 = +- damping w, 4.76 cm-1 apart
    const half = (sign: number) => sign * 2.38 + Math.sqrt(2.38 ** 2 + at ** 2)
    for (const sign of [1, -1]) expect(absorption(half(sign)) / absorption(at)).toBeCloseTo(0.5, 3)
  })

  it('reflects as computed outside this project', () => {
    for (const [wavenumber, reflectance] of [
      [800, 0.94944],
      [850, 0.97089],
      [900, 0.957877],
      [950, 0.869503]
    ]) {
      const { re, im } = material.index(1 / wavenumber)
      expect(((re - 1) ** 2 + im ** 2) / ((re + 1) ** 2 + im ** 2)).toBeCloseTo(reflectance, 5)
    }
  })

  it('is transparent at infinity / static ratio of Lyddane, Sachs & Teller', () => {
    const [{ strength }] = handbook['silicon-carbide'].terms
    expect(6.7 + strength).toBeCloseTo(10.004053, 6)
    expect((6.7 + strength) / 6.7).toBeCloseTo((969 / 793) ** 2, 12)
    expect(longitudinalTerm(6.7, 793, 969, 4.76)).toEqual(handbook['silicon-carbide'].terms[0])
    expect(oscillatorPermittivity(handbook['silicon-carbide'], 1e-3).re).toBeCloseTo(6.7 + strength, 9)
  })
})

describe('other handbook materials (parameters recalled)', () => {
  it.each([
    ['magnesium-oxide', 9.655, 605.3, 14.4344],
    ['corundum-ordinary', 9.5, 1e4 / 12.7166, 43.1675],
    ['corundum-extraordinary', 11.6, 1e4 / 13.203, 28.3189],
    ['quartz-ordinary', 4.323, 1e4 / 8.7043, 23.7433]
  ] as [HandbookName, number, number, number][])(
    '%s absorbs most where computed outside this project',
    (name, atRest, at, height) => {
      expect(oscillatorPermittivity(handbook[name], 1e-3).re).toBeCloseTo(atRest, 3)
      const absorption = (wavenumber: number) => absorptionPerRadius(name, wavenumber)
      const found = peak(absorption, at - 5, at + 5)
      expect(Math.abs(found / at - 1)).toBeLessThan(1e-5)
      expect(Math.abs(absorption(found) / height - 1)).toBeLessThan(1e-5)
    }
  )
})
