import { describe, expect, it } from 'vitest'
import { runText } from './run-text.js'

const shell = 'shape: {kind: shell, inner: 2 au, outer: 60 au}'
const disk = 'shape: {kind: disk, inner: 2 au, outer: 60 au, scale-height: {value: 5 au, at: 60 au, flaring: 1.2}}'

const sceneOf = (extent: string, warm: string, cold: string, packets: string) => `
distance: 100 pc
sources: [{name: star, temperature: 4000 K, luminosity: 50 Lsun, extent: ${extent}}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.4, asymmetry: 0.3}}
dust:
  - {name: main, opacity: grains, ${warm}, amount: {optical-depth: 8, at: 1 um}}
${cold}
effort: {${packets}}
`

/** What the stars and the dust of fixed temperature emit leaves, returns to a star or stays in dust that does not answer. */
describe('energy balance', () => {
  it.each([
    ['shell', sceneOf('point', shell, '', 'precision: none, equilibrium: 3e4')],
    ['shell and a star that is a sphere', sceneOf('sphere', shell, '', 'precision: none, equilibrium: 3e4')],
    ['disk', sceneOf('sphere', disk, '', 'precision: none, equilibrium: 3e4')],
    [
      'disk in a shell of fixed temperature',
      sceneOf(
        'point',
        disk,
        `  - {name: cool, opacity: grains, ${shell}, amount: {optical-depth: 1, at: 1 um}, temperature: 90 K}`,
        'precision: none, equilibrium: 3e4'
      )
    ],
    ['shell with a budget of packets that no batch divides', sceneOf('point', shell, '', 'precision: 0.01 %, equilibrium: 1003')]
  ])('closes to rounding: %s', async (_, text) => {
    const { equilibrium } = await runText(text)
    const { emitted, escaped, returned, kept } = equilibrium!.budget
    expect(Math.abs((escaped + returned + kept) / emitted - 1)).toBeLessThan(1e-11)
    expect(escaped).toBeGreaterThan(0)
  })
})
