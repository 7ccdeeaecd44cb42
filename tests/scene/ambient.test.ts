import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import { sceneYaml } from '../../src/scene/write.js'
import { folderWith } from '../support/folder-with.js'
import { exampleWith, problemsOf } from './example.js'

const giant = '- name: giant\n    temperature: 2800 K\n    luminosity: 6000 Lsun'
const sky = (spectrum: string, rest = '') =>
  exampleWith([giant, `- name: sky\n    kind: ambient\n    spectrum: ${spectrum}${rest}`])

describe('ambient fields', () => {
  test.each([
    ['interstellar', { kind: 'interstellar' }],
    ['{blackbody: 2.7255 K}', { kind: 'blackbodies', terms: [{ temperature: 2.7255, dilution: 1 }] }],
    [
      '[{blackbody: 4000 K, dilution: 1.65e-13}, {blackbody: 7500 K, dilution: 1e-14}]',
      {
        kind: 'blackbodies',
        terms: [
          { temperature: 4000, dilution: 1.65e-13 },
          { temperature: 7500, dilution: 1e-14 }
        ]
      }
    ]
  ])('%s is read, and written so that it is read again', (spectrum, expected) => {
    const scene = parseScene(sky(spectrum, '\n    strength: 3'), 's.yaml')
    expect(scene.sources).toEqual([{ name: 'sky', kind: 'ambient', spectrum: expected, strength: 3 }])
    expect(parseScene(sceneYaml(scene), 's.yaml').sources).toEqual(scene.sources)
  })

  test('a table gives an intensity', () => {
    const folder = folderWith()
    writeFileSync(join(folder, 'sky.csv'), 'wavelength [um],intensity-lambda [erg/s/cm2/um/sr]\n2,3\n1,5\n')
    const { sources, inputs } = parseScene(sky('{table: sky.csv}'), join(folder, 's.yaml'))
    // I_nu = I_lambda lambda^2 / c
    expect(sources[0]).toMatchObject({ spectrum: { kind: 'table', table: { wavelength: Float64Array.of(1e-4, 2e-4) } } })
    const { intensityNu } = (sources[0] as { spectrum: { table: { intensityNu: Float64Array } } }).spectrum.table
    expect(intensityNu[0] / ((5e4 * 1e-8) / 2.99792458e10)).toBeCloseTo(1, 12)
    expect(intensityNu[1] / ((3e4 * 4e-8) / 2.99792458e10)).toBeCloseTo(1, 12)
    expect(inputs).toHaveLength(2)
  })

  test.each([
    ['a temperature without a unit', '{blackbody: 3}', '', 'sources.0.spectrum.blackbody', /unit/],
    ['a negative dilution', '{blackbody: 3 K, dilution: -1e-14}', '', 'sources.0.spectrum.dilution', /above 0 to 1/],
    ['a dilution above one', '[{blackbody: 3 K, dilution: 2}]', '', 'sources.0.spectrum.0.dilution', /above 0 to 1/],
    ['no strength', 'interstellar', '\n    strength: 0', 'sources.0.strength', /above 0/],
    ['another name', 'galactic', '', 'sources.0.spectrum', /`interstellar`/],
    ['an empty list', '[]', '', 'sources.0.spectrum', /./],
    ['a place', 'interstellar', '\n    at: [1 au, 0 au, 0 au]', 'sources.0.at', /name, kind, spectrum, strength/]
  ])('%s is refused where it stands', (_, spectrum, rest, key, message) => {
    const problems = problemsOf(sky(spectrum, rest))
    expect(problems.map((problem) => problem.key)).toContain(key)
    const problem = problems.find((candidate) => candidate.key === key)!
    expect(problem.message).toMatch(message)
    expect(problem.location.line).toBeGreaterThanOrEqual(7)
  })
})
