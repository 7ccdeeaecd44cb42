import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { SceneError } from '../../src/scene/error.js'
import { readScene } from '../../src/scene/read.js'
import { folderWith } from '../support/folder-with.js'
import { example, exampleWith, problemsOf } from './example.js'

const shell = '{kind: shell, inner: 6 au, outer: 3000 au, slope: -2}'
const amount = '{optical-depth: 1.5, at: 0.55 um}'

/** What is changed in the example, where the problem must be, at which key, and what its message must say. */
const wrong: [string, [string, string], [line: number, column: number], string, RegExp][] = [
  ['no unit', ['320 pc', '320'], [2, 1], 'distance', /number with its unit.*units: au,.* pc, kpc/],
  ['wrong dimension', ['2800 K', '2800 au'], [7, 5], 'sources.0.temperature', /`au` is a unit of length; accepted: a temp/],
  ['unknown unit', ['2800 K', '2800 Q'], [7, 5], 'sources.0.temperature', /`Q` is not a unit known here/],
  ['unknown key', ['luminosity:', 'luminosty:'], [8, 5], 'sources.0.luminosty', /unknown key; did you mean `luminosity`\?/],
  ['unknown key of the file', ['seed:', 'sead:'], [4, 1], 'sead', /did you mean `seed`\?/],
  ['two amounts', [amount, '{mass: 1 Msun, optical-depth: 1, at: 1 um}'], [19, 5], 'dust.0.amount', /exactly one of/],
  ['no amount', [amount, '{}'], [19, 5], 'dust.0.amount', /exactly one of/],
  ['amount without `at`', [amount, '{optical-depth: 1.5}'], [19, 5], 'dust.0.amount', /exactly one of/],
  ['unknown key of an amount', [amount, '{mass: 1 Msun, foo: 2}'], [19, 28], 'dust.0.amount.foo', /unknown key/],
  ['inner beyond outer', ['inner: 6 au', 'inner: 6000 au'], [18, 26], 'dust.0.shape.inner', /less than `outer`/],
  ['inner equal to outer', ['inner: 6 au', 'inner: 3000 au'], [18, 26], 'dust.0.shape.inner', /less than `outer`/],
  ['outer no times inner', ['outer: 3000 au', 'outer: {times-inner: 1}'], [18, 47], 'dust.0.shape.outer.times-inner', /above 1/],
  ['missing key', ['inner: 6 au, ', ''], [18, 5], 'dust.0.shape.inner', /the key is missing; a length/],
  ['negative length', ['6 au', '-6 au'], [18, 26], 'dust.0.shape.inner', /greater than 0/],
  ['negative opacity', ['2.3 cm2/g', '-2.3 cm2/g'], [12, 37], 'opacities.soot.reference.absorption', /greater than 0/],
  ['negative optical depth', ['optical-depth: 1.5', 'optical-depth: -1.5'], [19, 14], 'dust.0.amount.optical-depth', /above 0/],
  ['a million pixels', ['pixels: 256', 'pixels: 1000000'], [24, 5], 'cameras.0.pixels', /from 1 to 16384/],
  ['many pixels in all', ['pixels: 256', 'pixels: 16384'], [24, 5], 'cameras.0.pixels', /16384 x 16384 pixels x 3 wavelengths/],
  ['tall field', ['field: 12 arcsec', 'field: [1 mas, 12 arcsec]'], [24, 5], 'cameras.0.pixels', /3072000 pixels high/],
  ['no pixels', ['pixels: 256', 'pixels: 0'], [24, 5], 'cameras.0.pixels', /whole number/],
  ['half a pixel', ['pixels: 256', 'pixels: 10.5'], [24, 5], 'cameras.0.pixels', /whole number/],
  ['not finite', ['slope: 1.5', 'slope: .nan'], [13, 5], 'opacities.soot.slope', /a number from -20 to 20/],
  ['infinite', ['slope: 1.5', 'slope: .inf'], [13, 5], 'opacities.soot.slope', /a number from -20 to 20/],
  ['absurd', ['320 pc', '1e200 pc'], [2, 1], 'distance', /absurd/],
  ['overflow', ['320 pc', '1e999 pc'], [2, 1], 'distance', /absurd/],
  ['number with a unit', ['slope: 1.5', 'slope: 1.5 cm'], [13, 5], 'opacities.soot.slope', /without a unit/],
  ['albedo of 1', ['albedo: 0.5', 'albedo: 1'], [14, 18], 'opacities.soot.scattering.albedo', /from 0 and below 1/],
  ['bad name', ['name: face', 'name: ../face'], [21, 5], 'cameras.0.name', /letters, digits/],
  ['name of a number', ['name: face', 'name: 12'], [21, 5], 'cameras.0.name', /text is expected/],
  ['opacity that does not exist', ['opacity: soot', 'opacity: sooth'], [17, 5], 'dust.0.opacity', /did you mean `soot`\?/],
  ['opacity of an object', ['opacity: soot', 'opacity: constructor'], [17, 5], 'dust.0.opacity', /there are: soot/],
  ['unknown law', ['law: power', 'law: powr'], [11, 5], 'opacities.soot.law', /did you mean `power`\?.*table, grains/],
  [
    'unknown kind of shape',
    ['kind: shell', 'kind: sphere'],
    [18, 13],
    'dust.0.shape.kind',
    /accepted: shell, disk, ring, infall, ball, slab, field/
  ],
  ['unknown kind of source', ['- name: giant', '- name: giant\n    kind: stra'], [7, 5], 'sources.0.kind', /`star`/],
  ['no shape', [shell, 'round'], [18, 5], 'dust.0.shape', /a section with keys/],
  [
    'three of a star',
    ['- name: giant', '- name: giant\n    radius: 1 Rsun'],
    [6, 5],
    'sources.0',
    /exactly two of.*luminosity, radius/
  ],
  ['one of a star', ['    luminosity: 6000 Lsun\n', ''], [6, 5], 'sources.0', /exactly two of/],
  ['Jy/beam', ['MJy/sr', 'Jy/beam'], [26, 5], 'cameras.0.unit', /no beam.*MJy\/sr/],
  ['flux unit for a camera', ['MJy/sr', 'Jy'], [26, 5], 'cameras.0.unit', /not a unit accepted here/],
  ['unit in other case', ['MJy/sr', 'mjy/sr'], [26, 5], 'cameras.0.unit', /did you mean `MJy\/sr`\?/],
  ['no wavelength', ['[0.55 um, 2.2 um, 870 um]', '[]'], [25, 5], 'cameras.0.wavelengths', /at least 1/],
  ['same wavelength', ['2.2 um, 870', '870 um, 870'], [25, 5], 'cameras.0.wavelengths', /given twice/],
  ['bad wavelength of a list', ['2.2 um', '2.2 K'], [25, 28], 'cameras.0.wavelengths.1', /unit of temperature/],
  ['range of one', ['count: 90', 'count: 1'], [31, 43], 'spectra.0.wavelengths.count', /from 2 to/],
  ['aperture in words', ['aperture: 6 arcsec', 'aperture: everything'], [30, 5], 'spectra.0.aperture', /`all`, or a radius/],
  ['field of many degrees', ['field: 12 arcsec', 'field: 100 deg'], [23, 5], 'cameras.0.field', /wider than 90 deg/],
  [
    'inclination',
    ['inclination: 35 deg, ', 'inclination: 200 deg, '],
    [22, 12],
    'cameras.0.view.inclination',
    /0 deg to 180 deg/
  ],
  ['declination', ['-31.7 deg', '-91.7 deg'], [3, 22], 'sky.dec', /-90 deg to 90 deg/],
  ['nothing in a section', ['sky: {ra: 84.21 deg, dec: -31.7 deg}', 'sky:'], [3, 1], 'sky', /a section with keys/],
  [
    'missing file',
    [
      'law: power\n    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}\n    slope: 1.5\n    scattering: {albedo: 0.5, asymmetry: 0.3}',
      'law: table\n    file: nowhere.csv'
    ],
    [12, 5],
    'opacities.soot.file',
    /nowhere\.csv does not exist/
  ]
]

describe('wrong input', () => {
  test.each(wrong)('%s', (_, change, [line, column], key, message) => {
    const problems = problemsOf(exampleWith(change))
    expect(problems).toHaveLength(1)
    expect(problems[0]).toMatchObject({ location: { file: 'scene.yaml', line, column }, key })
    expect(problems[0].message).toMatch(message)
  })

  test('the message names place, key, value and what is accepted, in one line each', () => {
    const error = new SceneError(problemsOf(exampleWith(['320 pc', '320'], ['pixels: 256', 'pixels: 1000000'])))
    expect(error.message.split('\n')).toEqual([
      expect.stringMatching(/^scene\.yaml:2:1: distance = 320: a number with its unit is expected; accepted: a length/),
      'scene.yaml:24:5: cameras.0.pixels = 1000000: a whole number from 1 to 16384 is expected'
    ])
  })

  test('all problems are found at once, from top to bottom', () => {
    const problems = problemsOf(
      exampleWith(
        ['320 pc', '320'],
        ['luminosity', 'luminosty'],
        ['opacity: soot', 'opacity: sot'],
        ['inner: 6 au', 'inner: 6'],
        ['name: sed', 'name: s e d'],
        ['aperture', 'apperture']
      )
    )
    expect(problems.map(({ key }) => key)).toEqual([
      'distance',
      'sources.0.luminosty',
      'dust.0.opacity',
      'dust.0.shape.inner',
      'spectra.0.name',
      'spectra.0.apperture'
    ])
  })

  test.each(['sources', 'dust', 'cameras', 'spectra'])('names given twice in %s', (section) => {
    const entry = new RegExp(`^${section}:\n((?: .*\n)+)`, 'm').exec(example)![1]
    const problems = problemsOf(example.replace(entry, entry + entry.replace(/name: (.)/, (_, c) => `name: ${c.toUpperCase()}`)))
    expect(problems.map(({ key }) => key)).toEqual([`${section}.1.name`])
    expect(problems[0].message).toMatch(/used twice/)
  })

  test('names of dust that would name the same columns', () => {
    const entry = /^dust:\n((?: .*\n)+)/m.exec(example)![1].replace(/name: \w+/, 'name: far-out')
    const problems = problemsOf(example.replace(/^dust:\n(?: .*\n)+/m, `dust:\n${entry}${entry.replace('far-out', 'far_out')}`))
    expect(problems.map(({ key, message }) => [key, /and \. _ -/.test(message)])).toEqual([['dust.1.name', true]])
  })

  test('nothing that shines, nothing that is asked for', () => {
    const messages = problemsOf('distance: 1 pc').map(({ message }) => message)
    expect(messages).toEqual([expect.stringMatching(/nothing shines/), expect.stringMatching(/nothing is asked for/)])
  })
})

describe('files that are no scenes', () => {
  const bomb = `a: &a [x, x, x, x, x, x, x, x, x]\n${[...'bcdefghij']
    .map((letter, i) => `${letter}: &${letter} [${Array(9).fill(`*${'abcdefghi'[i]}`).join(', ')}]`)
    .join('\n')}`

  test.each([
    ['empty', '', /section with keys/],
    ['a list', '- a\n- b', /section with keys/],
    ['text', 'hello', /section with keys/],
    ['tabs', 'title: x\n\tdistance: 1 pc', /not sound YAML/],
    ['an open bracket', 'title: [x', /not sound YAML/],
    ['a key given twice', `${example}title: again`, /not sound YAML: Map keys must be unique/],
    ['two documents', `${example}---\n${example}`, /not sound YAML/],
    ['an unknown anchor', 'title: *nowhere', /not sound YAML/],
    ['aliases that multiply', bomb, /alias/i],
    ['deep nesting', '['.repeat(50000), /nested too deeply/],
    ['deep closed nesting', `title: ${'['.repeat(20000)}${']'.repeat(20000)}`, /nested too deeply/],
    ['a prototype', '__proto__: {a: 1}', /unknown key|nothing/]
  ])('%s', (_, text, message) => {
    const problems = problemsOf(text)
    expect(problems.map((problem) => problem.message).join('\n')).toMatch(message)
    for (const { location } of problems) expect(location.line).toBeGreaterThan(0)
  })

  test('files that cannot be read', () => {
    const folder = folderWith()
    const file = (name: string, content: string | Buffer) => {
      writeFileSync(join(folder, name), content)
      return join(folder, name)
    }
    const reading = (path: string) => () => readScene(path)
    expect(reading(join(folder, 'none.yaml'))).toThrow(/none\.yaml:1:1: the scene file does not exist/)
    expect(reading(folder)).toThrow(/is a folder/)
    expect(reading('/dev/null')).toThrow(/not a regular file/)
    expect(reading(file('binary.yaml', Buffer.from([0xff, 0xfe, 0x00, 0x01])))).toThrow(/not a text file in UTF-8/)
    expect(reading(file('nul.yaml', 'title: a\0b'))).toThrow(/not a text file/)
    expect(reading(file('large.yaml', '#'.repeat(1024 * 1024 + 1)))).toThrow(/1048577 bytes; at most 1048576/)
    for (const path of [join(folder, 'none.yaml'), folder]) expect(reading(path)).toThrow(SceneError)
  })
})
