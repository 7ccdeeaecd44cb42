import { describe, expect, it } from 'vitest'
import { fluxOf } from './pictures.js'
import { runText } from './run-text.js'

/** A disk whose sharp and hot inner rim, 0.3 au, is a tenth of a pixel, and whose layer is thin when seen from the side. */
const diskAt = (inclination: number, wavelengths: string) => `
distance: 140 pc
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 3000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.4}}
dust:
  - name: disk
    opacity: grains
    shape: {kind: disk, inner: 0.3 au, outer: 100 au, scale-height: {value: 8 au, at: 100 au, flaring: 1.2}}
    amount: {optical-depth: 300, at: 1 um}
effort: {precision: none, equilibrium: 1e5, cameras: 3e4}
cameras:
  - {name: c, view: {inclination: ${inclination} deg}, field: 260 au, pixels: 43, wavelengths: [${wavelengths}]}
spectra:
  - {name: s, view: {inclination: ${inclination} deg}, wavelengths: [${wavelengths}]}
`

describe('sum of an image', () => {
  // Both integrate the same emission, so they must agree better than photon noise: a law, with the accuracy that the project asks for.
  it.each([
    { inclination: 0, wavelengths: '4 um, 1 mm' },
    { inclination: 60, wavelengths: '1.6 um, 4 um' },
    { inclination: 90, wavelengths: '1.6 um, 1 mm' }
  ])('equals the flux of the spectrum within 0.2 %, disk at $inclination deg', async ({ inclination, wavelengths }) => {
    const { images, spectra } = await runText(diskAt(inclination, wavelengths))
    const { total, emitted, scattered } = spectra[0]
    total.forEach((flux, k) => {
      const wavelength = images[0].camera.wavelengths[k] * 1e4
      const dust = emitted[k] + scattered[k]
      const image = fluxOf(images[0], 'emitted', k) + fluxOf(images[0], 'scattered', k)
      expect(Math.abs(image / dust - 1), `dust alone at ${wavelength} um`).toBeLessThan(0.002)
      expect(Math.abs(fluxOf(images[0], 'total', k) / flux - 1), `${wavelength} um`).toBeLessThan(0.002)
    })
  })

  it('equals the flux of the spectrum within 0.2 %, envelope with a hollow much smaller than a pixel', async () => {
    const { images, spectra } = await runText(`
distance: 1 kpc
sources: [{name: star, temperature: 2500 K, luminosity: 1e4 Lsun}]
opacities:
  grains: {law: table, file: envelope-dust.csv, phase: isotropic}
dust:
  - name: envelope
    opacity: grains
    shape: {kind: shell, inner: 22 au, outer: {times-inner: 1000}}
    amount: {optical-depth: 3, at: 1 um}
effort: {precision: none, equilibrium: 1e5, cameras: 3e4}
cameras:
  - {name: c, field: 44100 au, pixels: 63, wavelengths: [0.8 um, 4 um, 100 um]}
spectra:
  - {name: s, wavelengths: [0.8 um, 4 um, 100 um]}
`)
    spectra[0].total.forEach((flux, k) => {
      expect(Math.abs(fluxOf(images[0], 'total', k) / flux - 1)).toBeLessThan(0.002)
    })
  })
})
