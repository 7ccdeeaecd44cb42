import { describe, expect, it } from 'vitest'
import { radialTemperatures } from './pictures.js'
import { runText } from './run-text.js'

/** A shell that scatters much, with its temperatures, seen at two wavelengths. */
const sceneOf = (phase: string, asymmetry = 0) => `
distance: 100 pc
seed: laws
sources: [{name: star, temperature: 5000 K, luminosity: 100 Lsun}]
opacities:
  dust:
    law: power
    reference: {wavelength: 1 um, absorption: 1000 cm2/g}
    slope: 1
    scattering: {albedo: 0.8, asymmetry: ${asymmetry}}
    phase: ${phase}
dust:
  - {name: dust, opacity: dust, shape: {kind: shell, inner: 10 au, outer: 100 au}, amount: {optical-depth: 3, at: 1 um}}
grid: {kind: spherical, radial: 20}
effort: {precision: none, equilibrium: 6e4, cameras: 1e5}
spectra:
  - {name: all, wavelengths: [1 um, 20 um]}
`

/** Errors come from 16 groups: pulls beyond 4.5 come by chance in less than 1 of 2000 comparisons. */
const SIGMAS = 4.5

describe('scattering laws by tables', () => {
  it('of two equal Henyey-Greenstein terms are that law, in temperatures and light', async () => {
    const tables = await runText(sceneOf('{two-term: {first: 0.6, second: 0.6, share: 0.5}}', 0))
    const closed = await runText(sceneOf('henyey-greenstein', 0.6))
    const other = radialTemperatures(closed)
    radialTemperatures(tables).forEach(({ temperature, sigma }, i) => {
      const apart = Math.abs(temperature - other[i].temperature)
      expect(apart).toBeLessThan(SIGMAS * Math.hypot(sigma, other[i].sigma))
      expect(sigma).toBeLessThan(0.01 * temperature)
    })
    const [f, g] = [tables.spectra[0], closed.spectra[0]]
    for (const k of [0, 1]) {
      expect(Math.abs(f.scattered[k] - g.scattered[k])).toBeLessThan(SIGMAS * Math.hypot(f.sigma[k], g.sigma[k]))
    }
    // They are drawn in another way, so the bits differ.
    expect(tables.dust.temperature).not.toEqual(closed.dust.temperature)
    expect(f.stokes).toBeUndefined()
  })
})
