import { describe, expect, it } from 'vitest'
import { AU } from '../../src/units/constants.js'
import { sumOf } from './pictures.js'
import { runText } from './run-text.js'

const scene = (dust: string, grid: string) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 10 Lsun, extent: sphere}]
opacities: {soot: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0}}}
dust: [{name: dust, opacity: soot, temperature: none, amount: {mass: 1e-6 Msun}, ${dust}}]
grid: ${grid}
effort: {precision: 1 %, equilibrium: 1000, cameras: 1000}
cameras: [{name: sky, view: {inclination: 40 deg, azimuth: 70 deg}, field: [240 au, 320 au], pixels: [36, 48], wavelengths: [1 um]}]
`

async function columnOf(dust: string, grid: string) {
  const { images, model } = await runText(scene(dust, grid))
  const [{ column, width, height, camera }] = images
  const side = (camera.field[0] * model.scene.distance) / width
  return { ...column!, width, height, side, mass: model.components[0].mass }
}

describe('column density', () => {
  it.each([
    ['shells', 'shape: {kind: ball, radius: 100 au}', '{kind: auto}'],
    ['cells symmetric about z', 'shape: {kind: ring, radius: 80 au, width: 5 au, scale-height: 5 au}', '{kind: auto}'],
    ['cubes', 'shape: {kind: slab, thickness: 30 au, width: 90 au, tilt: {angle: 30 deg}}', '{kind: octree, cells-at-most: 1e4}']
  ])('adds up to the mass of the dust, behind the star too, to the error of placing rays: %s', async (_, dust, grid) => {
    const { density, side, mass, samplingError } = await columnOf(dust, grid)
    // A tenth of the precision is aimed at.
    expect(samplingError).toBeLessThan(1.5e-3)
    expect(Math.abs((sumOf(density) * side * side) / mass - 1)).toBeLessThan(1e-3)
  })

  it('of a ball is 2 rho sqrt(R^2 - b^2), the mean over each pixel', async () => {
    const { density, side, mass, width, height } = await columnOf('shape: {kind: ball, radius: 100 au}', '{kind: auto}')
    const R = 100 * AU
    const rho = mass / ((4 / 3) * Math.PI * R ** 3)
    for (let i = 0; i < density.length; i++) {
      const x = ((i % width) + 0.5 - width / 2) * side
      const y = (Math.floor(i / width) + 0.5 - height / 2) * side
      const b2 = x * x + y * y
      if (b2 > (0.9 * R) ** 2) continue
      // Mean of the square root over a square to second order: + side^2/24 times its Laplacian.
      const root = Math.sqrt(R * R - b2)
      const mean = root - ((side * side) / 24) * (2 / root + b2 / root ** 3)
      expect(Math.abs(density[i] / (2 * rho * mean) - 1)).toBeLessThan(3e-3)
    }
  })
})
