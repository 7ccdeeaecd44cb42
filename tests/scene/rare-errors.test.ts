import { describe, expect, test } from 'vitest'
import { exampleWith, problemsOf } from './example.js'

const power = `law: power
    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}
    slope: 1.5
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const shell = '{kind: shell, inner: 6 au, outer: 3000 au, slope: -2}'
const giant = '- name: giant\n    temperature: 2800 K\n    luminosity: 6000 Lsun'

describe('rarer vocabulary', () => {
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
  ] as [string, [string, string], string, RegExp][])('%s is refused where it stands', (_, change, key, message) => {
    const problems = problemsOf(exampleWith(change))
    const found = problems.find((problem) => problem.key === key)
    expect(found?.message).toMatch(message)
  })
})
