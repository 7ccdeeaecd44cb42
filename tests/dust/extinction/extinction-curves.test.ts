import { spawnSync } from 'node:child_process'
import { describe, expect, it } from 'vitest'
import { cardelli1989 } from '../../../src/dust/extinction/cardelli-1989.js'
import { pei1992 } from '../../../src/dust/extinction/pei-1992.js'
import { askPython, itWith, type OutsideTool } from '../../support/python.js'

const extinction: OutsideTool = {
  command: '/usr/bin/python3',
  present: spawnSync('/usr/bin/python3', ['-c', 'import extinction']).status === 0,
  debianPackage: 'python3-extinction'
}
const angstrom = 1e-8
const um = 1e-4

describe('Cardelli, Clayton & Mathis 1989', () => {
  itWith(extinction, 'agrees with the extinction package of Debian', () => {
    // at 1250 angstrom (x = 8) the two branches differ by 5e-5; the package takes the other one
    const wavelengths = Array.from({ length: 200 }, (_, i) => 1000.5 * 33 ** (i / 199.5))
    for (const rv of [2.2, 3.1, 5.5]) {
      const script = 'import extinction, numpy\nanswer = list(extinction.ccm89(numpy.array(data["w"]), 1.0, data["rv"]))'
      const theirs = askPython<number[]>(script, { w: wavelengths, rv })
      const curve = cardelli1989(rv)
      wavelengths.forEach((wavelength, i) => {
        expect(Math.abs(curve.ratio(wavelength * angstrom) / theirs[i] - 1)).toBeLessThan(1e-8)
      })
    }
  })

  it('has the values of its polynomials at R_V = 3.1 and 5.5', () => {
    // computed outside this project; the first also by the extinction package
    for (const [wavelength, dense, denser] of [
      [1000, 5.23835484, 1.931],
      [1500, 2.66387921, 1.32281365],
      [2175, 3.18510128, 1.79469152],
      [3000, 1.8181567, 1.30832268],
      [5500, 0.99885, 0.99921067],
      [9000, 0.47880753, 0.56664073],
      [22000, 0.11352221, 0.13436698]
    ]) {
      expect(cardelli1989(3.1).ratio(wavelength * angstrom)).toBeCloseTo(dense, 8)
      expect(cardelli1989(5.5).ratio(wavelength * angstrom)).toBeCloseTo(denser, 8)
    }
    // at 8 um^-1 the paper gives that point to the nearer branch
    expect(cardelli1989(3.1).ratio(0.125 * um)).toBeCloseTo(3.33685933, 8)
  })

  it('is near the table of the paper (table 3, recalled; its B row is 1 % off the polynomial)', () => {
    for (const [x, printed] of [
      [2.78, 1.569],
      [1.82, 1],
      [1.43, 0.751],
      [1.11, 0.479],
      [0.8, 0.282],
      [0.63, 0.19],
      [0.46, 0.114]
    ])
      expect(Math.abs(cardelli1989(3.1).ratio(um / x) - printed)).toBeLessThan(0.0025)
  })

  it('goes on as a power law beyond 3.3 um, and keeps its value below 0.1 um', () => {
    const { ratio, range } = cardelli1989(3.1)
    expect(ratio(100 * um) / ratio(10 * um)).toBeCloseTo(10 ** -1.61, 12)
    expect(ratio(0.01 * um)).toBe(ratio(0.1 * um))
    expect(range[0]).toBe(0.1 * um)
    expect(range[1] / um).toBeCloseTo(10 / 3, 12)
  })
})

describe('Pei 1992', () => {
  it.each([
    [
      'milky-way',
      [3.403166, 1.933319, 2.39192, 1.364996, 0.948567, 0.737196, 0.306485, 0.073032, 0.046689, 0.017155, 0.010089, 0.000872]
    ],
    [
      'large-magellanic-cloud',
      [4.061094, 2.616977, 2.21092, 1.420534, 0.983016, 0.759613, 0.312611, 0.074385, 0.109986, 0.04212, 0.020894, 0.001536]
    ],
    [
      'small-magellanic-cloud',
      [5.164953, 3.311509, 2.130982, 1.455716, 0.957654, 0.720716, 0.283194, 0.066369, 0.214087, 0.078871, 0.036123, 0.002409]
    ]
  ] as const)('%s has the values computed outside this project from table 4', (galaxy, values) => {
    const wavelengthsUm = [0.1, 0.15, 0.2175, 0.3, 0.44, 0.55, 1, 2.2, 9.7, 18, 25, 100]
    wavelengthsUm.forEach((wavelength, i) => {
      expect(Math.abs(pei1992(galaxy).ratio(wavelength * um) - values[i])).toBeLessThan(5.1e-7)
    })
  })

  it('gives the Large Magellanic Cloud its own R_V (A_V / A_B = R_V / (R_V + 1), R_V = 3.16 of the paper, recalled)', () => {
    expect(pei1992('large-magellanic-cloud').ratio(0.55 * um)).toBeCloseTo(3.16 / 4.16, 3)
  })
})
