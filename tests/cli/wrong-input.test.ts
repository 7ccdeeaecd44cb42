import { mkdirSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, sceneText, sceneWith } from './motelight.js'

const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const table = 'law: table\n    file: soot.csv'

/** What is wrong, the scene, and how the first line of the message begins and goes on. */
const wrong: [string, string, RegExp][] = [
  ['no unit', sceneWith(['300 pc', '300']), /^scene\.yaml:2:1: distance = 300: .*unit/],
  ['wrong dimension', sceneWith(['3000 K', '3000 au']), /^scene\.yaml:6:5: sources\.0\.temperature = 3000 au: .*unit of length/],
  ['unknown key', sceneWith(['luminosity:', 'luminosty:']), /^scene\.yaml:7:5: sources\.0\.luminosty.*did you mean `luminosity`/],
  [
    'two amounts',
    sceneWith(['{optical-depth', '{mass: 1 Msun, optical-depth']),
    /^scene\.yaml:18:5: dust\.0\.amount.*exactly one of/
  ],
  [
    'inner beyond outer',
    sceneWith(['inner: 10 au', 'inner: 2000 au']),
    /^scene\.yaml:17:26: dust\.0\.shape\.inner = 2000 au: .*outer/
  ],
  [
    'missing file',
    sceneWith([power, 'law: table\n    file: nowhere.csv']),
    /^scene\.yaml:11:5: opacities\.soot\.file.*nowhere\.csv does not exist/
  ],
  ['a table with a missing column', sceneWith([power, table]), /^soot\.csv:1:1: .*scattering/],
  [
    'negative value',
    sceneWith(['5000 Lsun', '-5000 Lsun']),
    /^scene\.yaml:7:5: sources\.0\.luminosity = -5000 Lsun: .*greater than 0/
  ],
  ['a million pixels a side', sceneWith(['pixels: 8', 'pixels: 1000000']), /^scene\.yaml:24:5: cameras\.0\.pixels = 1000000: /],
  [
    'an amount that cannot be',
    sceneWith(
      ['at: 0.55 um}', 'at: 0.55 um}'],
      ['kind: shell, inner: 10 au, outer: 1000 au, slope: -2', 'kind: shell, inner: 0 au, outer: 1000 au, slope: -2']
    ),
    /^scene\.yaml:17:26: dust\.0\.shape\.inner/
  ]
]

describe('a wrong scene', () => {
  it.each(wrong)('%s: exit code 2, a located message, nothing written', async (_, text, message) => {
    const files = { 'scene.yaml': text, 'soot.csv': 'wavelength [um],absorption [cm2/g]\n1,100\n10,10\n' }
    const folder = folderWith(files)
    const { exitCode, stderr, stdout } = await motelight(folder, 'run', 'scene.yaml')
    expect(stderr).toMatch(message)
    expect(stderr).not.toMatch(/^\s+at /m)
    expect(stdout).toBe('')
    expect(exitCode).toBe(2)
    expect(filesIn(folder)).toEqual(Object.keys(files).sort())
  })

  it('tells every problem, one a line', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith(['300 pc', '300'], ['3000 K', '3000 au'], ['pixels: 8', 'pixels: 0']) })
    const { stderr, exitCode } = await motelight(folder, 'check', 'scene.yaml')
    expect(exitCode).toBe(2)
    expect(stderr.split('\n').map((line) => line.split(' ')[0])).toEqual([
      'scene.yaml:2:1:',
      'scene.yaml:6:5:',
      'scene.yaml:24:5:'
    ])
  })

  it('with --json: one document with every problem and its place', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith(['300 pc', '300'], ['pixels: 8', 'pixels: 0']) })
    const { exitCode, stdout, stderr } = await motelight(folder, 'run', 'scene.yaml', '--json')
    expect(exitCode).toBe(2)
    expect(stderr).toBe('')
    const { error } = JSON.parse(stdout)
    expect(error.kind).toBe('scene')
    expect(error.problems).toMatchObject([
      { location: { file: 'scene.yaml', line: 2, column: 1 }, key: 'distance', given: '300' },
      { location: { file: 'scene.yaml', line: 24, column: 5 }, key: 'cameras.0.pixels', given: '0' }
    ])
  })
})

describe('a wrong command line', () => {
  it.each([
    [[], /Which command/],
    [['fly'], /Unknown argument: fly/],
    [['run'], /scene file is missing/],
    [['run', 'scene.yaml', '--fast'], /Unknown argument: fast/],
    [['run', 'scene.yaml', '--workers', '0'], /whole number from 1/],
    [['check', 'scene.yaml', '--workers', 'many'], /whole number from 1/],
    [['run', 'scene.yaml', '--out'], /Not enough arguments following: out/],
    [['run', 'scene.yaml', '--estimator', 'guess'], /emissivity.*peel.*exit/],
    [['check', 'scene.yaml', '--out', 'x'], /Unknown argument: out/]
  ])('%j: exit code 2', async (words, message) => {
    const folder = folderWith({ 'scene.yaml': sceneText })
    const { exitCode, stdout, stderr } = await motelight(folder, ...words)
    expect(stderr).toMatch(message)
    expect(stderr).toContain('motelight --help')
    expect({ exitCode, stdout, files: filesIn(folder) }).toEqual({ exitCode: 2, stdout: '', files: ['scene.yaml'] })
  })
})

describe('a folder that cannot be used', () => {
  it('a file in the way', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText, out: 'a file' })
    const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml')
    expect(stderr).toMatch(/^cannot write out\/scene: a file is in the way/)
    expect(exitCode).toBe(2)
    expect(filesIn(folder)).toEqual(['out', 'scene.yaml'])
  })

  it('a place where no folder can be made', async () => {
    const { exitCode, stderr } = await motelight(folderWith({ 'scene.yaml': sceneText }), 'run', 'scene.yaml', '--out', '/proc/x')
    expect(stderr).toMatch(/^cannot write \/proc\/x: /)
    expect(exitCode).toBe(2)
  })

  it('one with other files, or with the scene itself, even with --force', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText, 'full/notes.txt': 'mine' })
    expect(await motelight(folder, 'run', 'scene.yaml', '--out', 'full')).toMatchObject({ exitCode: 2, stderr: /is not empty/ })
    expect(await motelight(folder, 'run', 'scene.yaml', '--out', '.', '--force')).toMatchObject({ exitCode: 2 })
    expect(filesIn(folder)).toEqual(['full/notes.txt', 'scene.yaml'])
  })

  it('leaves no empty folders behind', async () => {
    // The amount fits no density, which shows only when cells are filled, after the folder was made.
    const disk = '{kind: disk, inner: 10 au, outer: 1000 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.1}}'
    const text = sceneWith(
      ['{kind: shell, inner: 10 au, outer: 1000 au, slope: -2}', disk],
      ['{optical-depth: 1.5, at: 0.55 um}', '{density: 1e-18 g/cm3, at: 5 au}']
    )
    const folder = folderWith({ 'scene.yaml': text })
    mkdirSync(join(folder, 'kept'))
    const { exitCode, stderr } = await motelight(folder, 'run', 'scene.yaml', '--out', 'kept/a/b')
    expect(stderr).toMatch(/^scene\.yaml:18:\d+: dust\.0\.amount\.at: /)
    expect(exitCode).toBe(2)
    expect(readdirSync(join(folder, 'kept'))).toEqual([])
  })
})
