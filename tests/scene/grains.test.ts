import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { parseScene } from '../../src/scene/read.js'
import type { CurveOpacitySpec, GrainsOpacitySpec } from '../../src/scene/types.js'
import { sceneYaml } from '../../src/scene/write.js'
import { folderWith } from '../support/folder-with.js'
import { exampleWith, problemsOf } from './example.js'

const power = `law: power
    reference: {wavelength: 1.3 mm, absorption: 2.3 cm2/g}
    slope: 1.5
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const grains = `law: grains
    constants: rock.csv
    sizes: {smallest: 5 nm, largest: 250 nm}
    grain-density: 3.3 g/cm3`
const curve = `law: extinction-curve
    curve: cardelli-1989
    reference: {wavelength: 0.55 um, extinction: 2.8e4 cm2/g}`
const rock = 'wavelength [um],n,k\n0.1,1.6,0.5\n1,1.7,0.03\n10,1.5,0.8\n'

const folder = folderWith()
const file = join(folder, 'scene.yaml')
writeFileSync(join(folder, 'rock.csv'), rock)
writeFileSync(join(folder, 'waves.csv'), 'wavenumber [cm-1],k,n\n1000,0.8,1.5\n10000,0.03,1.7\n1e5,0.5,1.6\n')
writeFileSync(join(folder, 'sizes.csv'), 'radius [nm],number\n5,100\n50,3\n500,0\n')

const opacity = (text: string) => parseScene(exampleWith([power, text]), file).opacities.soot
const grainsOf = (text: string) => (opacity(text) as GrainsOpacitySpec).populations
const withConstants = (text: string) => grains.replace('rock.csv', text)

describe('law: grains', () => {
  test('reads constants, sizes and density, in cgs', () => {
    const [grain] = grainsOf(grains)
    expect(grain).toMatchObject({ massFraction: 1, density: 3.3, porosity: 0 })
    expect(grain.sizes).toMatchObject({ kind: 'power', slope: -3.5 })
    expect(grain.sizes.kind === 'power' && grain.sizes.largest).toBeCloseTo(250e-7, 18)
    const { table } = grain.constants as Extract<typeof grain.constants, { kind: 'table' }>
    expect([...table.wavelength].map((cm) => Math.round(cm * 1e5))).toEqual([1, 10, 100])
    expect([...table.k]).toEqual([0.5, 0.03, 0.8])
  })

  test('takes wavenumbers, in either order', () => {
    const [grain] = grainsOf(withConstants('waves.csv'))
    const { table } = grain.constants as Extract<typeof grain.constants, { kind: 'table' }>
    expect([...table.n]).toEqual([1.6, 1.7, 1.5])
    table.wavelength.forEach((wavelength, i) => {
      expect(wavelength).toBeCloseTo([1e-5, 1e-4, 1e-3][i], 15)
    })
  })

  test('takes resonances as wavelengths or wavenumbers, and widths absolute or relative', () => {
    const terms =
      '[{at: 10 um, strength: 1, damping: 0.1}, {at: 500 cm-1, strength: 2, damping: 40 cm-1}, {at: 1 um-1, strength: 1, damping: 5 %}]'
    const [{ constants }] = grainsOf(withConstants(`{oscillators: {infinity: 2.5, terms: ${terms}}}`))
    expect(constants).toMatchObject({ kind: 'oscillators', infinity: 2.5 })
    const read = constants.kind === 'oscillators' ? constants.terms : []
    const expected = [
      [1000, 1, 100],
      [500, 2, 40],
      [10000, 1, 500]
    ]
    read.forEach(({ at, strength, damping }, i) => {
      ;[at, strength, damping].forEach((value, j) => {
        expect(value).toBeCloseTo(expected[i][j], 9)
      })
    })
  })

  const mixture = '{bruggeman: [{constants: rock.csv, volume-fraction: 0.6}, {constants: {n: 2, k: 1}, volume-fraction: 40 %}]}'
  const embedded = `{maxwell-garnett: {matrix: ${mixture}, inclusions: [{constants: {handbook: silicon-carbide}, volume-fraction: 0.1}]}}`
  const several = `law: grains
    populations:
      - {mass-fraction: 0.7, constants: ${embedded}, sizes: {file: sizes.csv}, grain-density: 3 g/cm3, porosity: 0.3}
      - mass-fraction: 30 %
        constants: {handbook: corundum-ordinary}
        sizes: {smallest: 10 nm, largest: 1 um, median: 0.1 um, width: 0.5}
        grain-density: 4000 kg/m3
        coat: {constants: rock.csv, volume-fraction: 0.2, density: 1 g/cm3}`

  test.each([
    ['plain', grains],
    ['oscillators', withConstants('{oscillators: {infinity: 3.01, terms: [{at: 401 cm-1, strength: 6.6, damping: 0.019}]}}')],
    ['several, mixed and coated', several],
    ['an extinction curve', curve],
    ['another', `${curve.replace('cardelli-1989', 'pei-1992')}\n    galaxy: small-magellanic-cloud`]
  ])('is written as it is read: %s', (_, text) => {
    const scene = parseScene(exampleWith([power, text]), file)
    const again = parseScene(sceneYaml(scene), file)
    expect(again.opacities).toStrictEqual(scene.opacities)
    expect(again.inputs.slice(1)).toStrictEqual(scene.inputs.slice(1))
  })

  test('lists the files among the inputs', () => {
    const { inputs } = parseScene(exampleWith([power, several]), file)
    expect(inputs.map((input) => input.file).sort()).toEqual(
      ['rock.csv', 'scene.yaml', 'sizes.csv'].map((name) => join(folder, name))
    )
  })
})

describe('law: extinction-curve', () => {
  test('has the R_V of diffuse gas unless another is given', () => {
    expect((opacity(curve) as CurveOpacitySpec).curve).toEqual({ name: 'cardelli-1989', rv: 3.1 })
    expect((opacity(curve.replace('cardelli-1989', 'pei-1992')) as CurveOpacitySpec).curve).toEqual({
      name: 'pei-1992',
      galaxy: 'milky-way'
    })
  })
})

const sized = (sizes: string) => grains.replace('{smallest: 5 nm, largest: 250 nm}', sizes)
const population = (share: string) =>
  `{mass-fraction: ${share}, constants: {n: 2}, sizes: {smallest: 1 nm, largest: 2 nm}, grain-density: 1 g/cm3}`

describe('what is wrong is told where it stands', () => {
  test.each([
    ['an unknown key', grains.replace('sizes', 'size'), '13:5', 'size', /did you mean `sizes`/],
    ['a bad unit', grains.replace('250 nm', '250 K'), '13:29', 'sizes.largest', /unit of temperature/],
    ['sizes reversed', grains.replace('5 nm', '5 um'), '13:13', 'sizes.smallest', /less than `largest`/],
    ['boulders', grains.replace('250 nm', '1 m'), '13:29', 'sizes.largest', /at most 10 cm/],
    ['no sizes', grains.replace(/ {4}sizes.*\n/, ''), '10:3', 'sizes', /key is missing.*populations/],
    [
      'sizes of both kinds',
      sized('{smallest: 5 nm, largest: 1 um, slope: -3, median: 9 nm}'),
      '13:44',
      'sizes.slope',
      /belongs to a power law/
    ],
    ['a strange form of constants', withConstants('{lorentz: 3}'), '12:5', 'constants', /columns wavelength, n, k, or one of/],
    ['no terms', withConstants('{oscillators: {infinity: 3}}'), '12:17', 'constants.oscillators.terms', /missing/],
    ['a negative k', withConstants('{n: 2, k: -0.1}'), '12:23', 'constants.k', /from 0/],
    [
      'no such crystal',
      withConstants('{handbook: corundum}'),
      '12:17',
      'constants.handbook',
      /did you mean|accepted: silicon-carbide/
    ],
    [
      'volume fractions',
      withConstants('{bruggeman: [{constants: {n: 2}, volume-fraction: 0.5}, {constants: {n: 3}, volume-fraction: 0.6}]}'),
      '12:17',
      'constants.bruggeman',
      /volume fractions sum to 1\.1; they must sum to 1/
    ],
    [
      'too much included',
      withConstants('{maxwell-garnett: {matrix: {n: 2}, inclusions: [{constants: {n: 3}, volume-fraction: 1}]}}'),
      '12:51',
      'constants.maxwell-garnett.inclusions',
      /less than 1/
    ],
    [
      'mass fractions',
      `law: grains\n    populations: [${population('0.5')}, ${population('0.6')}]`,
      '12:5',
      'populations',
      /mass fractions sum to 1\.1/
    ],
    [
      'one and several',
      `${grains}\n    populations: [${population('1')}]`,
      '12:5',
      'constants',
      /belongs into each of the `populations`/
    ],
    ['a wide porosity', `${grains}\n    porosity: 1`, '15:5', 'porosity', /below 1/],
    ['a missing file', withConstants('nowhere.csv'), '12:5', 'constants', /nowhere\.csv does not exist/],
    ['a curve without a year', curve.replace('-1989', ''), '12:5', 'curve', /cardelli-1989, pei-1992/],
    ['a galaxy of the wrong curve', `${curve}\n    galaxy: milky-way`, '14:5', 'galaxy', /cardelli-1989 has no `galaxy`/]
  ])('%s', (_, text, place, key, message) => {
    const problems = problemsOf(exampleWith([power, text]), file)
    const found = problems.find((problem) => problem.key === `opacities.soot.${key}`)
    expect(found?.message, JSON.stringify(problems)).toMatch(message)
    expect(`${found!.location.line}:${found!.location.column}`).toBe(place)
  })

  test('a missing file deep in a mixture', () => {
    const inner = '{constants: nowhere.csv, volume-fraction: 0.5}'
    const text = `law: grains
    populations:
      - mass-fraction: 1
        constants: {bruggeman: [{constants: {n: 2}, volume-fraction: 0.5}, ${inner}]}
        sizes: {smallest: 1 nm, largest: 2 nm}
        grain-density: 1 g/cm3`
    const [problem] = problemsOf(exampleWith([power, text]), file)
    expect(problem).toMatchObject({
      key: 'opacities.soot.populations.0.constants.bruggeman.1.constants',
      location: { line: 14, column: 77 },
      message: expect.stringMatching(/does not exist/)
    })
  })

  test.each([
    ['a negative k', '1,1.7,-0.03', '3:7', 'k', /negative/],
    ['a negative n', '1,-1.7,0.03', '3:3', 'n', /negative/],
    ['wavelengths that turn back', '0.05,1.7,0.03', '4:1', 'wavelength', /turns back/],
    ['a wavelength given again', '0.1,1.7,0.03', '3:1', 'wavelength', /of line 2 is given again/],
    ['neither n nor k', '1,0,0', '3:1', 'n', /both/],
    ['a word', '1,1.7,dark', '3:7', 'k', /number is expected/],
    ['a row too long', '1,1.7,0.03,4', '3:1', 'row', /3 values/]
  ])('a file of constants with %s', (_, row, place, key, message) => {
    writeFileSync(join(folder, 'wrong.csv'), rock.replace('1,1.7,0.03', row))
    const [problem] = problemsOf(exampleWith([power, withConstants('wrong.csv')]), file)
    expect(problem.message).toMatch(message)
    expect(problem).toMatchObject({ key, location: { file: join(folder, 'wrong.csv') } })
    expect(`${problem.location.line}:${problem.location.column}`).toBe(place)
  })

  test.each([
    ['no unit', 'radius,number\n1,2\n2,1\n', '1:1', 'radius', /unit is missing/],
    ['nothing in it', 'radius [um],number\n1,0\n2,0\n', '1:1', '', /every value/],
    ['radii that turn back', 'radius [um],number\n1,1\n3,1\n2,1\n', '4:1', 'radius', /turns back/]
  ])('a file of sizes with %s', (_, text, place, key, message) => {
    writeFileSync(join(folder, 'wrong.csv'), text)
    const [problem] = problemsOf(exampleWith([power, sized('{file: wrong.csv}')]), file)
    expect(problem.message).toMatch(message)
    expect(problem.key).toBe(key)
    expect(`${problem.location.line}:${problem.location.column}`).toBe(place)
  })
})
