import { describe, expect, it } from 'vitest'
import { sphericalOf } from '../../src/grid/cells.js'
import { buildModel } from '../../src/model/build-model.js'
import { cellCentres, cellColumns, dustStructure } from '../../src/run/dust-cells.js'
import { parseScene } from '../../src/scene/read.js'
import { givenTemperatures } from '../../src/solve/dust-temperatures.js'
import { sceneText, sceneWith } from '../cli/motelight.js'

const modelOf = (text: string) =>
  buildModel(parseScene(text.replace('    shape:', '    temperature: 100 K\n    shape:'), 'scene.yaml'))
const disk = '{kind: disk, inner: 10 au, outer: 1000 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.1}}'
const inThree: [string, string][] = [
  ['{kind: shell, inner: 10 au, outer: 1000 au, slope: -2}', disk],
  ['radial: 20', 'radial: 12, polar: 8, azimuthal: 4']
]

describe('dust cells', () => {
  it('every centre lies in its cell, by the volume that it and the cell before it bound', () => {
    const model = modelOf(sceneWith(...inThree))
    const { volume, cells } = model
    const walls = sphericalOf(model.walls)
    const { r, theta, phi } = cellCentres(walls, cells)
    const interval = (edges: Float64Array, value: number) => edges.findLastIndex((edge) => edge <= value)
    expect([r[0], theta[0], phi[0]]).toEqual([walls.r[1] / 2, Math.PI / 2, Math.PI])
    const seen = new Set<string>()
    for (let cell = 1; cell < cells; cell++) {
      const [ir, ip] = [interval(walls.r, r[cell]), interval(walls.phi, phi[cell])]
      const it = interval(
        walls.cosTheta.map((value) => -value),
        -Math.cos(theta[cell])
      )
      seen.add(`${ir} ${it} ${ip}`)
      const bounded =
        ((walls.r[ir + 1] ** 3 - walls.r[ir] ** 3) / 3) *
        (walls.cosTheta[it] - walls.cosTheta[it + 1]) *
        (walls.phi[ip + 1] - walls.phi[ip])
      expect(volume[cell] / bounded).toBeCloseTo(1, 9)
    }
    expect(seen.size).toBe(cells - 1)
  })

  it('columns: positions in au and rad, then each component', () => {
    const model = modelOf(sceneText)
    const columns = cellColumns(model, givenTemperatures(model))
    expect(columns.map(({ name, unit }) => `${name} ${unit}`)).toEqual([
      'r AU',
      'theta rad',
      'phi rad',
      'volume cm3',
      'density_wind g cm-3',
      'temperature_wind K',
      'sigma_temperature_wind K'
    ])
    const { values } = columns[5]
    expect([values[0], values[1], values[19]]).toEqual([0, 100, 100])
  })

  it('the picture shows shells by radius, without an empty core', () => {
    const model = modelOf(sceneText)
    const structure = dustStructure(model, givenTemperatures(model))
    if (structure.kind !== 'radial') throw new Error('not radial')
    expect(structure.r).toHaveLength(19)
    expect(structure.components[0].density.every((value) => value > 0)).toBe(true)
    expect(structure.components[0].sigma).toBeUndefined()
  })

  it('the picture shows three dimensions as the mean over azimuth, mass and temperature kept', () => {
    const model = modelOf(sceneWith(...inThree))
    // Half of each ring at twice the density, and hotter there.
    const { density } = model.components[0]
    const dust = givenTemperatures(model)
    for (let cell = 1; cell < model.cells; cell++) {
      if ((cell - 1) % 4 > 1) continue
      density[cell] *= 2
      dust.temperature[cell] = density[cell] > 0 ? 400 : 0
    }
    const structure = dustStructure(model, dust)
    if (structure.kind !== 'map') throw new Error('not a map')
    const [{ density: mean, temperature }] = structure.components
    expect(mean).toHaveLength((model.cells - 1) / 4)
    mean.forEach((value, i) => {
      const ring = density.subarray(1 + 4 * i, 5 + 4 * i)
      expect(value).toBeCloseTo(ring.reduce((sum, part) => sum + part, 0) / 4, 30)
      // (2 x 400 K + 1 x 100 K) / 3, weighted by mass.
      if (value > 0) expect(temperature![i]).toBeCloseTo(300, 6)
    })
  })
})
