import { expect, it } from 'vitest'
import type { RunResult } from '../../src/run/run-scene.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

const SEEDS = 30

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
`

/** Quantities and their 1 sigma: single pixels at both wavelengths, temperatures of some cells. */
function measured({ images, dust }: RunResult): { value: number; sigma: number }[] {
  const pixels = [0, 1].flatMap((k) =>
    [0, 1, 4].map((i) => ({ value: plane(images[0], 'total', k)[i], sigma: plane(images[0], 'sigma', k)[i] }))
  )
  const cells = [3, 12, 20, 28].map((i) => ({ value: dust.temperature[i], sigma: dust.sigma[i] }))
  return [...pixels, ...cells]
}

/**
 * Small runs with 30 seeds against a long one: (value - truth) / sigma has mean 0 and the variance 15 / 13 of Student's t with 15
 * degrees of freedom, for an error taken from 16 groups. The mean square over 30 seeds scatters about it with a standard deviation
 * of 15 / 13 sqrt(2 (14 / 11) / 30) = 0.34; the bounds are 4.5 of these above, and the 1e-5 point of chi-square with 30 degrees of
 * freedom (8.3 / 30, chi-square tables) below; the mean over seeds may be 4.5 / sqrt(30) away from 0.
 */
it('the errors given are those that seeds show', async () => {
  const truth = measured(await runText(sceneOf('long', 4e5)))
  const runs: ReturnType<typeof measured>[] = []
  for (let seed = 0; seed < SEEDS; seed++) runs.push(measured(await runText(sceneOf(`short-${seed}`, 2000), { workers: 1 })))
  truth.forEach(({ value, sigma }, q) => {
    const pulls = runs.map((run) => (run[q].value - value) / Math.hypot(run[q].sigma, sigma))
    const mean = sumOf(pulls) / SEEDS
    const meanSquare = sumOf(pulls.map((pull) => pull * pull)) / SEEDS
    expect(Math.abs(mean), `mean of quantity ${q}`).toBeLessThan((4.5 * Math.sqrt(15 / 13)) / Math.sqrt(SEEDS))
    expect(meanSquare, `variance of quantity ${q}`).toBeLessThan(15 / 13 + 4.5 * 0.34)
    expect(meanSquare, `variance of quantity ${q}`).toBeGreaterThan(0.28)
  })
})
