import { expect, it } from 'vitest'
import { cellRadii } from '../../src/run/dust-cells.js'
import type { RunResult } from '../../src/run/run-scene.js'
import { AU } from '../../src/units/constants.js'
import { runText } from './run-text.js'

const scene = (grid: string) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 10 Lsun}]
opacities: {soot: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.4}}}
dust: [{name: shell, opacity: soot, shape: {kind: shell, inner: 10 au, outer: 100 au, slope: -1.5}, amount: {optical-depth: 1, at: 1 um}}]
grid: ${grid}
effort: {precision: none, equilibrium: 4e5, cameras: 4e4}
spectra: [{name: all, view: {inclination: 30 deg}, wavelengths: [1 um, 30 um]}]
`

/** Mean temperatures, by volume, between radii (au). */
function shellMeans(result: RunResult, radii: number[]): number[] {
  const { model, dust } = result
  const r = cellRadii(model)
  return radii.slice(1).map((to, k) => {
    let [sum, weights] = [0, 0]
    for (let cell = 0; cell < model.cells; cell++) {
      if (r[cell] < radii[k] * AU || r[cell] >= to * AU || !(dust.temperature[cell] > 0)) continue
      sum += model.volume[cell] * dust.temperature[cell]
      weights += model.volume[cell]
    }
    return sum / weights
  })
}

it('a shell in cubes has the temperatures and fluxes of the shell in spherical cells', async () => {
  const round = await runText(scene('{kind: spherical, radial: 80}'))
  const cubes = await runText(scene('{kind: octree, cells-at-most: 4e4}'))
  const radii = [20, 30, 45, 65, 90]
  const expected = shellMeans(round, radii)
  // Issue: 1 % where resolved. The mean of many cells has no noise to speak of.
  for (const [k, value] of shellMeans(cubes, radii).entries()) expect(Math.abs(value / expected[k] - 1)).toBeLessThan(0.01)
  const [all] = round.spectra
  const [seen] = cubes.spectra
  // Of the light of dust and of scattered light; the dust before the star is that of a few cells in the way.
  expect(Math.abs(seen.scattered[0] / all.scattered[0] - 1)).toBeLessThan(0.01)
  expect(Math.abs(seen.emitted[1] / all.emitted[1] - 1)).toBeLessThan(0.01)
})
