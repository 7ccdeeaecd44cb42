import { describe, expect, it } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import { sceneYaml } from '../../src/scene/write.js'
import { AU } from '../../src/units/constants.js'
import { exampleWith, problemsOf } from './example.js'

const far = 'view: {inclination: 35 deg, azimuth: 0 deg, roll: 0 deg}\n    field: 12 arcsec\n    pixels: 256'
const sceneWith = (view: string, more = '', ...others: [string, string][]) =>
  exampleWith([far, `view: ${view}\n    pixels: 256${more}`], ...others)

describe('cameras at places of a scene', () => {
  it('are perspective or of the whole sky, and are written as they were read', () => {
    const scenes = [
      sceneWith('{from: [10 au, -2 au, 3 au], toward: [1 au, 0 au, 0 au], field: [90 deg, 60 deg], roll: 10 deg}'),
      sceneWith('{from: [10 au, -2 au, 3 au], field: 90 deg}'),
      sceneWith('{from: [10 au, -2 au, 3 au], field: all-sky}')
    ].map((text) => parseScene(text, 's.yaml'))
    const [wide, square, map] = scenes.map(({ cameras }) => cameras[0])
    const from = [10 * AU, -2 * AU, 3 * AU]
    expect(wide.view).toEqual({ from, toward: [AU, 0, 0], roll: expect.closeTo(Math.PI / 18, 12), allSky: false })
    // tan 30 / tan 45 as high as wide.
    expect(wide.pixels).toEqual([256, 148])
    expect(square.field).toEqual([Math.PI / 2, Math.PI / 2])
    expect(map).toMatchObject({ view: { from, toward: [0, 0, 0], roll: 0, allSky: true }, pixels: [256, 128] })
    for (const scene of scenes) expect(parseScene(sceneYaml(scene), 's.yaml').cameras).toEqual(scene.cameras)
  })

  const from = 'from: [10 au, 0 au, 0 au]'
  it.each([
    ['no angle', sceneWith(`{${from}}`), 'cameras.0.view.field', /`90 deg`, \[width, height\], or `all-sky`/],
    ['too wide', sceneWith(`{${from}, field: 175 deg}`), 'cameras.0.view.field', /at most 170 deg/],
    ['no place', sceneWith('{toward: [0 au, 0 au, 0 au]}', '\n    field: 9 au'), 'cameras.0.view.toward', /give `from` too/],
    ['no field of a far camera', sceneWith('{}'), 'cameras.0.field', /the key is missing; the full width/],
    ['both fields', sceneWith(`{${from}, field: 90 deg}`, '\n    field: 9 au'), 'cameras.0.field', /`view.field` is the angle/],
    ['an inclination', sceneWith(`{${from}, field: 90 deg, inclination: 1 deg}`), 'cameras.0.view.inclination', /`toward` says/],
    ['a rolled map', sceneWith(`{${from}, field: all-sky, roll: 9 deg}`), 'cameras.0.view.roll', /\+z axis up/],
    [
      'nowhere to look',
      sceneWith('{from: [0 au, 0 au, 1 au], toward: [0 au, 0 au, 1 au], field: 9 deg}'),
      'cameras.0.view.toward',
      /stands at/
    ],
    ['no units', sceneWith('{from: [1, 0, 0], field: 9 deg}'), 'cameras.0.view.from.0', /number with its unit/],
    [
      'a flux a pixel',
      sceneWith(`{${from}, field: 9 deg}`, '', ['unit: MJy/sr', 'unit: Jy/pixel']),
      'cameras.0.unit',
      /differ in solid angle/
    ],
    ['a star', sceneWith('{from: [0 au, 0 au, 0 au], field: all-sky}'), 'cameras.0.view.from', /source giant is there/],
    [
      'a spectrum',
      exampleWith(['    view: {inclination: 35 deg}\n    aperture', `    view: {${from}}\n    aperture`]),
      'spectra.0.view.from',
      /unknown key; .*accepted here: inclination, azimuth, roll/
    ]
  ])('refuse what has no meaning: %s', (_, text, key, message) => {
    const [problem] = problemsOf(text)
    expect(problem.key).toBe(key)
    expect(problem.message).toMatch(message)
    expect(problem.location.line).toBeGreaterThan(19)
  })
})
