import { describe, expect, it } from 'vitest'
import { problemsOf } from '../example.js'

const depth = 'dust.wind.amount.optical-depth'

/** What is wrong, where the plan says it (line 1 names the scene), and part of the message. */
const cases: [string, string, string, string][] = [
  ['an entry that is not there', 'vary:\n  dust.wnd.amount.optical-depth: [1]\n', 'plan.yaml:3:3', 'did you mean `wind`'],
  ['a key that is not there', 'vary:\n  dust.wind.amount.optical-deph: [1]\n', 'plan.yaml:3:3', 'did you mean `optical-depth`'],
  ['a section that is not there', 'vary:\n  duzt.wind: [1]\n', 'plan.yaml:3:3', 'unknown key; did you mean `dust`'],
  ['a path below a value', 'vary:\n  distance.far: [1 pc]\n', 'plan.yaml:3:3', '`distance` is a value'],
  ['a value that the scene refuses', `vary:\n  ${depth}: [1, -1]\n`, 'plan.yaml:3:39', 'the scene refuses this'],
  ['a unit that the scene refuses', 'vary:\n  distance: [100 K]\n', 'plan.yaml:3:14', 'is a unit of temperature'],
  ['values that do not go together', 'vary:\n  sources.giant.radius: [100 Rsun]\n', 'plan.yaml:3:3', 'exactly two of'],
  ['two axes on one path', `vary:\n  ${depth}: [1]\n  dust.0.amount.optical-depth: [2]\n`, 'plan.yaml:4:3', 'is the same value'],
  ['one path twice', `vary:\n  ${depth}: [1]\n  ${depth}: [2]\n`, 'plan.yaml:4:3', 'unique'],
  [
    'an axis about another',
    `vary:\n  ${depth}: [1]\ntied: {dust.wind.amount: {to: ${depth}, times: 2}}\n`,
    'plan.yaml:4:8',
    'overlaps with'
  ],
  [
    'a tie to nothing',
    `vary:\n  ${depth}: [1]\ntied: {distance: {to: duzt, times: 2}}\n`,
    'plan.yaml:4:19',
    'not a number that varies'
  ],
  ['ends in two units', 'vary:\n  distance: {from: 1 pc, to: 2 kpc, count: 3}\n', 'plan.yaml:3:26', 'the same unit'],
  ['a grid without a count', 'vary:\n  distance: {from: 1 pc, to: 2 pc}\n', 'plan.yaml:3:3', '`count` is missing'],
  [
    'a count beside a hypercube',
    'vary:\n  distance: {from: 1 pc, to: 2 pc, count: 3}\ndesign: {latin-hypercube: 9}\n',
    'plan.yaml:3:36',
    '`count` is for a grid'
  ],
  ['a logarithm of nothing', `vary:\n  ${depth}: {from: 0, to: 1, count: 3, spacing: log}\n`, 'plan.yaml:3:62', 'above 0'],
  ['a mixture', 'vary:\n  dust.wind.temperature: [solve, 40 K]\n', 'plan.yaml:3:27', 'not both'],
  ['a value twice', `vary:\n  ${depth}: [1, 1]\n`, 'plan.yaml:3:39', 'given twice'],
  ['nothing that varies', 'title: x\n', 'plan.yaml:1:1', 'nothing varies'],
  [
    'too many models',
    `vary:\n  distance: {from: 1 pc, to: 2 pc, count: 90000}\n  ${depth}: {from: 1, to: 2, count: 90000}\n`,
    'plan.yaml:2:1',
    '8100000000 models'
  ],
  ['an unknown key', `vary: {${depth}: [1]}\nvarry: 2\n`, 'plan.yaml:3:1', 'did you mean `vary`'],
  ['a missing table', 'design: {table: none.csv}\n', 'plan.yaml:2:10', 'does not exist'],
  ['a table with a wrong path', 'design: {table: t.csv}\n', 'plan.yaml:2:10', 'column dust.x: unknown path'],
  ['a table with a wrong value', 'design: {table: u.csv}\n', 'u.csv:3:1', 'the scene refuses this'],
  ['a table beside axes', `vary: {${depth}: [1]}\ndesign: {table: u.csv}\n`, 'plan.yaml:2:1', 'leave `vary` out'],
  [
    'data of no spectrum',
    `vary: {${depth}: [1]}\ndata: [{name: a, file: fluxes.csv, spectrum: sad}]\n`,
    'plan.yaml:3:36',
    'no such spectrum; there are: sed'
  ],
  [
    'data without wavelengths',
    `vary: {${depth}: [1]}\ndata: [{name: a, file: t.csv, spectrum: sed}]\n`,
    'plan.yaml:3:18',
    'has no column wavelength'
  ],
  [
    'data without errors',
    `vary: {${depth}: [1]}\ndata: [{name: a, file: fluxes.csv, spectrum: sed, errors: noise}]\n`,
    'plan.yaml:3:18',
    'has no column noise; there are wavelength, flux, sigma'
  ],
  ['data of no kind', `vary: {${depth}: [1]}\ndata: [{name: a, kind: movie}]\n`, 'plan.yaml:3:18', 'photometry'],
  ['no data', `vary: {${depth}: [1]}\ndata: none.yaml\n`, 'plan.yaml:3:1', 'the file of data /'],
  [
    'data of a camera that is not there',
    `vary: {${depth}: [1]}\ndata: seen.yaml\n`,
    'seen.yaml:1:52',
    'no such camera; there are face'
  ],
  [
    'data at a wavelength that no model has',
    `vary: {${depth}: [1]}\ndata: [{name: v, kind: visibilities, file: uv.csv, camera: face, wavelength: 3 mm}]\n`,
    'plan.yaml:3:66',
    'not a wavelength of the model; there are 2.2um, 60um'
  ],
  ['a line that is none', `vary: {${depth}: [1]}\nslurm: {lines: [--nice]}\n`, 'plan.yaml:3:17', '#SBATCH']
]

describe('a wrong plan is refused where it is wrong', () => {
  it.each(cases)('%s', (_, plan, at, message) => {
    const files = {
      't.csv': 'dust.x\n1\n2\n',
      'u.csv': `${depth}\n1\n-2\n`,
      'uv.csv': 'east [m], north [m], amplitude [Jy], sigma [Jy]\n10, 0, 1, 0.1\n',
      'seen.yaml': 'data: [{name: v, kind: visibilities, file: uv.csv, camera: side, wavelength: 60 um}]\n'
    }
    const problems = problemsOf(plan, files)
    expect(problems.map((problem) => problem.at)).toContain(at)
    expect(
      problems.find((problem) => problem.at === at && problem.message.includes(message)),
      JSON.stringify(problems)
    ).toBeDefined()
  })

  it('a base scene that is wrong: in the scene', () => {
    const [{ at }] = problemsOf(`vary: {${depth}: [1]}\n`, { 'scene.yaml': 'distance: 3\n' })
    expect(at).toBe('scene.yaml:1:1')
  })
})
