import { describe, expect, it } from 'vitest'
import { sphericalOf } from '../../src/grid/cells.js'
import { SphericalWalk } from '../../src/grid/walk.js'
import { sampleBin } from '../../src/math/cdf.js'
import { stream } from '../../src/math/random.js'
import { buildModel } from '../../src/model/build-model.js'
import { parseScene } from '../../src/scene/read.js'
import { equilibriumSetup } from '../../src/solve/equilibrium-medium.js'
import { meetDust } from '../../src/transport/central-launch.js'
import { SOLAR_LUMINOSITY } from '../../src/units/constants.js'

const sceneOf = (shape: string, depth: number) => `
distance: 100 pc
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities:
  black: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 0}
  blue: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 2}
dust:
  - {name: first, opacity: black, shape: ${shape}, amount: {optical-depth: ${depth}, at: 1 um}}
  - {name: second, opacity: blue, shape: ${shape}, amount: {optical-depth: ${0.1 * depth}, at: 1 um}}
effort: {equilibrium: 1e4}
grid: {kind: spherical, radial: 20${shape.includes('disk') ? ', polar: 16' : ''}}
`

const shell = '{kind: shell, inner: 10 au, outer: 100 au}'
const disk = '{kind: disk, inner: 10 au, outer: 100 au, scale-height: {value: 8 au, at: 100 au, flaring: 1.2}}'

function lit(shape: string, depth: number) {
  const model = buildModel(parseScene(sceneOf(shape, depth), 'scene.yaml'))
  const setup = equilibriumSetup(model)
  return { model, setup, central: setup.central! }
}

describe('starlight on its way out from the centre', () => {
  it('is dimmed by the law of Beer and Lambert', () => {
    const { model, setup, central } = lit(shell, 0.7)
    const { starlight, medium } = setup
    const { r } = sphericalOf(model.walls)
    const masses = model.components.map(({ density }) => density.reduce((sum, rho, i) => sum + rho * (r[i + 1] - r[i]), 0))
    const left = starlight.reduce((sum, power, k) => {
      const depth = masses.reduce((part, mass, c) => part + mass * medium.extinction[c * medium.bins + k], 0)
      return sum + power * Math.exp(-depth)
    }, 0)
    expect(central.escaped / left).toBeCloseTo(1, 9)
    expect((central.escaped + central.caught) / (2 * SOLAR_LUMINOSITY)).toBeCloseTo(1, 12)
  })

  it.each([
    ['a shell', shell, 3],
    ['a shell nearly transparent', shell, 1e-9],
    ['a disk', disk, 1e3]
  ])('heats with all that it loses: %s', (_, shape, depth) => {
    const { model, central } = lit(shape, depth)
    const heated = model.components.reduce(
      (sum, { density }, c) => sum + density.reduce((part, rho, i) => part + rho * central.heating[c * model.cells + i], 0),
      0
    )
    expect(heated / central.caught).toBeCloseTo(1, 10)
  })

  // Both components only absorb: packets must start where the dust is heated. Chi-squared of 200 cells at most; 1 chance in 1e6.
  it.each([
    ['a shell', shell, 3],
    ['a disk', disk, 1e3]
  ])('starts packets where it is lost: %s', (_, shape, depth) => {
    const { model, setup, central } = lit(shape, depth)
    const { cells, components } = model
    const walk = new SphericalWalk(sphericalOf(model.walls))
    const uniform = stream('start')
    const count = new Float64Array(cells)
    const packets = 50_000
    let astray = 0
    for (let n = 0; n < packets; n++) {
      const bin = sampleBin(central.source.bins, 0, uniform())
      meetDust(walk, setup.medium, central.source, bin, uniform)
      astray = Math.max(astray, walk.b2 / walk.s ** 2)
      count[walk.cell]++
    }
    expect(astray).toBeLessThan(1e-9)
    let square = 0
    let degrees = -1
    for (let i = 0; i < cells; i++) {
      const heated = components.reduce((sum, { density }, c) => sum + density[i] * central.heating[c * cells + i], 0)
      const expected = (packets * heated) / central.caught
      if (expected < 10) continue
      square += (count[i] - expected) ** 2 / expected
      degrees++
    }
    expect(degrees).toBeGreaterThan(10)
    expect(square).toBeLessThan(degrees + 4.8 * Math.sqrt(2 * degrees) + 2 * 4.8)
  })
})
