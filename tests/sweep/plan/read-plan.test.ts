import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { modelScene } from '../../../src/sweep/plan/model-scene.js'
import { readPlan } from '../../../src/sweep/plan/read-plan.js'
import { AU, PARSEC } from '../../../src/units/constants.js'
import { planned } from '../example.js'

const depth = 'dust.wind.amount.optical-depth'

describe('models of a plan', () => {
  it('grid: every combination, the last path first; scenes have the values', () => {
    const sweep = planned(`vary:
  ${depth}: {from: 0.1, to: 10, count: 3, spacing: log}
  sources.giant.temperature: [2600 K, 2900 K]
`)
    expect(sweep.design).toBe('grid')
    expect(sweep.parameters.map(({ name, unit, log }) => [name, unit, log])).toEqual([
      [depth, '', true],
      ['sources.giant.temperature', 'K', false]
    ])
    expect(sweep.models).toEqual([
      [0.1, 2600],
      [0.1, 2900],
      [1, 2600],
      [1, 2900],
      [10, 2600],
      [10, 2900]
    ])
    const scene = modelScene(sweep, 4)
    expect(scene.dust[0].amount).toMatchObject({ opticalDepth: 1 })
    expect(scene.sources[0]).toMatchObject({ temperature: 2900 })
    expect(scene.seed).toBe('first/4')
  })

  it('a linear range, text, and paths that the base scene leaves out', () => {
    const sweep = planned(`vary:
  distance: {from: 100 pc, to: 200 pc, count: 3}
  dust.0.temperature: [solve, none]
  effort.equilibrium: [1e4]
`)
    expect(sweep.models).toHaveLength(6)
    expect(sweep.models.map(([distance]) => distance)).toEqual([100, 100, 150, 150, 200, 200])
    const scene = modelScene(sweep, 4)
    expect(scene.distance).toBe(150 * PARSEC)
    expect(scene.dust[0].temperature).toBe('none')
    expect(scene.effort.equilibrium).toBe(1e4)
  })

  it('tied values: so many times another, and by a power from the base scene', () => {
    const sweep = planned(`vary:
  dust.wind.shape.inner: [5 au, 10 au, 20 au]
tied:
  dust.wind.shape.outer: {to: dust.wind.shape.inner, times: 50}
  sources.giant.luminosity: {to: dust.wind.shape.inner, power: 2}
`)
    // The base scene has 10 au and 5000 Lsun.
    expect(sweep.models).toEqual([
      [5, 250, 1250],
      [10, 500, 5000],
      [20, 1000, 20000]
    ])
    expect(sweep.parameters.map(({ unit, role }) => [unit, role])).toEqual([
      ['au', 'varied'],
      ['au', 'tied'],
      ['Lsun', 'tied']
    ])
    expect(modelScene(sweep, 1).dust[0].shape).toMatchObject({ inner: 5 * AU, outer: 250 * AU })
  })

  it('precision and spectra at the wavelengths of the data go into every scene', () => {
    const sweep = planned(`vary: {${depth}: [1]}
precision: 3 %
data: [{name: old, file: fluxes.csv, spectrum: sed}]
`)
    const scene = modelScene(sweep, 1)
    expect(scene.effort.precision).toBe(0.03)
    expect(scene.effort.cameras).toBe(2000)
    expect(scene.spectra.map(({ name, unit }) => [name, unit])).toEqual([
      ['sed', 'Jy'],
      ['data-old', 'Jy']
    ])
    expect(scene.spectra[1].wavelengths.map((value) => Number((1e4 * value).toPrecision(12)))).toEqual([2.2, 10, 60])
  })

  it.each(['latin-hypercube', 'sobol'] as const)('%s: as many models as asked for, within the ranges, the same again', (kind) => {
    const text = `vary:
  ${depth}: {from: 0.1, to: 10, spacing: log}
  sources.giant.temperature: [2600 K, 2900 K]
  distance: {from: 100 pc, to: 200 pc}
design: {${kind}: 64}
`
    const { models, design } = planned(text)
    expect(design).toBe(kind)
    expect(models).toHaveLength(64)
    const depths = models.map(([value]) => value as number)
    // Evenly spread in the logarithm: just half of the points below the middle.
    expect(depths.filter((value) => value < 1)).toHaveLength(32)
    expect(Math.min(...depths)).toBeGreaterThan(0.1)
    expect(Math.max(...depths)).toBeLessThan(10)
    expect(models.filter(([, temperature]) => temperature === 2600)).toHaveLength(32)
    expect(planned(text).models).toEqual(models)
    expect(planned(`${text}seed: other\n`).models).not.toEqual(models)
  })

  it('a table of the user', () => {
    const sweep = planned('design: {table: mine.csv}\n', {
      'mine.csv': `# two winds\n${depth}, sources.giant.temperature [K]\n0.5, 2500\n2, 3100\n`
    })
    expect(sweep.models).toEqual([
      [0.5, 2500],
      [2, 3100]
    ])
    expect(modelScene(sweep, 2).sources[0]).toMatchObject({ temperature: 3100 })
  })
})

it('the plan that comes with the program is sound', () => {
  const sweep = readPlan(fileURLToPath(new URL('../../../scenes/plans/giant-wind.yaml', import.meta.url)))
  expect(sweep.models).toHaveLength(45)
  expect(sweep.dataSpectra[0].wavelengths).toHaveLength(7)
})
