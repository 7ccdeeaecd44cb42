import { describe, expect, it } from 'vitest'
import { rowOf } from '../../src/dust/emission.js'
import { stream } from '../../src/math/random.js'
import { buildModel } from '../../src/model/build-model.js'
import { parseScene } from '../../src/scene/read.js'
import { givenTemperatures } from '../../src/solve/dust-temperatures.js'
import { equilibriumSetup } from '../../src/solve/equilibrium-medium.js'
import { fillThick } from '../../src/solve/fill-thick.js'
import { GROUPS } from '../../src/solve/groups.js'
import { firstGuess, temperaturesFrom } from '../../src/solve/temperatures.js'
import { ThickCells } from '../../src/solve/thick-cells.js'
import { WalkWriter } from '../../src/solve/walk-levels.js'
import { propagateEnergy } from '../../src/transport/equilibrium.js'

const disk = `
distance: 100 pc
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.5}}
dust:
  - name: disk
    opacity: grains
    shape: {kind: disk, inner: 5 au, outer: 60 au, scale-height: {value: 8 au, at: 100 au, flaring: 1.2}}
    amount: {optical-depth: 1e5, at: 1 um}
grid: {kind: spherical, radial: 60, polar: 60, azimuthal: 1}
effort: {equilibrium: 1e4}
`

/** Temperatures after `rounds` of packets; by plain steps, or with the modified random walk. */
function solve(walks: boolean, packets: number[], from?: Float64Array) {
  const model = buildModel(parseScene(disk, 'disk.yaml'))
  const setup = equilibriumSetup(model)
  const thick = new ThickCells(model, setup)
  const walk = new WalkWriter(setup, thick)
  const { medium, tables } = setup
  let temperature = from ?? firstGuess(model, setup)
  let dust = givenTemperatures(model)
  packets.forEach((count, round) => {
    medium.emissionRow.set(temperature.map((kelvin) => (kelvin > 0 ? rowOf(tables[0], kelvin) : 0)))
    if (walks) walk.update(temperature)
    const absorbed = Array.from(
      { length: GROUPS },
      (_, group) => propagateEnergy(medium, count / GROUPS, stream(`${walks}/${round}/${group}`)).absorbed
    )
    dust = temperaturesFrom(model, setup, thick, absorbed, count)
    temperature = dust.temperature
  })
  return { model, setup, thick, dust }
}

/** Deviations in order. */
const sorted = (values: number[]) => values.sort((a, b) => Math.abs(a) - Math.abs(b))

describe('a disk of midplane optical depth 1e5', () => {
  const walk = solve(true, [16_000, 32_000, 64_000, 512_000])
  const { temperature, sigma } = walk.dust
  const deep = Array.from(temperature.keys()).filter(
    (cell) => temperature[cell] > 0 && walk.thick.halfDepth(cell, temperature[cell]) > 3
  )

  // 4.5 sigma of 30 degrees of freedom: 1 chance in 10 000 for each of 50 cells.
  it('has with the modified random walk the temperatures of plain steps', () => {
    const plain = solve(false, [384_000], temperature).dust
    const known = deep.filter((cell) => plain.sigma[cell] < 0.02 * plain.temperature[cell])
    expect(known.length).toBeGreaterThan(15)
    for (const cell of known) {
      const error = Math.hypot(plain.sigma[cell], sigma[cell])
      const difference = Math.abs(temperature[cell] - plain.temperature[cell])
      expect(difference, `cell ${cell}`).toBeLessThan(0.02 * plain.temperature[cell] + 4.5 * error)
    }
    const deviations = sorted(known.map((cell) => temperature[cell] / plain.temperature[cell] - 1))
    expect(Math.abs(deviations[deviations.length >> 1])).toBeLessThan(0.02)
  })

  // Diffusion alone; the packets' own error there is 1 to 4 %.
  it('gets back by diffusion the temperatures that are taken away from its deep cells', () => {
    const filled = { ...walk.dust, temperature: temperature.slice(), sigma: sigma.slice() }
    for (const cell of deep) {
      filled.temperature[cell] *= 1.5
      filled.sigma[cell] = Number.NaN
    }
    fillThick(walk.setup, walk.model, walk.thick, filled)
    const deviations = sorted(deep.map((cell) => filled.temperature[cell] / temperature[cell] - 1))
    expect(deviations.length).toBeGreaterThan(30)
    expect(Math.abs(deviations[deviations.length >> 1])).toBeLessThan(0.02)
    expect(Math.abs(deviations[deviations.length - 1])).toBeLessThan(0.12)
  })
})
