import { describe, expect, test } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import { sceneYaml } from '../../src/scene/write.js'
import { exampleWith, problemsOf } from './example.js'

const edges = 'inner: 6 au, outer: 3000 au'
const giant = '- name: giant\n    temperature: 2800 K\n    luminosity: 6000 Lsun'

describe('an inner radius to be found', () => {
  test.each([
    ['inner: {temperature: 1500 K}, outer: 3000 au', { temperature: 1500 }, 3000 * 1.495978707e13],
    ['inner: {temperature: 800 K}, outer: {times-inner: 1000}', { temperature: 800, timesInner: 1000 }, Number.NaN]
  ])('%s', (written, sought, outer) => {
    const scene = parseScene(exampleWith([edges, written]), 's.yaml')
    expect(scene.dust[0].shape).toMatchObject({ inner: Number.NaN, outer, sought })
    expect(sceneYaml(scene)).toContain('timesInner' in sought ? '{times-inner: 1000}' : '{temperature: 1500 K}')
    expect(parseScene(sceneYaml(scene), 's.yaml').dust).toEqual(scene.dust)
  })

  test.each([
    [
      'dust that does not emit',
      [['{optical-depth: 1.5, at: 0.55 um}', '{mass: 1 Mearth}\n    temperature: none']],
      /`temperature: solve`/
    ],
    ['dust of a fixed temperature', [['{optical-depth: 1.5, at: 0.55 um}', '{mass: 1 Mearth}\n    temperature: 40 K']], /solve/],
    ['no star', [[giant, '- name: sky\n    kind: ambient\n    spectrum: interstellar']], /about a star/]
  ] as [string, [string, string][], RegExp][])('makes no sense with %s', (_, changes, message) => {
    const problems = problemsOf(exampleWith([edges, 'inner: {temperature: 900 K}, outer: 3000 au'], ...changes))
    expect(problems.map(({ key }) => key)).toEqual(['dust.0.shape.inner'])
    expect(problems[0].message).toMatch(message)
    expect(problems[0].location.line).toBeGreaterThan(10)
  })
})

describe('sublimation', () => {
  const amount = '{optical-depth: 1.5, at: 0.55 um}'

  test('is read and written', () => {
    const scene = parseScene(exampleWith([amount, `${amount}\n    sublimation: 1500 K`]), 's.yaml')
    expect(scene.dust[0].sublimation).toBe(1500)
    expect(parseScene(sceneYaml(scene), 's.yaml').dust).toEqual(scene.dust)
  })

  test.each([
    [
      'dust of a fixed temperature',
      [[amount, `${amount}\n    temperature: 40 K\n    sublimation: 1500 K`]],
      /`temperature: solve`/
    ],
    [
      'an inner radius that is sought',
      [
        [amount, `${amount}\n    sublimation: 1500 K`],
        [edges, 'inner: {temperature: 900 K}, outer: 3000 au']
      ],
      /in a circle/
    ],
    ['a length', [[amount, `${amount}\n    sublimation: 15 au`]], /unit of length/]
  ] as [string, [string, string][], RegExp][])('makes no sense with %s', (_, changes, message) => {
    const problems = problemsOf(exampleWith(...changes))
    expect(problems.map(({ key }) => key)).toEqual(['dust.0.sublimation'])
    expect(problems[0].message).toMatch(message)
  })
})
