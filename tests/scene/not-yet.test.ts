import { describe, expect, test } from 'vitest'
import { exampleWith, problemsOf } from './example.js'

const power = `law: power
    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}
    slope: 1.5
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const shell = '{kind: shell, inner: 6 au, outer: 3000 au, slope: -2}'
const giant = '- name: giant\n    temperature: 2800 K\n    luminosity: 6000 Lsun'

/** Sound by the vocabulary, but not run yet: the change, the line and the key. */
const notYet: [string, [string, string], number, string][] = [
  ['star elsewhere', [giant, `${giant}\n    at: [1 au, 0 au, 0 au]`], 9, 'sources.0.at'],
  ['octree', ['seed: winter-1', 'grid: {kind: octree, width: 2000 au, finest: 9, cells-at-most: 2e6}'], 4, 'grid.kind']
]

describe('vocabulary that is not run yet', () => {
  test.each(notYet)('%s is refused at its line', (_, change, line, key) => {
    const problems = problemsOf(exampleWith(change))
    expect(problems).toHaveLength(1)
    expect(problems[0]).toMatchObject({ key, location: { line } })
    expect(problems[0].message).toMatch(/not available yet$/)
  })

  test.each([
    ['computed without grains', [power, `${power}\n    phase: computed`], 'opacities.soot.phase', /computed for grains/],
    ['an edge in K', ['inner: 6 au', 'inner: {temperature: 6 au}'], 'dust.0.shape.inner.temperature', /unit of length/],
    ['a typo in inner', ['inner: 6 au', 'inner: {temperatur: 6 K}'], 'dust.0.shape.inner.temperatur', /`temperature`/],
    [
      'a gap backwards',
      [shell, `${shell}\n    carve: [{gap: {from: 3 au, to: 2 au, remaining: 0}}]`],
      'dust.0.carve.0.gap.from',
      /`to`/
    ],
    ['a clump', [shell, `${shell}\n    clumps: {count: 1.5, radius: 1 au, contrast: 9}`], 'dust.0.clumps.count', /whole number/],
    ['a star at two lengths', [giant, `${giant}\n    at: [1 au, 0 au]`], 'sources.0.at', /three lengths/],
    ['an octree', ['seed: winter-1', 'grid: {kind: octree, finest: -1}'], 'grid.finest', /whole number/]
  ] as [string, [string, string], string, RegExp][])('%s in it is still an ordinary error', (_, change, key, message) => {
    const problems = problemsOf(exampleWith(change))
    const found = problems.find((problem) => problem.key === key)
    expect(found?.message).toMatch(message)
    for (const problem of problems) expect(problem.message).not.toMatch(/not available yet/)
  })
})
