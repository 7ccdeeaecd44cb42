import { describe, expect, it } from 'vitest'
import { planckNu } from '../../src/dust/planck.js'
import { LIGHT_SPEED, SOLAR_LUMINOSITY, STEFAN_BOLTZMANN } from '../../src/units/constants.js'
import { fluxOf, plane } from './pictures.js'
import { runText } from './run-text.js'

const temperature = 3000
const wavelength = 2e-4
const radius = Math.sqrt((5000 * SOLAR_LUMINOSITY) / (4 * Math.PI * STEFAN_BOLTZMANN * temperature ** 4))
const planck = planckNu(LIGHT_SPEED / wavelength, temperature)

const starOf = (extent: string, darkening: number, distance = 50) => `
distance: ${distance} pc
sources:
  - {name: giant, temperature: ${temperature} K, luminosity: 5000 Lsun, extent: ${extent}, limb-darkening: ${darkening}}
cameras:
  - {name: disk, field: ${2.5 * radius} cm, pixels: 125, wavelengths: [2 um]}
spectra:
  - {name: all, wavelengths: [2 um]}
`

/** A uniform sphere of intensity I has the flux pi I (R / d)^2, and a limb-darkened one pi I(1) (1 - u / 3) (R / d)^2: textbook. */
describe('bare star', () => {
  it('that is uniform shows I = B everywhere inside its limb and F = pi B (R/d)^2', async () => {
    const { images, spectra, model } = await runText(starOf('sphere', 0))
    const flux = Math.PI * planck * (radius / model.scene.distance) ** 2
    expect(spectra[0].total[0] / flux).toBeCloseTo(1, 10)
    const total = plane(images[0], 'total')
    for (let y = 0; y < 125; y++) {
      for (let x = 0; x < 125; x++) {
        const b = Math.hypot(x - 62, y - 62) * 0.02
        if (b < 0.98) expect(total[y * 125 + x] / planck).toBeCloseTo(1, 10)
        if (b > 1.02) expect(total[y * 125 + x]).toBe(0)
      }
    }
    expect(Math.abs(fluxOf(images[0], 'total') / flux - 1)).toBeLessThan(1e-3)
  })

  it('keeps its flux whatever its limb darkening, and is darkened by the linear law', async () => {
    const u = 0.6
    const { images, spectra, model } = await runText(starOf('sphere', u))
    const flux = Math.PI * planck * (radius / model.scene.distance) ** 2
    expect(spectra[0].total[0] / flux).toBeCloseTo(1, 10)
    expect(Math.abs(fluxOf(images[0], 'total') / flux - 1)).toBeLessThan(1e-3)
    const row = plane(images[0], 'total').subarray(62 * 125, 63 * 125)
    for (const steps of [0, 10, 20, 30, 40, 45]) {
      const mu = Math.sqrt(1 - (0.02 * steps) ** 2)
      const expected = (planck / (1 - u / 3)) * (1 - u * (1 - mu))
      // The mean over a pixel differs from the value at its middle by second order in its width, 0.02 R.
      expect(Math.abs(row[62 + steps] / expected - 1), `mu ${mu}`).toBeLessThan(1e-3)
    }
  })

  it('that is a point puts its flux into one pixel', async () => {
    const { images, spectra, model } = await runText(starOf('point', 0))
    const flux = Math.PI * planck * (radius / model.scene.distance) ** 2
    expect(spectra[0].total[0] / flux).toBeCloseTo(1, 10)
    const total = plane(images[0], 'total')
    expect(total.filter((value) => value > 0).length).toBe(1)
    expect(total[62 * 125 + 62]).toBeGreaterThan(0)
    expect(fluxOf(images[0], 'total') / flux).toBeCloseTo(1, 10)
  })
})
