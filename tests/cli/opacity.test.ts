import { spawnSync } from 'node:child_process'
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { PNG } from 'pngjs'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { askPython, astropy, itWith, type OutsideTool } from '../support/python.js'
import { filesIn, motelight, sceneWith } from './motelight.js'

const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const silicate = `law: grains
    constants:
      oscillators:
        infinity: 2.6
        terms: [{at: 10 um, strength: 0.8, damping: 0.2}, {at: 19 um, strength: 1.6, damping: 180 cm-1}, {at: 0.2 um, strength: 0.3, damping: 0.4}]
    sizes: {smallest: 5 nm, largest: 250 nm}
    grain-density: 3.3 g/cm3`
const galactic = `law: extinction-curve
    curve: cardelli-1989
    reference: {wavelength: 0.55 um, extinction: 2.8e4 cm2/g}
    scattering: {albedo: 0.6, asymmetry: 0.5}`

const extinction: OutsideTool = {
  command: '/usr/bin/python3',
  present: spawnSync('/usr/bin/python3', ['-c', 'import extinction']).status === 0,
  debianPackage: 'python3-extinction'
}

describe('motelight opacity', () => {
  it('writes tables and plots of every opacity, and tells a few rows', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith(['  soot:', `  rock:\n    ${silicate}\n  soot:`]) })
    const { exitCode, stdout, stderr } = await motelight(folder, 'opacity', 'scene.yaml', '--quiet')
    expect({ exitCode, stderr }).toEqual({ exitCode: 0, stderr: '' })
    expect(stdout).toMatch(/^rock: grains, scattering henyey-greenstein/)
    const kinds = ['', '-scattering', '-means'].flatMap((kind) => ['ecsv', 'svg', 'png'].map((end) => `${kind}.${end}`))
    expect(filesIn(folder)).toEqual(
      ['scene.yaml', ...['rock', 'soot'].flatMap((name) => kinds.map((kind) => `out/scene-opacity/${name}${kind}`))].sort()
    )
    const { width, height } = PNG.sync.read(readFileSync(join(folder, 'out/scene-opacity/rock.png')))
    expect(width * height).toBeGreaterThan(5e5)
  })

  it('with a name, wavelengths, a folder and --json: that much and no more', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith([power, silicate]) })
    const words = ['opacity', 'scene.yaml', 'soot', '--wavelengths', '345 GHz, 0.55 um', '--out', 'here', '--json']
    const { stdout, exitCode } = await motelight(folder, ...words)
    expect(exitCode).toBe(0)
    const { folder: where, files, opacities } = JSON.parse(stdout)
    expect(where).toBe('here')
    expect(readdirSync(join(folder, 'here')).sort()).toEqual([...files].sort())
    const [{ scattering, curves, means }] = opacities
    expect(scattering.map(({ wavelengthUm }: { wavelengthUm: number }) => Math.round(wavelengthUm * 100) / 100)).toEqual([
      0.55, 868.96
    ])
    // long waves: Rayleigh's law, whole polarisation at 90 degrees
    const long = scattering[1]
    const at90 = long.angleDeg.findIndex((angle: number) => Math.abs(angle - 90) < 1e-6)
    expect(long.polarisation[at90]).toBeCloseTo(1, 3)
    expect(long.matrix.s11[at90]).toBeCloseTo(3 / (16 * Math.PI), 4)
    expect(curves.albedo.every((value: number) => value >= 0 && value <= 1)).toBe(true)
    expect(means.planck.every((value: number) => value > 0)).toBe(true)
  })

  itWith(astropy, 'its tables are read by astropy, with their units', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith([power, silicate]) })
    await motelight(folder, 'opacity', 'scene.yaml')
    const read = askPython<Record<string, [string[], string[]]>>(
      `from astropy.table import QTable
answer = {}
for kind in ['', '-scattering', '-means']:
    table = QTable.read(data + '/out/scene-opacity/soot' + kind + '.ecsv')
    answer[kind] = (table.colnames, [str(table[name].unit) for name in table.colnames])`,
      folder
    )
    expect(read['']).toEqual([
      ['wavelength', 'absorption', 'scattering', 'extinction', 'albedo', 'asymmetry'],
      ['um', 'cm2 / g', 'cm2 / g', 'cm2 / g', 'None', 'None']
    ])
    expect(read['-scattering'][0]).toEqual(['wavelength', 'angle', 'law', 's11', 's12', 's33', 's34', 'polarisation'])
    expect(read['-means'][1]).toEqual(['K', 'cm2 / g', 'cm2 / g'])
  })

  itWith(extinction, 'a scene with an extinction curve has the extinction of the package of Debian', async () => {
    const folder = folderWith({ 'scene.yaml': sceneWith([power, galactic]) })
    const { stdout } = await motelight(folder, 'opacity', 'scene.yaml', '--json')
    const [{ curves }] = JSON.parse(stdout).opacities
    const rows = (curves.wavelengthUm as number[])
      .map((um, i) => ({ um, opacity: curves.extinction[i] as number, albedo: curves.albedo[i] as number }))
      .filter(({ um }) => um > 0.1001 && um < 3.3 && Math.abs(um - 0.125) > 1e-3)
    const theirs = askPython<number[]>(
      'import extinction, numpy\nanswer = list(extinction.ccm89(numpy.array(data) * 1e4, 1.0, 3.1) / extinction.ccm89(numpy.array([5500.0]), 1.0, 3.1)[0])',
      rows.map(({ um }) => um)
    )
    expect(rows.length).toBeGreaterThan(50)
    rows.forEach(({ opacity, albedo }, i) => {
      expect(opacity / 2.8e4 / theirs[i]).toBeCloseTo(1, 7)
      expect(albedo).toBeCloseTo(0.6, 12)
    })
  })

  it.each([
    [['opacity', 'scene.yaml', 'sot'], /no opacity sot; did you mean soot\?/],
    [['opacity', 'scene.yaml', '--wavelengths', '2.2'], /--wavelengths: the unit is missing/],
    [['opacity', 'scene.yaml', '--wavelengths', '0 um'], /--wavelengths: must be greater than 0/],
    [['opacity'], /scene file is missing/],
    [['opacity', 'scene.yaml', '--out', 'scene.yaml'], /cannot write scene\.yaml\/soot\.ecsv: a file/]
  ])('%j: exit code 2 and nothing written', async (words, message) => {
    const folder = folderWith({ 'scene.yaml': sceneWith() })
    const { exitCode, stdout, stderr } = await motelight(folder, ...words)
    expect(stderr).toMatch(message)
    expect({ exitCode, stdout, files: filesIn(folder) }).toEqual({ exitCode: 2, stdout: '', files: ['scene.yaml'] })
  })
})
