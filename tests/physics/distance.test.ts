import { expect, it } from 'vitest'
import { runText } from './run-text.js'

const sceneAt = (distance: string) => `
distance: ${distance}
sources: [{name: star, temperature: 4000 K, luminosity: 20 Lsun, extent: sphere}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.3}}
dust:
  - name: shell
    opacity: grains
    shape: {kind: shell, inner: 5 au, outer: 80 au}
    amount: {optical-depth: 1, at: 1 um}
effort: {precision: none, equilibrium: 2e4, cameras: 1e4}
cameras:
  - {name: c, field: 160 au, pixels: 24, wavelengths: [1 um, 30 um]}
spectra:
  - {name: s, wavelengths: [1 um, 30 um]}
  - {name: part, aperture: 30 au, wavelengths: [1 um, 30 um]}
`

// In empty space I_nu is constant along a ray and flux goes as 1 / d^2 (textbook).
it('distance leaves the intensity of an image as it is and changes fluxes by its inverse square', async () => {
  const near = await runText(sceneAt('60 pc'))
  const far = await runText(sceneAt('480 pc'))
  near.images[0].total.forEach((value, i) => {
    expect(Math.abs(far.images[0].total[i] - value)).toBeLessThanOrEqual(1e-9 * value)
  })
  near.spectra.forEach(({ total }, n) => {
    total.forEach((value, k) => {
      expect(value / far.spectra[n].total[k]).toBeCloseTo(64, 7)
    })
  })
})
