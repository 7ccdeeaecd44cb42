import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import type { Scene } from '../../src/scene/types.js'
import { sceneYaml } from '../../src/scene/write.js'
import { folderWith } from '../support/folder-with.js'
import { example, exampleWith } from './example.js'

function expectRoundTrip(scene: Scene): void {
  const again = parseScene(sceneYaml(scene), scene.file)
  // The text itself, hence its fingerprint, is another one; the data files are the same.
  const [, ...data] = scene.inputs
  expect(again.inputs.slice(1)).toStrictEqual(data)
  expect({ ...again, locate: undefined, inputs: undefined }).toStrictEqual({ ...scene, locate: undefined, inputs: undefined })
}

describe('sceneYaml', () => {
  test('speaks the language of the user, defaults filled in', () => {
    const text = sceneYaml(parseScene(example, 's.yaml'))
    for (const line of [
      'distance: 320 pc',
      'sky: {ra: 84.21 deg, dec: -31.7 deg}',
      '    temperature: 2800 K',
      '    luminosity: 6000 Lsun',
      '    at: [0 au, 0 au, 0 au]',
      '    extent: point',
      '    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}',
      '    phase: henyey-greenstein',
      '    shape: {kind: shell, inner: 6 au, outer: 3000 au, slope: -2}',
      '    amount: {optical-depth: 1.5, at: 0.55 um}',
      '    temperature: solve',
      'grid: {kind: auto}',
      'effort: {precision: 0.01, cameras: 1000000}',
      '    field: [12 arcsec, 12 arcsec]',
      '    wavelengths: [0.55 um, 2.2 um, 870 um]',
      '    wavelengths: {from: 0.2 um, to: 2 mm, count: 90}'
    ])
      expect(text.split('\n')).toContain(line)
  })

  test('is read back as an equal scene', () => {
    expectRoundTrip(parseScene(example, 's.yaml'))
    expectRoundTrip(
      parseScene(
        exampleWith(
          ['seed: winter-1', 'seed: "007"'],
          ['title: Wind of a cool giant', 'title: "yes: #1 \\"x\\" \\n 1e3"'],
          ['    luminosity: 6000 Lsun', '    radius: 317.3 Rsun\n    extent: sphere\n    limb-darkening: 0.3'],
          ['slope: 1.5\n    scattering: {albedo: 0.5', 'slope: 1.7\n    scattering: {slope: 4, albedo: 0.5'],
          ['{optical-depth: 1.5, at: 0.55 um}', '{density: 3.7e-17 g/cm3, at: 11.3 au}\n    temperature: 41.7 K'],
          [
            'cameras:\n',
            'grid: {kind: spherical, radial: 200, polar: 80}\neffort: {precision: none, equilibrium: 12345}\ncameras:\n'
          ],
          ['field: 12 arcsec', 'field: [4321 au, 7 arcsec]'],
          ['aperture: 6 arcsec', 'aperture: all']
        ),
        's.yaml'
      )
    )
  })

  test('with data files and a disk, from another folder', () => {
    const folder = folderWith()
    writeFileSync(join(folder, 'grey.csv'), 'wavelength [um],absorption [cm2/g],scattering [cm2/g]\n1,2,0\n2,1,0\n')
    writeFileSync(join(folder, 'star.csv'), 'wavelength [um],flux-lambda [W/m2/um]\n1,2\n2,1\n')
    const power = /law: power[\s\S]*asymmetry: 0.3}/.exec(example)![0]
    const scene = parseScene(
      exampleWith(
        [power, 'law: table\n    file: grey.csv'],
        ['temperature: 2800 K', 'temperature: 2800 K\n    spectrum: {table: star.csv}'],
        [
          'kind: shell, inner: 6 au, outer: 3000 au, slope: -2',
          'kind: disk, inner: 0.07 au, outer: {times-inner: 1234.5}, scale-height: {value: 9.9 au, at: 101 au, flaring: 1.2}, taper: {at: 83 au}'
        ]
      ),
      join(folder, 's.yaml')
    )
    expect(sceneYaml(scene)).toContain(`file: ${join(folder, 'grey.csv')}`)
    expectRoundTrip(scene)
  })

  test('any numbers', () => {
    const number = fc.double({ min: 0.01, max: 1000, noNaN: true })
    const pair = fc.constantFrom(['temperature', 'K'], ['luminosity', 'Lsun'], ['radius', 'Rsun'])
    fc.assert(
      fc.property(
        fc.tuple(number, number, number, number, number, number),
        fc.uniqueArray(pair, { minLength: 2, maxLength: 2, selector: ([key]) => key }),
        ([a, b, c, d, e, f], [first, second]) => {
          const star = `${first[0]}: ${a} ${first[1]}\n    ${second[0]}: ${b} ${second[1]}`
          expectRoundTrip(
            parseScene(
              exampleWith(
                ['temperature: 2800 K\n    luminosity: 6000 Lsun', star],
                ['320 pc', `${c} kpc`],
                ['84.21 deg', `${d / 3} deg`],
                ['1.3 mm', `${e} um`],
                ['inner: 6 au, outer: 3000 au', `inner: ${f} Rsun, outer: {times-inner: ${1 + e}}`],
                ['35 deg, azimuth: 0 deg', `${d / 6} deg, azimuth: ${c} arcmin`],
                ['field: 12 arcsec', `field: ${b} au`],
                ['from: 0.2 um, to: 2 mm', `from: ${a} GHz, to: ${1000 + b} um`]
              ),
              's.yaml'
            )
          )
        }
      ),
      { seed: 5, numRuns: 60 }
    )
  })
})
