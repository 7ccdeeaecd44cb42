import { createHash } from 'node:crypto'
import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { parseScene, readScene } from '../../src/scene/read.js'
import type { StarSpec } from '../../src/scene/types.js'
import { folderWith } from '../support/folder-with.js'
import { example, exampleWith } from './example.js'

const AU = 1.495978707e13 // IAU 2012 Resolution B2
const ARCSEC = Math.PI / 648000
const LSUN = 3.828e33 // IAU 2015 Resolution B3
const SIGMA = 5.670374419e-5 // CODATA 2018, erg/s/cm2/K4

const starOf = (text: string): StarSpec => parseScene(text, 'scene.yaml').sources[0] as StarSpec

describe('parseScene', () => {
  test('a whole scene in cgs, defaults filled in', () => {
    const { locate, sources, spectra, cameras, dust, ...rest } = parseScene(example, 'scene.yaml')
    expect(rest).toEqual({
      file: 'scene.yaml',
      inputs: [{ file: 'scene.yaml', sha256: createHash('sha256').update(example).digest('hex') }],
      title: 'Wind of a cool giant',
      distance: expect.closeTo(320 * 3.085677581491367e18, -8),
      sky: { raDeg: 84.21, decDeg: -31.7 },
      seed: 'winter-1',
      opacities: {
        soot: {
          law: 'power',
          reference: { wavelength: expect.closeTo(0.13, 14), absorption: 2.3 },
          slope: 1.5,
          scattering: { albedo: 0.5, asymmetry: 0.3 },
          phase: 'henyey-greenstein'
        }
      },
      grid: { kind: 'auto', radial: 0, polar: 0, azimuthal: 0, width: 0, finest: 12, cellsAtMost: 300_000 },
      effort: { precision: 0.01, equilibrium: 4e6, cameras: 1e6, equilibriumAsked: false }
    })
    expect(sources[0]).toMatchObject({ kind: 'star', at: [0, 0, 0], extent: 'point', limbDarkening: 0 })
    expect(dust).toEqual([
      {
        name: 'wind',
        opacity: 'soot',
        shape: { kind: 'shell', inner: 6 * AU, outer: 3000 * AU, slope: -2 },
        amount: { kind: 'optical-depth', opticalDepth: 1.5, at: expect.closeTo(5.5e-5, 15) },
        temperature: 'solve'
      }
    ])
    expect(cameras[0].view).toEqual({ inclination: expect.closeTo((35 * Math.PI) / 180, 15), azimuth: 0, roll: 0 })
    expect(cameras[0].field).toEqual([12 * ARCSEC, 12 * ARCSEC])
    expect(cameras[0].pixels).toEqual([256, 256])
    expect(spectra[0]).toMatchObject({ aperture: 6 * ARCSEC, unit: 'Jy', view: { azimuth: 0, roll: 0 } })
    const { wavelengths } = spectra[0]
    expect([wavelengths.length, wavelengths[0], wavelengths[89]]).toEqual([90, 0.2 * 1e-4, 2 * 0.1])
    expect(wavelengths[45] / wavelengths[44]).toBeCloseTo(1e4 ** (1 / 89), 12)
    expect(locate(['cameras', 0, 'pixels'])).toEqual({ file: 'scene.yaml', line: 24, column: 5 })
    expect(locate(['dust', 0, 'shape', 'outer']).line).toBe(18)
    expect(locate(['dust', 0, 'shape', 'taper', 'at'])).toEqual({ file: 'scene.yaml', line: 18, column: 5 })
    expect(locate(['grid'])).toEqual({ file: 'scene.yaml', line: 1, column: 1 })
  })

  test('the smallest scene', () => {
    const scene = parseScene(
      `distance: 1 kpc
sources: [{name: s, temperature: 5772 K, radius: 1 Rsun}]
cameras: [{name: c, field: 1 mas, wavelengths: [1 um]}]
spectra: [{name: f, wavelengths: [1 um]}]`,
      'some/folder/plain.yaml'
    )
    expect(scene).toMatchObject({ title: 'plain', seed: '1', opacities: {}, dust: [] })
    expect(scene.cameras[0]).toMatchObject({ pixels: [128, 128], unit: 'MJy/sr', view: { inclination: 0, azimuth: 0, roll: 0 } })
    expect(scene.spectra[0].aperture).toBe(Number.POSITIVE_INFINITY)
  })

  test('any two of temperature, luminosity and radius give the third', () => {
    const solve = (keys: string) => starOf(exampleWith(['    temperature: 2800 K\n    luminosity: 6000 Lsun\n', keys]))
    const given = solve('    temperature: 2800 K\n    luminosity: 6000 Lsun\n')
    // Stefan-Boltzmann law, L = 4 pi R^2 sigma T^4.
    expect(given.radius! / Math.sqrt((6000 * LSUN) / (4 * Math.PI * SIGMA * 2800 ** 4))).toBeCloseTo(1, 9)
    const fromRadius = solve(`    temperature: 2800 K\n    radius: ${given.radius} cm\n`)
    expect(fromRadius.luminosity / given.luminosity).toBeCloseTo(1, 13)
    const cool = solve(`    luminosity: 6000 Lsun\n    radius: ${given.radius} cm\n`)
    expect(cool.temperature).toBeCloseTo(2800, 9)
  })

  test('fields as lengths and rectangles; pixels follow the shape of the field', () => {
    const camera = (field: string, pixels: string) =>
      parseScene(exampleWith(['field: 12 arcsec', `field: ${field}`], ['pixels: 256', `pixels: ${pixels}`]), 's.yaml').cameras[0]
    // By the definition of the parsec 1 au at 1 pc is 1 arcsec: 4000 au at 320 pc are 12.5 arcsec.
    expect(camera('4000 au', '10').field[0] / ARCSEC).toBeCloseTo(12.5, 12)
    expect(camera('[12 arcsec, 4 arcsec]', '30').pixels).toEqual([30, 10])
    expect(camera('[12 arcsec, 4 arcsec]', '[30, 7]').pixels).toEqual([30, 7])
    expect(camera('[4000 au, 6 arcsec]', '100').pixels).toEqual([100, 48])
  })

  test('every form that a value may take', () => {
    const scene = parseScene(
      exampleWith(
        [
          'seed: winter-1',
          'seed: 17\neffort: {precision: none, equilibrium: 2e5, cameras: 1e3}\ngrid: {kind: spherical, radial: 50}'
        ],
        ['slope: -2}', 'slope: -2.5}\n    temperature: 40 K'],
        ['outer: 3000 au', 'outer: {times-inner: 10}'],
        ['albedo: 0.5', 'albedo: 50 %'],
        ['[0.55 um, 2.2 um, 870 um]', '[870 um, 230 GHz, 0.55 \u00b5m]'],
        ['unit: Jy', 'unit: W/m2/\u00b5m']
      ),
      's.yaml'
    )
    expect(scene.seed).toBe('17')
    expect(scene.effort).toEqual({ precision: null, equilibrium: 2e5, cameras: 1e3, equilibriumAsked: true })
    expect(scene.grid).toMatchObject({ kind: 'spherical', radial: 50, polar: 0, azimuthal: 0 })
    expect(scene.dust[0]).toMatchObject({ temperature: 40, shape: { outer: 60 * AU, slope: -2.5 } })
    expect(scene.opacities.soot).toMatchObject({ scattering: { albedo: 0.5 } })
    expect(scene.cameras[0].wavelengths).toEqual([0.55e-4, 870e-4, 2.99792458e10 / 230e9].map((w) => expect.closeTo(w, 14)))
    expect(scene.spectra[0].unit).toBe('W/m2/um')
  })

  test('disk, ball and every amount', () => {
    const dust = (shape: string, amount: string) =>
      parseScene(
        exampleWith(
          ['{kind: shell, inner: 6 au, outer: 3000 au, slope: -2}', shape],
          ['{optical-depth: 1.5, at: 0.55 um}', amount]
        ),
        's.yaml'
      ).dust[0]
    const disk =
      '{kind: disk, inner: 1 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.25}, taper: {at: 80 au}}'
    expect(dust(disk, '{mass: 1e3 kg}')).toMatchObject({
      shape: {
        kind: 'disk',
        inner: AU,
        outer: 100 * AU,
        surfaceSlope: -1,
        scaleHeight: { value: 10 * AU, at: 100 * AU, flaring: 1.25 },
        taper: 80 * AU
      },
      amount: { kind: 'mass', mass: 1e6 }
    })
    expect(dust('{kind: ball, radius: 2 au, at: [0 au, 0 au, 0 km]}', '{density: 1e-15 kg/m3, at: 1 au}')).toMatchObject({
      shape: { kind: 'ball', radius: 2 * AU },
      amount: { kind: 'density', density: 1e-18, at: AU }
    })
  })

  test('aliases and anchors of YAML', () => {
    const text = exampleWith(
      ['view: {inclination: 35 deg, azimuth', 'view: &v {inclination: 35 deg, azimuth'],
      ['view: {inclination: 35 deg}', 'view: *v']
    )
    const scene = parseScene(text, 's.yaml')
    expect(scene.spectra[0].view).toEqual(scene.cameras[0].view)
    expect(scene.locate(['spectra', 0, 'view', 'roll']).line).toBe(22)
  })
})

describe('readScene', () => {
  test('reads a file; the seed can be overridden', () => {
    const file = join(folderWith(), 'giant.yaml')
    writeFileSync(file, example)
    expect(readScene(file)).toMatchObject({ file, seed: 'winter-1' })
    expect(readScene(file, { seed: '007' }).seed).toBe('007')
  })
})
