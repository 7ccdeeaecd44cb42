import { describe, expect, it } from 'vitest'
import type { RunResult } from '../../src/run/run-result.js'
import { plane, sumOf } from './pictures.js'
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

/** Pixels that are the same by symmetry: mirror images for a disk, all eight octants for a shell. */
function kinds(spherical: boolean): number[][] {
  const byKind = new Map<string, number[]>()
  for (let i = 0; i < n * n; i++) {
    const across = Math.abs((i % n) - (n - 1) / 2)
    const up = Math.floor(i / n) - (n - 1) / 2
    const kind = spherical ? [across, Math.abs(up)].sort().join(' ') : `${across} ${up}`
    byKind.set(kind, [...(byKind.get(kind) ?? []), i])
  }
  return [...byKind.values()]
}

/**
 * Mean square of the pulls of the mean over pixels that are the same by symmetry, where `theirs` is known to 10 %. Single pixels
 * of peel-off have long tails where the dust is thick. Errors of the emissivity method are much the same in all pixels, as every
 * packet lights many cells: they do not average out, and its packets are so many that the other error is the larger one.
 */
function pulls(ours: RunResult, theirs: RunResult, spherical: boolean): { meanSquare: number; count: number } {
  const [a, sa] = [plane(ours.images[0], 'total'), plane(ours.images[0], 'sigma')]
  const [b, sb] = [plane(theirs.images[0], 'total'), plane(theirs.images[0], 'sigma')]
  let sum = 0
  let count = 0
  for (const pixels of kinds(spherical)) {
    const mean = (values: Float64Array) => sumOf(pixels.map((i) => values[i])) / pixels.length
    const sigma = Math.sqrt(sumOf(pixels.map((i) => sb[i] ** 2))) / pixels.length
    if (!(sigma > 0 && sigma < 0.1 * mean(a))) continue
    sum += (mean(a) - mean(b)) ** 2 / (mean(sa) ** 2 + sigma ** 2)
    count++
  }
  return { meanSquare: sum / count, count }
}

// Packets of the emissivity method, of peel-off and of exit bins.
describe.each([
  { name: 'shell of optical depth 0.1', shape: shell, depth: 0.1, inclination: 30, packets: [2e4, 2e4, 2e6] },
  { name: 'shell of optical depth 1', shape: shell, depth: 1, inclination: 30, packets: [2e4, 3e4, 3e5] },
  { name: 'shell of optical depth 10', shape: shell, depth: 10, inclination: 30, packets: [3e5, 1.2e5, 8e5] },
  { name: 'disk of optical depth 10 at 60 deg', shape: disk, depth: 10, inclination: 60, packets: [5e4, 6e4, 2e6] }
])('the three estimators agree: $name', ({ shape, depth, inclination, packets }) => {
  it('in fluxes and pixels', async () => {
    const ours = await runText(sceneOf(shape, depth, inclination, packets[0]))
    for (const estimator of ['peel', 'exit'] as const) {
      const theirs = await runText(sceneOf(shape, depth, inclination, packets[estimator === 'peel' ? 1 : 2]), { estimator })
      fluxesAgree(ours, theirs)
      const { meanSquare, count } = pulls(ours, theirs, shape === shell)
      // The mean of `count` squares of Student's t with 15 degrees of freedom: 15 / 13, variance 2 (15 / 13)^2 14 / 11.
      expect(count).toBeGreaterThanOrEqual(6)
      expect(meanSquare).toBeLessThan((15 / 13) * (1 + SIGMAS * Math.sqrt((2 * 14) / 11 / count)))
    }
  })
})
