import { describe, expect, it } from 'vitest'
import type { RunResult } from '../../src/run/run-scene.js'
import { plane } from './pictures.js'
import { runText } from './run-text.js'

/** Odd, so that the star lies within one pixel. */
const n = 7

const sceneOf = (shape: string, depth: number, inclination: number, packets: number) => `
distance: 100 pc
seed: three-ways
sources: [{name: star, temperature: 5000 K, luminosity: 100 Lsun}]
opacities:
  grey: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 0, scattering: {albedo: 0.6, asymmetry: 0.5}}
dust:
  - name: dust
    opacity: grey
    shape: ${shape}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: none
effort: {precision: none, cameras: ${packets}}
cameras:
  - {name: c, view: {inclination: ${inclination} deg}, field: 200 au, pixels: ${n}, wavelengths: [1 um]}
spectra:
${[20, 40, 70, 120].map((radius) => `  - {name: within${radius}, view: {inclination: ${inclination} deg}, aperture: ${radius} au, wavelengths: [1 um]}`).join('\n')}
`

const shell = '{kind: shell, inner: 10 au, outer: 100 au, slope: -2}'
const disk = '{kind: disk, inner: 10 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}}'

/**
 * Errors come from 16 groups, so that a difference over its error follows Student's t with 15 to 30 degrees of freedom: beyond
 * 4.5 it lies by chance in less than 1 of 2000 comparisons. Beside it a bias of the emissivity method, whose cells hold mean
 * values, of 0.5 % of a flux is allowed: half of what is promised for a pixel.
 */
const SIGMAS = 4.5
const BIAS = 0.005

function fluxesAgree(ours: RunResult, theirs: RunResult) {
  ours.spectra.forEach(({ spectrum, total, sigma }, i) => {
    const other = theirs.spectra[i]
    const allowed = SIGMAS * Math.hypot(sigma[0], other.sigma[0]) + BIAS * total[0]
    expect(Math.abs(total[0] - other.total[0]), spectrum.name).toBeLessThan(allowed)
  })
}

/**
 * Mean square of the pulls of the pixels that `theirs` knows to 15 %. Errors of the emissivity method are much the same in all
 * pixels, as every packet lights many cells, so its packets are so many that the error of `theirs` is the larger one.
 */
function pixelPulls(ours: RunResult, theirs: RunResult): { meanSquare: number; pixels: number } {
  const [a, sa] = [plane(ours.images[0], 'total'), plane(ours.images[0], 'sigma')]
  const [b, sb] = [plane(theirs.images[0], 'total'), plane(theirs.images[0], 'sigma')]
  let sum = 0
  let pixels = 0
  a.forEach((value, i) => {
    if (!(b[i] > 0) || sb[i] > 0.15 * b[i]) return
    sum += (value - b[i]) ** 2 / (sa[i] ** 2 + sb[i] ** 2)
    pixels++
  })
  return { meanSquare: sum / pixels, pixels }
}

// Packets of the emissivity method, of peel-off and of exit bins.
describe.each([
  { name: 'shell of optical depth 0.1', shape: shell, depth: 0.1, inclination: 30, packets: [2e4, 2e4, 2e6] },
  { name: 'shell of optical depth 1', shape: shell, depth: 1, inclination: 30, packets: [2e4, 3e4, 3e5] },
  { name: 'shell of optical depth 10', shape: shell, depth: 10, inclination: 30, packets: [4e5, 1.5e5, 4e5] },
  { name: 'disk of optical depth 10 at 60 deg', shape: disk, depth: 10, inclination: 60, packets: [5e4, 6e4, 2e6] }
])('the three estimators agree: $name', ({ shape, depth, inclination, packets }) => {
  it('in fluxes and pixels', async () => {
    const ours = await runText(sceneOf(shape, depth, inclination, packets[0]))
    for (const estimator of ['peel', 'exit'] as const) {
      const theirs = await runText(sceneOf(shape, depth, inclination, packets[estimator === 'peel' ? 1 : 2]), { estimator })
      fluxesAgree(ours, theirs)
      const { meanSquare, pixels } = pixelPulls(ours, theirs)
      // The mean of `pixels` squares of Student's t with 15 degrees of freedom: 15 / 13, variance 2 (15 / 13)^2 14 / 11.
      const expected = 15 / 13
      expect(pixels).toBeGreaterThanOrEqual(10)
      expect(meanSquare).toBeLessThan(expected * (1 + SIGMAS * Math.sqrt((2 * 14) / 11 / pixels)))
    }
  })
})
