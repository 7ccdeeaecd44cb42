import { describe, expect, it } from 'vitest'
import { planckNu } from '../../src/dust/planck.js'
import { LIGHT_SPEED } from '../../src/units/constants.js'
import { plane } from './pictures.js'
import { runText } from './run-text.js'

const radius = 1e15
const temperature = 60
const wavelength = 1e-2
const planck = planckNu(LIGHT_SPEED / wavelength, temperature)

const sceneOf = (depth: number) => `
distance: 200 pc
opacities:
  grey: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: 0}
dust:
  - name: ball
    opacity: grey
    shape: {kind: ball, radius: ${radius} cm}
    amount: {optical-depth: ${depth}, at: 100 um}
    temperature: ${temperature} K
spectra:
  - {name: all, wavelengths: [100 um]}
cameras:
  - {name: strip, field: [${2.004 * radius} cm, ${0.004 * radius} cm], pixels: [501, 1], wavelengths: [100 um]}
`

/**
 * A sphere of dust at one temperature that does not scatter, x = 2 kappa R the optical depth of its diameter:
 * L / (4 pi2 R2 B) = 1 - (2 / x2) [1 - (1 + x) e^-x] and I(b) = B (1 - exp(-x sqrt(1 - b2 / R2))), textbook results that follow
 * from the formal solution; the first is Osterbrock's escape probability (Astrophysics of Gaseous Nebulae, appendix) times
 * 2 x / 3. Formula recalled from memory, its values computed apart from this program.
 */
const luminosities = [
  [0.1, 0.0642319679],
  [0.5, 0.2783679166],
  [1, 0.4715177647],
  [2, 0.7030029249],
  [5, 0.9232342146],
  [10, 0.980009988]
]

describe.each(luminosities)('isothermal sphere, diameter of optical depth %d', (x, luminosity) => {
  const share = 1e-3

  it('shines as the formula says', async () => {
    const { model, spectra, images } = await runText(sceneOf(x / 2))
    const flux = Math.PI * (radius / model.scene.distance) ** 2 * planck * luminosity
    expect(Math.abs(spectra[0].total[0] / flux - 1)).toBeLessThan(share)
    expect(spectra[0].sigma[0]).toBe(0)
    const row = plane(images[0], 'total')
    for (const b of [0, 0.2, 0.4, 0.6, 0.8, 0.9, 0.96]) {
      const expected = -planck * Math.expm1(-x * Math.sqrt(1 - b * b))
      expect(Math.abs(row[250 + Math.round(250 * b)] / expected - 1), `I at ${b} R`).toBeLessThan(share)
    }
  })
})
