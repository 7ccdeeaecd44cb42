import { describe, expect, it } from 'vitest'
import { coolingOf, rowOf } from '../../src/dust/emission.js'
import { stream } from '../../src/math/random.js'
import { standardError } from '../../src/math/stats.js'
import { buildModel } from '../../src/model/build-model.js'
import { parseScene } from '../../src/scene/read.js'
import { equilibriumSetup } from '../../src/solve/equilibrium-medium.js'
import { ThickCells } from '../../src/solve/thick-cells.js'
import { WalkWriter } from '../../src/solve/walk-levels.js'
import { propagateEnergy } from '../../src/transport/equilibrium.js'
import { LEVEL_SIZE } from '../../src/transport/random-walk.js'

/** A shell of coarse and thick cells in a blackbody field of 50 K; the absorption falls with the wavelength as its -slope power. */
const shell = (slope: number, depth: number) => `
distance: 100 pc
sources: [{name: sky, kind: ambient, spectrum: {blackbody: 50 K}}]
opacities:
  dust: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: ${slope}, scattering: {albedo: 0.2, asymmetry: 0.4}}
dust: [{name: shell, opacity: dust, shape: {kind: shell, inner: 80 au, outer: 100 au, slope: 0}, amount: {optical-depth: ${depth}, at: 100 um}}]
grid: {kind: spherical, radial: 6}
effort: {equilibrium: 1e4}
`

/** Grey dust, so that the temperature given does not matter. */
const ball = (albedo: number, asymmetry: number, depth: number) => `
distance: 100 pc
sources: [{name: star, temperature: 3000 K, luminosity: 10 Lsun}]
opacities:
  grey: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 0, scattering: {albedo: ${albedo}, asymmetry: ${asymmetry}}}
dust: [{name: ball, opacity: grey, shape: {kind: ball, radius: 10 au}, amount: {optical-depth: ${depth}, at: 1 um}}]
grid: {kind: spherical, radial: 6}
effort: {equilibrium: 1e4}
`

const BATCHES = 16

function absorbedBy(scene: string, walks: boolean, packets: number) {
  const model = buildModel(parseScene(scene, 'ball.yaml'))
  const setup = equilibriumSetup(model)
  const temperature = new Float64Array(model.cells).fill(100)
  setup.medium.emissionRow.fill(200)
  if (walks) new WalkWriter(setup, new ThickCells(model, setup)).update(temperature)
  const batches = Array.from({ length: BATCHES }, (_, batch) =>
    propagateEnergy(setup.medium, packets, stream(`${walks ? 'walk' : 'plain'}/${batch}`))
  )
  const interactions = batches.reduce((sum, batch) => sum + batch.interactions, 0)
  const cells = Array.from({ length: model.cells }, (_, cell) => {
    const values = batches.map(({ absorbed }) => absorbed[cell] / packets)
    return { mean: values.reduce((sum, value) => sum + value, 0) / BATCHES, error: standardError(values) }
  })
  return { cells, interactions, thick: setup.medium.walk.levels.filter((value) => value > 0).length }
}

describe('the modified random walk', () => {
  // Two per cent of the energy is half a per cent of the temperature; 4.5 sigma of 30 degrees of freedom: 1 chance in 10 000.
  it.each([
    [0, 0, 100],
    [0.5, 0.5, 140]
  ])('absorbs what plain steps absorb in a thick grey ball, albedo %f, asymmetry %f', (albedo, asymmetry, depth) => {
    const plain = absorbedBy(ball(albedo, asymmetry, depth), false, 60)
    const walk = absorbedBy(ball(albedo, asymmetry, depth), true, 1000)
    expect(walk.thick).toBeGreaterThan(2)
    expect(walk.interactions / (BATCHES * 1000)).toBeLessThan(0.25 * (plain.interactions / (BATCHES * 60)))
    walk.cells.forEach((cell, i) => {
      const other = plain.cells[i]
      expect(Math.abs(cell.mean - other.mean), `cell ${i}`).toBeLessThan(
        0.02 * other.mean + 4.5 * Math.hypot(cell.error, other.error)
      )
    })
  })

  // What comes in as from a blackbody leaves no energy behind and takes none (Kirchhoff's law), whatever the wavelengths at which it
  // walks. 1.2 % of the energy is 0.2 to 0.3 % of the temperature; 4 sigma of 15 degrees of freedom: 1 chance in 900 for each of 15 cells.
  it.each([
    [0, 30, 12_000],
    [1, 60, 18_000],
    [2, 100, 14_000]
  ])('keeps dust in a bath at its temperature, absorption ~ wavelength^-%d', (slope, depth, packets) => {
    const model = buildModel(parseScene(shell(slope, depth), 'shell.yaml'))
    const setup = equilibriumSetup(model)
    const [table] = setup.tables
    const { medium } = setup
    medium.emissionRow.fill(rowOf(table, 50))
    new WalkWriter(setup, new ThickCells(model, setup)).update(new Float64Array(model.cells).fill(50))
    const walked = Array.from({ length: model.cells }, (_, cell) => medium.walk.first[cell]).filter(
      (first) => medium.walk.levels[LEVEL_SIZE * first] > 0
    )
    expect(walked.length).toBeGreaterThan(1)
    const batches = Array.from(
      { length: BATCHES },
      (_, batch) => propagateEnergy(medium, packets, stream(`bath/${batch}`)).absorbed
    )
    for (let cell = 1; cell < model.cells; cell++) {
      const emitted = 4 * Math.PI * coolingOf(table, 50) * model.volume[cell]
      const excess = batches.map((absorbed) => (absorbed[cell] * setup.luminosity) / packets / emitted - 1)
      const error = standardError(excess)
      expect(error, `cell ${cell}`).toBeLessThan(0.025)
      expect(Math.abs(excess.reduce((sum, value) => sum + value, 0)) / BATCHES, `cell ${cell}`).toBeLessThan(0.012 + 4 * error)
    }
  })
})
