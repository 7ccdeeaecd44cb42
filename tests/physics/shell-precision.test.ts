import { describe, expect, it } from 'vitest'
import { runText } from './run-text.js'

const sceneOf = (depth: number) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 100 Lsun}]
opacities:
  grey: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 0, scattering: {albedo: 0.6, asymmetry: 0.5}}
dust:
  - name: shell
    opacity: grey
    shape: {kind: shell, inner: 10 au, outer: 100 au, slope: -2}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: none
effort: {precision: none, cameras: 1e6}
cameras:
  - {name: c, field: 200 au, pixels: 64, wavelengths: [1 um]}
`

/** What a million packets must reach in 64 x 64 pixels: a promise of this program. */
describe('noise of a scattering shell', () => {
  it.each([
    [0.1, 5e-4],
    [1, 2e-3],
    [10, 2.5e-2]
  ])('optical depth %d: median relative sigma below %d', async (depth, promise) => {
    const { precision, lightPackets } = await runText(sceneOf(depth))
    expect(Math.abs(lightPackets[0].packets / 1e6 - 1)).toBeLessThan(1e-3)
    expect(precision[0].photonNoise[0]).toBeLessThan(promise)
    expect(precision[0].photonNoise[0]).toBeGreaterThan(0)
    expect(precision[0].samplingError[0]).toBeLessThan(0.01)
  })
})
