import { describe, expect, it } from 'vitest'
import { plane } from './pictures.js'
import { runText } from './run-text.js'

const component = (name: string, depth: number) => `  - name: ${name}
    opacity: grains
    shape: {kind: shell, inner: 5 au, outer: 80 au}
    amount: {optical-depth: ${depth}, at: 1 um}`

const sceneOf = (dust: string) => `
distance: 60 pc
sources: [{name: star, temperature: 4000 K, luminosity: 20 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.3}}
dust:
${dust}
effort: {precision: none, equilibrium: 1e5, cameras: 3e4}
cameras:
  - {name: c, field: 160 au, pixels: 16, wavelengths: [1 um, 30 um]}
`

describe('two identical components with half of the dust each', () => {
  it('are the same as one with all of it: temperatures and images', async () => {
    const one = await runText(sceneOf(component('all', 2)))
    const two = await runText(sceneOf(`${component('half', 1)}\n${component('rest', 1)}`))
    const { cells } = one.model
    let square = 0
    let count = 0
    for (let i = 0; i < cells; i++) {
      if (!(one.model.components[0].density[i] > 0)) continue
      for (const at of [i, cells + i]) {
        const variance = one.dust.sigma[i] ** 2 + two.dust.sigma[at] ** 2
        square += (one.dust.temperature[i] - two.dust.temperature[at]) ** 2 / variance
        count++
        expect(Math.abs(one.dust.temperature[i] / two.dust.temperature[at] - 1)).toBeLessThan(0.01)
      }
    }
    // Neighbours share packets, so the pulls are strongly correlated: only gross disagreement shows here.
    expect(square / count).toBeLessThan(3)
    for (const k of [0, 1]) {
      const [a, b] = [one, two].map(({ images }) => plane(images[0], 'total', k))
      const [sa, sb] = [one, two].map(({ images }) => plane(images[0], 'sigma', k))
      a.forEach((value, i) => {
        expect(Math.abs(value - b[i]), `pixel ${i}`).toBeLessThanOrEqual(5 * Math.hypot(sa[i], sb[i]) + 1e-3 * value)
      })
    }
  })
})
