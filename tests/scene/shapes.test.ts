import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import type { DensityCube, DensityPoints } from '../../src/scene/types.js'
import { sceneYaml } from '../../src/scene/write.js'
import { AU } from '../../src/units/constants.js'
import { folderWith } from '../support/folder-with.js'
import { astropy, itWith, runPython } from '../support/python.js'
import { exampleWith, problemsOf } from './example.js'

const shell = '{kind: shell, inner: 6 au, outer: 3000 au, slope: -2}'
const folder = folderWith()
const file = join(folder, 'scene.yaml')
const withShape = (shape: string) => exampleWith([shell, shape])
const dustOf = (shape: string) => parseScene(withShape(shape), file).dust[0]
const field = (name: string) => `{kind: field, file: ${name}, width: 40 au}`

describe('shapes of the vocabulary', () => {
  test.each([
    '{kind: ring, radius: 90 au, width: 6 au, scale-height: 4 au, eccentricity: 0.2, periapsis: 30 deg, tilt: {angle: 30 deg, toward: 40 deg}}',
    '{kind: infall, inner: 1 au, outer: {times-inner: 500}, centrifugal-radius: 60 au, tilt: {angle: 0.1 rad}}',
    '{kind: ball, radius: 3 au, at: [1 au, -2 au, 0.1 pc]}',
    '{kind: slab, thickness: 3 au, width: 90 au, at: [0 au, 0 au, 7 au]}',
    `${shell}\n    carve: [{gap: {from: 20 au, to: 30 au, remaining: 1 %}}, {cavity: {half-angle: 25 deg, remaining: 0}}]`,
    `${shell}\n    clumps: {count: 400, radius: 12 au, contrast: 10, seed: 007}`,
    '{kind: disk, inner: 1 au, outer: 9 au, scale-height: {value: 1 au, at: 10 au, flaring: 1}, tilt: {angle: -20 deg}}'
  ])('%s is read, and written so that it reads the same', (shape) => {
    const scene = parseScene(withShape(shape), file)
    const again = parseScene(sceneYaml(scene), file)
    expect(again.dust).toStrictEqual(scene.dust)
  })

  test('defaults are filled in', () => {
    expect(dustOf('{kind: ring, radius: 1 au, width: 1 au, scale-height: 1 au}').shape).toStrictEqual({
      kind: 'ring',
      radius: AU,
      width: AU,
      scaleHeight: AU,
      eccentricity: 0,
      periapsis: 0
    })
    expect(dustOf('{kind: slab, thickness: 1 au, width: 1 au}').shape).toMatchObject({ at: [0, 0, 0] })
    expect(dustOf(`${shell}\n    clumps: {count: 4, radius: 1 au, contrast: 2}`).clumps?.seed).toBe('1')
  })

  test.each([
    ['{kind: ring, radius: 9 au, width: 1 au}', 'dust.0.shape.scale-height', /missing/],
    ['{kind: ring, radius: 9 au, width: 1 au, scale-height: 1 au, eccentricity: 1}', 'dust.0.shape.eccentricity', /below 1/],
    ['{kind: infall, inner: 9 au, outer: 1 au, centrifugal-radius: 4 au}', 'dust.0.shape.inner', /less than `outer`/],
    ['{kind: slab, thickness: 1 au, width: 9 au, at: [1 au, 2 au]}', 'dust.0.shape.at', /three lengths/],
    ['{kind: ball, radius: 1 au, tilt: {toward: 40 deg}}', 'dust.0.shape.tilt.angle', /missing/],
    [`${shell}\n    carve: [{cavity: {half-angle: 90 deg, remaining: 0}}]`, 'dust.0.carve.0.cavity.half-angle', /below 90 deg/],
    [`${shell}\n    carve: [{hole: {}}]`, 'dust.0.carve.0', /is expected/],
    [`${shell}\n    clumps: {count: 4, radius: 1 au, contrast: 0.5}`, 'dust.0.clumps.contrast', /from 1/],
    [field('nowhere.fits'), 'dust.0.shape.file', /does not exist/]
  ] as [string, string, RegExp][])('%s is refused at its key', (shape, key, message) => {
    const [problem] = problemsOf(withShape(shape), file)
    expect(problem).toMatchObject({ key })
    expect(problem.location.line).toBeGreaterThan(17)
    expect(problem.message).toMatch(message)
  })
})

describe('fields from files', () => {
  itWith(astropy, 'are read from FITS cubes written by astropy.io.fits', () => {
    runPython(`
import numpy as np
from astropy.io import fits
cube = np.arange(24.0).reshape(4, 3, 2)
fits.PrimaryHDU(cube.astype('f4')).writeto('${folder}/f4.fits')
fits.PrimaryHDU(cube[np.newaxis]).writeto('${folder}/f8.fits')
scaled = fits.PrimaryHDU((2*cube).astype('i2'))
scaled.header['BSCALE'], scaled.header['BZERO'] = 0.5, 0.0
scaled.writeto('${folder}/i2.fits')
fits.HDUList([fits.PrimaryHDU(), fits.BinTableHDU.from_columns([fits.Column('a', 'D', array=np.zeros(999))]), fits.ImageHDU(cube.astype('i4'))]).writeto('${folder}/later.fits')
cube[1, 2, 0] = -1
fits.PrimaryHDU(cube).writeto('${folder}/negative.fits')
cube[1, 2, 0] = np.nan
fits.PrimaryHDU(cube).writeto('${folder}/nan.fits')
fits.PrimaryHDU(cube[0]).writeto('${folder}/flat.fits')
`)
    for (const name of ['f4.fits', 'f8.fits', 'i2.fits', 'later.fits']) {
      const { shape } = dustOf(field(name))
      const data = (shape as { data: DensityCube }).data
      expect(data.size).toEqual([2, 3, 4])
      expect([...data.values]).toEqual(Array.from({ length: 24 }, (_, i) => i))
    }
    const scene = parseScene(withShape(field('f4.fits')), file)
    expect(scene.inputs.map((input) => input.file)).toEqual([file, join(folder, 'f4.fits')])
    expect(parseScene(sceneYaml(scene), file).dust).toStrictEqual(scene.dust)
    for (const [name, message] of [
      ['negative.fits', /pixel \(1, 3, 2\) is -1; densities from 0 up/],
      ['nan.fits', /pixel \(1, 3, 2\) is NaN/],
      ['flat.fits', /no image of three axes/],
      ['scene.txt', /not FITS/]
    ] as [string, RegExp][]) {
      writeFileSync(join(folder, 'scene.txt'), 'hello, this is text')
      const [problem] = problemsOf(withShape(field(name)), file)
      expect(problem.location.file).toBe(join(folder, name))
      expect(problem.message).toMatch(message)
    }
  })

  test('are read from tables of points', () => {
    writeFileSync(join(folder, 'points.csv'), 'x [au],y [au],z [au],mass,smoothing-length [Rsun]\n1,2,3,5,1\n0,-2,0,1,10\n')
    writeFileSync(join(folder, 'even.csv'), 'x [au],y [au],z [au],smoothing-length [au]\n1,2,3,5\n0,-2,0,1\n')
    writeFileSync(join(folder, 'wrong.csv'), 'x [au],y [au],z [K],mass,smoothing-length [au]\n1,2,3,5,1\n0,-2,0,0,10\n')
    const data = (name: string) => (dustOf(field(name)).shape as { data: DensityPoints }).data
    expect(Array.from(data('points.csv').y)).toEqual([2 * AU, -2 * AU])
    expect(Array.from(data('points.csv').mass)).toEqual([5, 1])
    expect(Array.from(data('even.csv').mass)).toEqual([1, 1])
    const problems = problemsOf(withShape(field('wrong.csv')), file)
    expect(problems.map(({ location, message }) => [location.line, message.split(';')[0]])).toEqual([
      [1, 'the unit is not accepted here'],
      [3, 'a mass above 0 is expected']
    ])
  })
})
