import { describe, expect, it } from 'vitest'
import { SOLAR_LUMINOSITY, STEFAN_BOLTZMANN } from '../../src/units/constants.js'
import { plane, radialTemperatures, starlight } from './pictures.js'
import { runText } from './run-text.js'

const starTemperature = 5000
const starRadius = Math.sqrt(SOLAR_LUMINOSITY / (4 * Math.PI * STEFAN_BOLTZMANN * starTemperature ** 4))

const shellOf = (extent: string, inner: number, outer: number, slopes: number[]) => `
distance: 100 pc
sources:
  - {name: star, temperature: ${starTemperature} K, luminosity: 1 Lsun, extent: ${extent}}
opacities:
${slopes.map((slope) => `  slope${slope}: {law: power, reference: {wavelength: 1 um, absorption: 10 cm2/g}, slope: ${slope}}`).join('\n')}
dust:
${slopes
  .map(
    (slope) => `  - name: dust${slope}
    opacity: slope${slope}
    shape: {kind: shell, inner: ${inner * starRadius} cm, outer: ${outer * starRadius} cm}
    amount: {optical-depth: 1e-6, at: 1 um}`
  )
  .join('\n')}
effort: {precision: none, equilibrium: 3e5}
`

describe('optically thin dust', () => {
  /**
   * Dust whose opacity is nu^beta at all wavelengths has T = T* W^(1 / (4 + beta)), W the dilution factor of the star: balance of
   * kappa_P(T*) W T*^4 = kappa_P(T) T^4 with the Planck mean ~ T^beta (common practice). At r = 1000 R* with T* = 5000 K:
   * 111.80339887, 239.08812495, 315.20671468 and 396.85026299 K, computed apart from this program.
   */
  it('has the equilibrium temperature of its opacity, each component its own', async () => {
    const slopes = [0, 1, 1.5, 2]
    const atThousand = [111.80339887, 239.08812495, 315.20671468, 396.85026299]
    const run = await runText(shellOf('point', 200, 5000, slopes))
    slopes.forEach((beta, component) => {
      for (const { r, temperature, sigma } of radialTemperatures(run, component)) {
        const expected = atThousand[component] * (r / (1000 * starRadius)) ** (-2 / (4 + beta))
        // The opacity is one value in each bin of wavelength: 0.1 % beside 4 sigma.
        expect(Math.abs(temperature - expected), `beta ${beta}`).toBeLessThan(4 * sigma + 1e-3 * expected)
      }
    })
  })

  /** W = (1 - sqrt(1 - (R* / r)^2)) / 2 near a star that is a uniform sphere (textbook geometry of a uniform disk). */
  it('sees a star that is a sphere as a disk', async () => {
    const slopes = [0, 2]
    const run = await runText(shellOf('sphere', 1.05, 8, slopes))
    slopes.forEach((beta, component) => {
      for (const { r, temperature, sigma } of radialTemperatures(run, component)) {
        const dilution = 0.5 * (1 - Math.sqrt(1 - (starRadius / r) ** 2))
        const expected = starTemperature * dilution ** (1 / (4 + beta))
        expect(Math.abs(temperature - expected), `beta ${beta}`).toBeLessThan(4 * sigma + 1e-3 * expected)
      }
    })
  })

  /**
   * Light scattered once by an isotropic r^-2 envelope of scattering coefficient k1 (r1 / r)^2, infinite in extent:
   * I(b) = k1 r1^2 L / (16 pi^2) x pi / (2 b^3) for b > r1; an integral along the line of sight. The shell here ends at
   * 1000 r1, which takes less than 1e-4 of it away at the b looked at. A cell holds one density, so that lines that touch a cell
   * see a little too much or too little of it: below 1 % with the cells the program chooses, and less with more of them.
   */
  it.each([
    ['auto', 0.01],
    ['spherical, radial: 1000', 0.002]
  ])('scatters as b^-3 in an r^-2 envelope, cells %s', async (kind, accuracy) => {
    const inner = 1e14
    const depth = 1e-5
    const run = await runText(`
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 1 Lsun}]
opacities: {white: {law: table, file: white-dust.csv}}
dust:
  - name: envelope
    opacity: white
    shape: {kind: shell, inner: ${inner} cm, outer: {times-inner: 1000}, slope: -2}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: none
grid: {kind: ${kind}}
effort: {precision: none, cameras: 1e4}
cameras:
  - {name: strip, field: [${20.02 * inner} cm, ${0.02 * inner} cm], pixels: [1001, 1], wavelengths: [1 um]}
`)
    const row = plane(run.images[0], 'scattered')
    const k1 = depth / (inner * (1 - 1 / 1000))
    for (const b of [1.5, 2, 3, 5, 8]) {
      const expected = ((k1 * starlight(run, 1e-4)) / (16 * Math.PI ** 2 * inner)) * (Math.PI / (2 * b ** 3))
      expect(Math.abs(row[500 + Math.round(50 * b)] / expected - 1), `I at ${b} r1`).toBeLessThan(accuracy)
    }
  })

  /**
   * A thin uniform sphere round a star: I(b) = k L / (16 pi^2 b) x 2 atan(sqrt(R^2 - b^2) / b); (2 / b) atan(...) at b / R = 0.1,
   * 0.5, 0.9 is 29.4125781127, 4.1887902048, 1.0022818040 (the integral of r^-2 along a chord).
   */
  it('scatters as the angle of a chord in a uniform sphere', async () => {
    const radius = 1e14
    const depth = 1e-5
    const run = await runText(`
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 1 Lsun}]
opacities: {white: {law: table, file: white-dust.csv}}
dust:
  - name: ball
    opacity: white
    shape: {kind: ball, radius: ${radius} cm}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: none
effort: {precision: none, cameras: 1e4}
cameras:
  - {name: strip, field: [${2.004 * radius} cm, ${0.004 * radius} cm], pixels: [501, 1], wavelengths: [1 um]}
`)
    const row = plane(run.images[0], 'scattered')
    const unit = ((depth / radius) * starlight(run, 1e-4)) / (16 * Math.PI ** 2 * radius)
    const chords: [number, number][] = [
      [0.1, 29.4125781127],
      [0.5, 4.1887902048],
      [0.9, 1.002281804]
    ]
    for (const [b, chord] of chords) {
      expect(Math.abs(row[250 + Math.round(250 * b)] / (unit * chord) - 1), `I at ${b} R`).toBeLessThan(1e-3)
    }
  })
})
