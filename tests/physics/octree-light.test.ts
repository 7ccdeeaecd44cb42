import { describe, expect, it } from 'vitest'
import type { RunResult } from '../../src/run/run-result.js'
import { sumOf } from './pictures.js'
import { runText } from './run-text.js'

const rayleigh =
  'law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.6}, phase: rayleigh'
const grains =
  'law: grains, constants: {n: 1.6, k: 0.2}, sizes: {smallest: 150 nm, largest: 200 nm, slope: -3.5}, grain-density: 3 g/cm3, phase: computed'
const spherical = '{kind: spherical, radial: 40}'
const cubes = '{kind: octree, cells-at-most: 8e3}'

const sceneOf = (law: string, grid: string, packets: number) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 10 Lsun}]
opacities: {dust: {${law}}}
dust: [{name: shell, opacity: dust, shape: {kind: shell, inner: 30 au, outer: 100 au, slope: -1}, amount: {optical-depth: 0.8, at: 1 um}, temperature: 300 K}]
grid: ${grid}
effort: {precision: none, cameras: ${packets}}
cameras: [{name: c, view: {inclination: 50 deg, azimuth: 20 deg}, field: 220 au, pixels: 11, wavelengths: [1 um]}]
spectra: [{name: s, view: {inclination: 50 deg, azimuth: 20 deg}, wavelengths: [1 um, 15 um]}]
`

/** Sum of the azimuthal polarisation Q_phi over a picture: that of light scattered once lies across the radius. */
function azimuthal({ images }: RunResult): number {
  const [{ stokes, width, height }] = images
  return sumOf(
    stokes!.q.map((q, i) => {
      const angle = 2 * Math.atan2((width - 1) / 2 - (i % width), Math.floor(i / width) - (height - 1) / 2)
      return -q * Math.cos(angle) - stokes!.u[i] * Math.sin(angle)
    })
  )
}

describe('light in cubes', () => {
  it.each([
    ['the law of Rayleigh', rayleigh],
    ['Mie theory', grains]
  ])('is polarised as in spherical cells by %s', async (_, law) => {
    const round = await runText(sceneOf(law, spherical, 2e4))
    const cubic = await runText(sceneOf(law, cubes, 2e4))
    const [expected] = round.spectra
    const [seen] = cubic.spectra
    // Noise is below 0.2 %; the rest is what cubes make of the edges.
    expect(Math.abs(seen.scattered[0] / expected.scattered[0] - 1)).toBeLessThan(0.01)
    expect(Math.abs(seen.emitted[1] / expected.emitted[1] - 1)).toBeLessThan(0.01)
    expect(Math.abs(azimuthal(cubic) / azimuthal(round) - 1)).toBeLessThan(0.015)
    expect(azimuthal(round)).toBeGreaterThan(0.3 * sumOf(round.images[0].scattered))
  })

  it('in a bath of blackbody radiation brings dust to its temperature, and lets nothing be seen', async () => {
    const bath = `
distance: 100 pc
sources: [{name: sky, kind: ambient, spectrum: {blackbody: 50 K}}]
opacities: {grey: {law: power, reference: {wavelength: 1 mm, absorption: 10 cm2/g}, slope: 0, scattering: {albedo: 0.5, asymmetry: 0.4}}}
dust: [{name: cloud, opacity: grey, shape: {kind: ball, radius: 100 au}, amount: {optical-depth: 1, at: 1 mm}}]
grid: {kind: octree, cells-at-most: 500}
effort: {precision: none, equilibrium: 2e5, cameras: 5e4}
spectra: [{name: s, wavelengths: [100 um]}]
`
    const { model, dust, spectra } = await runText(bath)
    const { density, mass } = model.components[0]
    const weights = density.map((rho, cell) => (rho * model.volume[cell]) / mass)
    // Kirchhoff's law. The mean of many cells has little noise.
    expect(Math.abs(sumOf(weights.map((weight, cell) => weight * (dust.temperature[cell] / 50 - 1))))).toBeLessThan(0.003)
    const [{ total, deficit, sigma }] = spectra
    expect(sigma[0]).toBeLessThan(0.01 * total[0])
    expect(Math.abs(total[0] - deficit![0])).toBeLessThan(4.5 * sigma[0] + 1e-3 * total[0])
  })

  it('leaves as exit bins catch it', async () => {
    const caught = (await runText(sceneOf(rayleigh, cubes, 1e5), { estimator: 'exit' })).spectra[0]
    const { total } = (await runText(sceneOf(rayleigh, cubes, 2e4))).spectra[0]
    for (const [k, flux] of caught.total.entries()) {
      // Exit bins count one direction in fifty. Pulls of 16 groups lie beyond 4.5 by chance in less than 1 of 2000 comparisons.
      expect(caught.sigma[k]).toBeLessThan(0.05 * flux)
      expect(Math.abs(flux - total[k])).toBeLessThan(4.5 * caught.sigma[k] + 0.005 * total[k])
    }
  })
})
