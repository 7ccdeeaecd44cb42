import { writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { SceneError } from '../../src/scene/error.js'
import { parseScene } from '../../src/scene/read.js'
import { parseOpacityTable, parseSpectrumTable } from '../../src/scene/tables.js'
import type { TableOpacitySpec } from '../../src/scene/types.js'
import { folderWith } from '../support/folder-with.js'
import { exampleWith, problemsOf } from './example.js'

const opacity = (text: string) => parseOpacityTable(text, '/data/t.csv', 't.csv')
const spectrum = (text: string) => parseSpectrumTable(text, '/data/s.csv', 's.csv')

describe('opacity tables', () => {
  test('columns in any order, comments, rows in any order, units of the header', () => {
    const table = opacity(`\ufeff# our own invention
scattering [m2/kg], wavelength [nm], asymmetry, absorption [cm2/g]   # header\r
0.2, 2200, 0.1, 40

1.5,  550, 0.6, 3e2 # visible
`)
    expect(table.file).toBe('/data/t.csv')
    expect([...table.wavelength]).toEqual([5.5e-5, 2.2e-4].map((w) => expect.closeTo(w, 16)))
    expect([...table.absorption]).toEqual([300, 40])
    expect([...table.scattering]).toEqual([15, 2])
    expect([...table.asymmetry]).toEqual([0.6, 0.1])
  })

  test('asymmetry defaults to 0; frequencies serve as wavelengths', () => {
    const table = opacity('wavelength [GHz],absorption [cm2/g],scattering [cm2/g]\n100,1,0\n200,2,0')
    expect([...table.asymmetry]).toEqual([0, 0])
    // c = 299792.458 km/s (SI): 200 GHz is 1.49896229 mm.
    expect(table.wavelength[0]).toBeCloseTo(0.149896229, 14)
    expect(table.absorption[0]).toBe(2)
  })

  const head = 'wavelength [um],absorption [cm2/g],scattering [cm2/g],asymmetry\n'
  test.each([
    ['a missing column', 'wavelength [um],absorption [cm2/g]\n1,2\n2,3', 't.csv:1:1: scattering: the column is missing'],
    [
      'no unit',
      'wavelength,absorption [cm2/g],scattering [cm2/g]\n1,2,3\n2,3,4',
      't.csv:1:1: wavelength = wavelength: the unit is missing'
    ],
    [
      'a wrong unit',
      'wavelength [um],absorption [cm2],scattering [cm2/g]\n1,2,3\n2,3,4',
      't.csv:1:17: absorption = absorption [cm2]: the unit is not'
    ],
    ['an unknown column', `${head.trim()},asymetry\n1,2,3,0,0\n2,3,4,0,0`, 't.csv:1:65: asymetry = asymetry: not a column'],
    [
      'a column twice',
      'wavelength [um],absorption [cm2/g],scattering [cm2/g],wavelength [um]\n1,2,3,1\n2,3,4,1',
      't.csv:1:55: wavelength = wavelength [um]: the column is given twice'
    ],
    ['a word', `${head}1,2,3,0\n2, x,4,0`, 't.csv:3:4: absorption = x: a number'],
    ['a hole', `${head}1,2,3,0\n2,,4,0`, 't.csv:3:3: absorption: a number'],
    ['a negative value', `${head}1,2,3,0\n2,3,-4,0`, 't.csv:3:5: scattering = -4: must not be negative'],
    ['a negative wavelength', `${head}-1,2,3,0\n2,3,4,0`, 't.csv:2:1: wavelength = -1: a wavelength greater than 0'],
    ['an asymmetry of 1', `${head}1,2,3,1\n2,3,4,0`, 't.csv:2:7: asymmetry = 1: must be greater than -1 and less than 1'],
    ['not finite', `${head}1,1e999,3,0\n2,3,4,0`, 't.csv:2:3: absorption = 1e999: a number'],
    ['a short row', `${head}1,2,3,0\n2,3`, 't.csv:3:1: row: 4 values are expected, as in the header; there are 2'],
    ['one row', `${head}1,2,3,0`, 't.csv:1:1: rows: at least 2 rows'],
    ['the same wavelength', `${head}1,2,3,0\n2,3,4,0\n1,5,6,0`, 't.csv:4:1: wavelength: the wavelength of line 2 is given again'],
    ['zeros', `${head}1,0,0,0\n2,0,0,0`, 't.csv:1:1: every value of the table is 0'],
    ['nothing', '# only this\n', 't.csv:1:1: the table is empty']
  ])('%s is refused at its place', (_, text, message) => {
    expect(() => opacity(text)).toThrow(SceneError)
    expect(() => opacity(text)).toThrow(message)
  })
})

describe('spectrum tables', () => {
  test('flux-nu, and flux-lambda turned into it: F_nu = F_lambda lambda^2 / c', () => {
    const perHz = spectrum('wavelength [um],flux-nu [Jy]\n1,5\n2,6')
    expect(perHz.fluxNu[1] / perHz.fluxNu[0]).toBeCloseTo(1.2, 14)
    const perWavelength = spectrum('flux-lambda [erg/s/cm2/\u00c5],wavelength [micron]\n5,1\n6,2')
    // F_lambda 5 -> 6 while lambda doubles: F_nu changes by 1.2 x 4.
    expect(perWavelength.fluxNu[1] / perWavelength.fluxNu[0]).toBeCloseTo(4.8, 14)
    // 1 erg/s/cm2/angstrom at 1 um is 1e8 x 1e-8 cm2 / c = 3.3356e-11 erg/s/cm2/Hz, by hand.
    expect(perWavelength.fluxNu[0] / 5).toBeCloseTo(1 / 2.99792458e10, 24)
  })

  test('flux without its kind is refused', () => {
    expect(() => spectrum('wavelength [um],flux [Jy]\n1,5\n2,6')).toThrow(/flux = flux \[Jy\]: not a column/)
    expect(() => spectrum('wavelength [um],flux-nu [W/m2/um]\n1,5\n2,6')).toThrow(/the unit is not accepted here/)
    expect(() => spectrum('wavelength [um],flux-nu [Jy]\n1,0\n2,0')).toThrow(/every value/)
  })
})

describe('tables named by a scene', () => {
  const folder = folderWith()
  writeFileSync(join(folder, 'grey.csv'), 'wavelength [um],absorption [cm2/g],scattering [cm2/g]\n1,2,0\n2,1,0\n')
  writeFileSync(join(folder, 'star.csv'), 'wavelength [um],flux-lambda [W/m2/um]\n1,2\n2,1\n')
  writeFileSync(join(folder, 'bad.csv'), 'wavelength [um],absorption [cm2/g]\n1,2\n2,-1\n')
  writeFileSync(join(folder, 'binary.csv'), Buffer.from([0xff, 0x00, 0xfe]))
  const file = join(folder, 'scene.yaml')
  const power = /law: power[\s\S]*asymmetry: 0.3}/.exec(exampleWith())![0]
  const star = 'temperature: 2800 K\n    luminosity: 6000 Lsun'

  test('are read relative to its folder', () => {
    const scene = parseScene(
      exampleWith(
        [power, 'law: table\n    file: grey.csv\n    phase: isotropic'],
        [star, 'luminosity: 1 Lsun\n    spectrum: {table: star.csv}']
      ),
      file
    )
    const soot = scene.opacities.soot as TableOpacitySpec
    expect(soot).toMatchObject({ law: 'table', phase: 'isotropic', table: { file: join(folder, 'grey.csv') } })
    expect([...soot.table.absorption]).toEqual([2, 1])
    expect(scene.sources[0]).toMatchObject({ luminosity: 3.828e33, spectrum: { kind: 'table' } })
    expect(scene.sources[0]).toMatchObject({ temperature: undefined, radius: undefined })
  })

  test('problems come from the scene or from the table, all at once', () => {
    const problems = problemsOf(
      exampleWith(
        ['320 pc', '320'],
        [power, 'law: table\n    file: bad.csv'],
        [star, 'luminosity: 1 Lsun\n    spectrum: {table: none.csv}']
      ),
      file
    )
    expect(problems.map(({ location, key }) => [location.file, location.line, key])).toEqual([
      [file, 2, 'distance'],
      [file, 8, 'sources.0.spectrum.table'],
      [join(folder, 'bad.csv'), 1, 'scattering'],
      [join(folder, 'bad.csv'), 3, 'absorption']
    ])
  })

  test.each([
    ['binary.csv', /is not a text file/],
    ['.', /is a folder/],
    ['none.csv', /does not exist/]
  ])('%s is refused at its key', (name, message) => {
    const problems = problemsOf(exampleWith([power, `law: table\n    file: ${name}`]), file)
    expect(problems).toMatchObject([{ key: 'opacities.soot.file', location: { line: 12, column: 5 } }])
    expect(problems[0].message).toMatch(message)
  })

  test.each([
    ['spectrum: {table: star.csv}\n    temperature: 3000 K', /needs its `luminosity`/],
    ['spectrum: {table: star.csv}\n    luminosity: 1 Lsun\n    extent: sphere', /`extent: sphere` needs `radius`/],
    ['spectrum: {table: star.csv}\n    luminosity: 1 Lsun\n    radius: 1 Rsun\n    temperature: 3 K', /at most one of/]
  ])('a star with %s', (keys, message) => {
    expect(problemsOf(exampleWith([star, keys]), file)[0].message).toMatch(message)
  })
})
