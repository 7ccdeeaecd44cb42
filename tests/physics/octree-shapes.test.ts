import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { type Cells, isOctree } from '../../src/grid/cells.js'
import { cellCube, type Octree } from '../../src/grid/octree/octree.js'
import { buildModel } from '../../src/model/build-model.js'
import { runScene } from '../../src/run/run-scene.js'
import { parseScene, readScene } from '../../src/scene/read.js'
import { AU } from '../../src/units/constants.js'
import { folderWith } from '../support/folder-with.js'
import { sumOf } from './pictures.js'

const sceneOf = (dust: string, grid: string, temperature = '100 K') => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 10 Lsun}]
opacities: {soot: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.4}}}
dust: [{name: dust, opacity: soot, temperature: ${temperature}, ${dust}}]
grid: ${grid}
effort: {precision: none, equilibrium: 2e4, cameras: 1e4}
cameras: [{name: c, view: {inclination: 50 deg, azimuth: 30 deg}, field: 260 au, pixels: 26, wavelengths: [100 um]}]
spectra: [{name: s, view: {inclination: 50 deg, azimuth: 30 deg}, wavelengths: [1 um, 100 um]}]
`
const cubes = (cells: string) => `{kind: octree, cells-at-most: ${cells}}`

const points = `x [au],y [au],z [au],smoothing-length [au],mass
${[...Array(40).keys()].map((i) => `${60 * Math.cos(2.4 * i)},${60 * Math.sin(2.4 * i)},${i - 20},${8 + (i % 5)},${1 + (i % 3)}`).join('\n')}
`
const folder = folderWith({ 'points.csv': points })
const run = (text: string) =>
  runScene(parseScene(text, `${folder}/scene.yaml`), { workers: 2, estimator: 'emissivity', onProgress: () => {} })

describe('shapes in cubes', () => {
  it('shine as in cells symmetric about z: rotating infall with a cavity', async () => {
    const dust =
      'shape: {kind: infall, inner: 5 au, outer: 100 au, centrifugal-radius: 30 au}, amount: {mass: 1e-7 Msun}, carve: [{cavity: {half-angle: 25 deg, remaining: 0}}]'
    const [round, cubic] = [await run(sceneOf(dust, '{kind: spherical}')), await run(sceneOf(dust, cubes('2e4')))]
    expect([round.model.dimensions, cubic.model.dimensions]).toEqual([2, 3])
    const [expected] = round.spectra
    const [seen] = cubic.spectra
    expect(Math.abs(seen.scattered[0] / expected.scattered[0] - 1)).toBeLessThan(0.01)
    expect(Math.abs(seen.emitted[1] / expected.emitted[1] - 1)).toBeLessThan(0.005)
  })

  it.each([
    [
      'eccentric ring, tilted',
      'shape: {kind: ring, radius: 70 au, width: 6 au, scale-height: 6 au, eccentricity: 0.2, periapsis: 40 deg, tilt: {angle: 30 deg}}, amount: {optical-depth: 0.5, at: 1 um}'
    ],
    ['points', 'shape: {kind: field, file: points.csv, width: 160 au}, amount: {mass: 1e-8 Msun}'],
    [
      'disk with a gap, tilted',
      'shape: {kind: disk, inner: 20 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}, tilt: {angle: 30 deg, toward: 180 deg}}, amount: {optical-depth: 5, at: 1 um}, carve: [{gap: {from: 40 au, to: 60 au, remaining: 0.01}}]'
    ]
  ])('without symmetry keep their mass, are warmed and seen whole: %s', async (_, dust) => {
    const { model, images, dust: warm, equilibrium } = await run(sceneOf(dust, cubes('8e3'), 'solve'))
    const [{ density, mass }] = model.components
    // Issue: 0.1 % of imported fields; densities are scaled where they come near.
    expect(model.warnings).toEqual([])
    expect(Math.abs(sumOf(density.map((rho, cell) => rho * model.volume[cell])) / mass - 1)).toBeLessThan(1e-3)
    const [{ column, camera, width, emitted, scattered }] = images
    const side = (camera.field[0] * model.scene.distance) / width
    expect(Math.abs((sumOf(column!.density) * side * side) / mass - 1)).toBeLessThan(5e-3)
    density.forEach((rho, cell) => {
      if (rho > 0) expect(warm.temperature[cell]).toBeGreaterThan(0)
    })
    const { emitted: out, escaped } = equilibrium!.budget
    expect(escaped / out).toBeCloseTo(1, 12)
    for (const light of [emitted, scattered]) expect(light.every((value) => value >= 0 && Number.isFinite(value))).toBe(true)
  })

  it('of a cube lie in its pixels or hold whole ones: the mean densities of the file', () => {
    const { model, values } = cloud()
    const [{ density, mass }] = model.components
    const octree = octreeOf(model.walls)
    expect(octree.side / AU).toBeCloseTo(20000, 6)
    const pixel = octree.side / 32
    const scale = mass / (sumOf(values) * pixel ** 3)
    const cube = new Float64Array(4)
    let differences = 0
    for (let cell = 0; cell < octree.cells; cell++) {
      const [x, y, z, length] = cellCube(octree, cell, cube)
      const count = Math.max(1, Math.round(length / pixel))
      const [i, j, k] = [x, y, z].map((middle) => Math.floor((middle - 0.5 * length) / pixel + 16 + 1e-6))
      let mean = 0
      for (let n = 0; n < count ** 3; n++) {
        const at = [i + (n % count), j + (Math.floor(n / count) % count), k + Math.floor(n / count ** 2)]
        mean += values[(at[2] * 32 + at[1]) * 32 + at[0]] / count ** 3
      }
      differences += Math.abs(density[cell] - scale * mean) * length ** 3
    }
    expect(differences / mass).toBeLessThan(1e-3)
  })
})

/** The model of the scene with an imported cube, and the values of that. */
function cloud() {
  const model = buildModel(readScene(fileURLToPath(new URL('../../scenes/imported-cloud.yaml', import.meta.url))))
  const { shape } = model.components[0].spec
  if (shape.kind !== 'field' || shape.data.kind !== 'cube') throw new TypeError('no cube')
  return { model, values: shape.data.values }
}

function octreeOf(cells: Cells): Octree {
  if (!isOctree(cells)) throw new TypeError('no octree')
  return cells
}
