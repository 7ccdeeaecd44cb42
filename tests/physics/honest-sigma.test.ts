import { expect, it } from 'vitest'
import type { RunResult } from '../../src/run/run-result.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

/** `npm run test:honesty` asks for 200. */
const SEEDS = Number(process.env.SEEDS ?? 30)

const sceneOf = (seed: string, packets: number) => `
distance: 60 pc
seed: ${seed}
sources: [{name: star, temperature: 4000 K, luminosity: 20 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.6, asymmetry: 0.3}}
dust:
  - name: shell
    opacity: grains
    shape: {kind: shell, inner: 5 au, outer: 80 au}
    amount: {optical-depth: 3, at: 1 um}
grid: {kind: spherical, radial: 30}
effort: {precision: none, equilibrium: ${10 * packets}, cameras: ${packets}}
cameras:
  - {name: c, field: 160 au, pixels: 3, wavelengths: [1 um, 30 um]}
spectra:
  - {name: s, wavelengths: [1 um, 30 um]}
`

interface Quantity {
  name: string
  value: number
  sigma: number
}

/** Every pixel, flux and temperature with its 1 sigma. */
function measured({ images, spectra, dust }: RunResult): Quantity[] {
  const of = (name: string, values: Float64Array, sigmas: Float64Array): Quantity[] =>
    Array.from(values, (value, i) => ({ name: `${name} ${i}`, value, sigma: sigmas[i] }))
  return [
    ...[0, 1].flatMap((k) => of(`wavelength ${k}, pixel`, plane(images[0], 'total', k), plane(images[0], 'sigma', k))),
    ...of('flux', spectra[0].total, spectra[0].sigma),
    ...of('temperature of cell', dust.temperature, dust.sigma).filter(({ value }) => value > 0)
  ]
}

/** Allowed deviations, in standard deviations: each is passed by chance once in 150,000 times. */
const ALLOWED = 4.5

/**
 * Small runs with many seeds against a long one. For an error taken from 16 groups, (value - truth) / sigma follows Student's t
 * with 15 degrees of freedom: its mean is 0 and its variance 15 / 13, the mean square over n seeds scatters with a standard
 * deviation of 15 / 13 sqrt(2 (14 / 11) / n) (moments of t), and it is within 1 and 2 sigma with the probabilities below
 * (scipy.stats.t.cdf, 15 degrees of freedom), of which the fractions over n seeds scatter by sqrt(p (1 - p) / n). Of 200 seeds
 * 51.7 to 81.7 % have to be within 1 sigma, and 85.8 % or more within 2 sigma.
 */
const WITHIN = [
  { sigmas: 1, probability: 0.66683 },
  { sigmas: 2, probability: 0.93605 }
]

it(`the errors given are those that ${SEEDS} seeds show`, { timeout: 1000 * (60 + 5 * SEEDS) }, async () => {
  const truth = measured(await runText(sceneOf('long', 4e5)))
  const runs: Quantity[][] = []
  for (let seed = 0; seed < SEEDS; seed++) runs.push(measured(await runText(sceneOf(`short-${seed}`, 2000), { workers: 1 })))
  expect(truth.length).toBeGreaterThan(45)
  truth.forEach(({ name, value, sigma }, q) => {
    const pulls = runs.map((run) => (run[q].value - value) / Math.hypot(run[q].sigma, sigma))
    const mean = sumOf(pulls) / SEEDS
    expect(Math.abs(mean), `mean of ${name}`).toBeLessThan((ALLOWED * Math.sqrt(15 / 13)) / Math.sqrt(SEEDS))
    const meanSquare = sumOf(pulls.map((pull) => pull * pull)) / SEEDS
    expect(meanSquare, `variance of ${name}`).toBeLessThan((15 / 13) * (1 + ALLOWED * Math.sqrt((2 * 14) / 11 / SEEDS)))
    for (const { sigmas, probability } of WITHIN) {
      const fraction = pulls.filter((pull) => Math.abs(pull) < sigmas).length / SEEDS
      const scatter = Math.sqrt((probability * (1 - probability)) / SEEDS)
      expect(Math.abs(fraction - probability), `${name} within ${sigmas} sigma: ${fraction}`).toBeLessThan(ALLOWED * scatter)
    }
  })
})
