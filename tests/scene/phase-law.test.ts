import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it, test } from 'vitest'
import { SceneError } from '../../src/scene/error.js'
import { isPolarised } from '../../src/scene/is-polarised.js'
import { parseMatrixTable } from '../../src/scene/phase-law.js'
import { parseScene } from '../../src/scene/read.js'
import { sceneYaml } from '../../src/scene/write.js'
import { folderWith } from '../support/folder-with.js'
import { example, exampleWith, problemsOf } from './example.js'

const head = 'angle [deg],s11,s12,s33,s34'
const sound = [head, '0,2,0,2,0', '90,1,-0.9,0.1,0.2', '180,2,0,-2,0']
const phaseLine = (phase: string): [string, string] => ['asymmetry: 0.3}', `asymmetry: 0.3}\n    phase: ${phase}`]

/** The table with one line written otherwise. */
function withLine(line: number, text: string): string {
  return sound.map((given, i) => (i === line - 1 ? text : given)).join('\n')
}

function problemsIn(text: string) {
  try {
    parseMatrixTable(text, '/tmp/phase.csv', 'phase.csv')
  } catch (error) {
    if (error instanceof SceneError) return error.problems
    throw error
  }
  return []
}

describe('a table of a scattering law', () => {
  it('may hold a matrix, in any order of angles, or a phase function in any unit of angle', () => {
    const matrix = parseMatrixTable([head, ...sound.slice(1).reverse()].join('\n'), '/tmp/phase.csv', 'phase.csv')
    expect(Array.from(matrix.angles)).toEqual([0, Math.PI / 2, Math.PI])
    expect(Array.from(matrix.s12)).toEqual([0, -0.9, 0])
    const scalar = parseMatrixTable(`value,angle [rad]\n3,0\n2,1\n1,${Math.PI}`, '/tmp/phase.csv', 'phase.csv')
    expect(Array.from(scalar.s11)).toEqual([3, 2, 1])
    expect(Array.from(scalar.s33)).toEqual([0, 0, 0])
  })

  test.each([
    ['more than wholly polarised', withLine(3, '90,1,-1.1,0,0'), 3, 's12', /\|s12\| must not be greater than s11/],
    ['longer than the intensity', withLine(3, '90,1,-0.9,0.5,0'), 3, 's33', /s12\^2 \+ s33\^2 \+ s34\^2/],
    ['polarised straight on', withLine(2, '0,2,0.5,1,0'), 2, 's12', /0 at 0 and 180 deg/],
    ['negative', withLine(3, '90,-1,0,0,0'), 3, 's11', /negative/],
    ['a start late', withLine(2, '10,2,0,2,0'), 2, 'angle', /begin at 0 deg; the smallest is 10 deg/],
    ['an end early', withLine(4, '170,2,0,-2,0'), 4, 'angle', /reach 180 deg; the largest is 170 deg/],
    ['an angle beyond', withLine(4, '190,2,0,-2,0'), 4, 'angle', /0 to 180 deg/],
    ['an angle twice', withLine(3, '180,1,0,0,0'), 4, 'angle', /180 deg is given again/],
    ['all zero', 'angle [deg],value\n0,0\n180,0', 2, 's11', /every value is 0/],
    ['a column missing', 'angle [deg],s11,s12,s33\n0,1,0,1\n180,1,0,1', 1, 's34', /missing/],
    ['no unit of angle', 'angle,value\n0,1\n180,1', 1, 'angle', /unit is missing/]
  ] as const)('is refused with %s, at its line', (_, text, line, key, message) => {
    const found = problemsIn(text).find((problem) => problem.key === key)
    expect(found?.message).toMatch(message)
    expect(found?.location).toMatchObject({ file: 'phase.csv', line })
  })
})

describe('the phase of an opacity', () => {
  const folder = folderWith()
  writeFileSync(join(folder, 'phase.csv'), sound.join('\n'))
  const read = (phase: string) => parseScene(exampleWith(phaseLine(phase)), join(folder, 'scene.yaml'))

  test.each([
    ['henyey-greenstein', false],
    ['isotropic', false],
    ['rayleigh', true],
    ['{two-term: {first: 0.7, second: -0.3, share: 90 %}}', false],
    ['{table: phase.csv}', true]
  ])('%s is read, and written so that it is read again', (phase, polarised) => {
    const scene = read(phase)
    expect(isPolarised(scene)).toBe(polarised)
    const again = parseScene(sceneYaml(scene), join(folder, 'again.yaml'))
    expect(again.opacities.soot.phase).toEqual(scene.opacities.soot.phase)
  })

  it('names its file among the inputs', () => {
    expect(read('{table: phase.csv}').inputs.map(({ file }) => file)).toContain(join(folder, 'phase.csv'))
  })

  test.each([
    ['a word that is none', 'rayliegh', 'opacities.soot.phase', /accepted: isotropic, henyey-greenstein, rayleigh/],
    ['a share above 1', '{two-term: {first: 0.7, second: 0, share: 1.5}}', 'opacities.soot.phase.two-term.share', /to 1/],
    ['a term too sharp', '{two-term: {first: 1, second: 0, share: 0.5}}', 'opacities.soot.phase.two-term.first', /below 1/],
    ['a term missing', '{two-term: {first: 0.7, share: 0.5}}', 'opacities.soot.phase.two-term.second', /missing/],
    ['a typo', '{two-terms: {first: 0.7, second: 0, share: 0.5}}', 'opacities.soot.phase', /accepted: /],
    ['a file that is not there', '{table: nothing.csv}', 'opacities.soot.phase.table', /nothing.csv/]
  ])('is refused with %s', (_, phase, key, message) => {
    const found = problemsOf(exampleWith(phaseLine(phase)))
    expect(found.map((problem) => problem.key)).toContain(key)
    expect(found.find((problem) => problem.key === key)!.message).toMatch(message)
  })

  it('is the asymmetric law unless it is given', () => {
    expect(isPolarised(parseScene(example, join(folder, 'scene.yaml')))).toBe(false)
  })
})
