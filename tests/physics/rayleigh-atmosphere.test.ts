import { describe, expect, it } from 'vitest'
import { rayleighAtmosphere } from '../support/rayleigh-atmosphere.js'
import { plane } from './pictures.js'
import { runText } from './run-text.js'

describe('Chandrasekhar (1960, table XXIV; from memory): polarisation of a conservative Rayleigh atmosphere', () => {
  // Printed to five places; at mu = 0.05 the print, 0.08979, is low by 7e-5.
  it.each([
    [0, 0.11713],
    [0.1, 0.07448],
    [0.2, 0.0541],
    [0.5, 0.02252],
    [0.8, 0.006818],
    [1, 0]
  ])('the closed form at mu = %d', (mu, printed) => {
    const { i, q } = rayleighAtmosphere(mu)
    expect(q / i).toBeCloseTo(printed, 4)
  })
})

const radius = 1e15
/** Of the radius; mean free paths are 1e-5 of it. */
const thickness = 1e-4
/** Each a five hundredth of the radius wide. */
const pixels = 1001

/**
 * Errors come from 16 groups (Student's t): beyond 4.5 sigma by chance in less than 1 of 2000 comparisons, and those of all pixels are
 * much the same. Light straight from the star adds to the degree of polarisation: at a depth of 6, where it can be seen, 36 % at half
 * the radius and 2 % at the limb; at 8 it is exp(-2) of that.
 */
const SIGMAS = 4.5
const PLANE = 0.05

/** A hollow ball of scattering dust about a star, so thick and so thin that its outside is a plane half-space all over. */
const scene = `
distance: 100 pc
seed: limb
sources: [{name: star, temperature: 5000 K, luminosity: 1 Lsun}]
opacities:
  grains: {law: table, file: white-dust.csv, phase: rayleigh}
dust:
  - name: crust
    opacity: grains
    shape: {kind: shell, inner: ${radius * (1 - thickness)} cm, outer: ${radius} cm, slope: 0}
    amount: {optical-depth: 8, at: 1 um}
    temperature: none
effort: {precision: none, cameras: 1.2e5}
grid: {kind: spherical, radial: 60}
cameras:
  - {name: strip, field: [${(pixels * radius) / 500} cm, ${radius / 500} cm], pixels: [${pixels}, 1], wavelengths: [1 um]}
`

/** Mean of I and Q over a pixel between two impact parameters, in units of the radius. */
function expected(from: number, to: number): { i: number; q: number } {
  const sum = { i: 0, q: 0 }
  const steps = 40
  // Even in mu, which is even in the square root near the limb: db = mu dmu / b.
  const [high, low] = [from, to].map((b) => Math.sqrt(Math.max(0, 1 - b * b)))
  for (let k = 0; k < steps; k++) {
    const mu = low + ((k + 0.5) / steps) * (high - low)
    const weight = mu / Math.sqrt(1 - mu * mu)
    const { i, q } = rayleighAtmosphere(mu)
    sum.i += weight * i
    sum.q += weight * q
  }
  return sum
}

describe('a thick hollow ball of dust that scatters by the law of Rayleigh', () => {
  it('is polarised along its limb as Chandrasekhar found, up to 11.7 % at the limb', async () => {
    const run = await runText(scene)
    const [image] = run.images
    const total = plane(image, 'total')
    const { q, u, v, sigmaQ } = image.stokes!
    const middle = (pixels - 1) / 2
    for (let k = 50; k <= 500; k += 25) {
      // On the strip, east-west, the limb runs north-south: Q > 0.
      const exact = expected((k - 0.5) / 500, Math.min(1, (k + 0.5) / 500))
      const degree = exact.q / exact.i
      const at = middle + k
      const allowed = (SIGMAS * sigmaQ[at]) / total[at] + PLANE * degree
      expect(Math.abs(q[at] / total[at] - degree), `at ${k / 500} of the radius`).toBeLessThan(allowed)
      expect(q[middle - k]).toBeCloseTo(q[at], 12)
      expect(Math.abs(u[at])).toBeLessThan(1e-12 * total[at])
      expect(Math.abs(v[at])).toBe(0)
    }
    // The mean over the last pixel, which ends at the limb, where it is 11.7 %.
    const last = middle + 500
    expect(q[last] / total[last]).toBeGreaterThan(0.08)
    expect(sigmaQ[last] / total[last]).toBeLessThan(0.004)
  })
})
