import { createHash } from 'node:crypto'
import { cpSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { astropy, itWith, runPython } from '../support/python.js'
import { filesIn, motelight, sceneText, sceneWith } from './motelight.js'

const products = [
  'dust/cells.fits',
  'dust/structure.png',
  'images/face-2.2um.png',
  'images/face-60um.png',
  'images/face-column.png',
  'images/face.fits',
  'report.html',
  'run.json',
  'scene.yaml',
  'spectra/sed.ecsv',
  'spectra/sed.png',
  'spectra/sed.svg'
]

async function finishedRun(text = sceneText, ...words: string[]) {
  const folder = folderWith({ 'scene.yaml': text })
  const result = await motelight(folder, 'run', 'scene.yaml', ...words)
  const out = join(folder, 'out/scene')
  return { folder, out, result, record: JSON.parse(readFileSync(join(out, 'run.json'), 'utf8')) }
}

function sha256Of(data: string | Buffer): string {
  return createHash('sha256').update(data).digest('hex')
}

/** One run for all tests that only look at it. */
let shared: ReturnType<typeof finishedRun> | undefined
function oneRun(): ReturnType<typeof finishedRun> {
  shared ??= finishedRun(sceneText, '--workers', '1', '--seed', '007', '--quiet')
  return shared
}

describe('run', () => {
  it('writes every product and says what it found', async () => {
    const { out, result, record } = await oneRun()
    expect(result.exitCode).toBe(0)
    expect(filesIn(out)).toEqual(products)
    expect([...record.files].sort()).toEqual(products)
    for (const [file, magic] of [
      ['images/face.fits', 'SIMPLE  ='],
      ['dust/cells.fits', 'SIMPLE  ='],
      ['images/face-60um.png', '\x89PNG'],
      ['spectra/sed.svg', '<svg'],
      ['spectra/sed.ecsv', '# %ECSV']
    ])
      expect(readFileSync(join(out, file)).toString('latin1').startsWith(magic), file).toBe(true)
    for (const text of [
      /Small wind/,
      /dust wind .*inner edge .* K at 10/,
      /spectrum sed +10 um .* Jy/,
      /camera face +60 um +peak/,
      /energy: 1\.91e\+37 erg\/s emitted/,
      /Results are in out\/scene: 3 pictures/
    ])
      expect(result.stdout).toMatch(text)
    expect(result.stderr).toBe('')
  })

  it('keeps a record of how it was made', async () => {
    const { folder, record } = await oneRun()
    const sha256 = sha256Of(sceneText)
    expect(record).toMatchObject({
      program: 'motelight',
      state: 'done',
      title: 'Small wind',
      seed: '007',
      workers: 1,
      estimator: 'emissivity',
      inputs: [{ file: 'scene.yaml', sha256 }],
      cells: { dimensions: 1 },
      precision: { asked: null, reached: true },
      warnings: []
    })
    // Emitted: 5000 nominal solar luminosities of 3.828e33 erg/s (IAU 2015 Resolution B3).
    expect(record.energy.emitted).toBeCloseTo(5000 * 3.828e33, -24)
    expect(Math.abs(record.energy.balance)).toBeLessThan(1e-12)
    const { escaped, returned, kept, emitted } = record.energy
    expect((escaped + returned + kept) / emitted).toBeCloseTo(1, 12)
    expect(record.equilibrium.rounds.length).toBeGreaterThan(1)
    const spent = record.equilibrium.rounds.reduce((sum: number, { packets }: { packets: number }) => sum + packets, 0)
    expect(record.packets.equilibrium).toBe(spent)
    expect(record.packets.light.map(({ wavelengthUm }: { wavelengthUm: number }) => wavelengthUm)).toEqual([1, 2.2, 10, 60, 100])
    expect(record.precision.observers.map(({ name }: { name: string }) => name)).toEqual(['face', 'sed'])
    for (const phase of ['model', 'dust', 'light', 'files']) expect(record.times[phase].wallSeconds).toBeGreaterThan(0)
    expect(readFileSync(join(folder, 'out/scene/scene.yaml'), 'utf8')).toContain('seed: "007"')
  })

  it('gives the same bits with one worker and with two, others with another seed', async () => {
    const hashes = ({ out }: { out: string }) =>
      ['images/face.fits', 'spectra/sed.ecsv', 'dust/cells.fits'].map((file) => sha256Of(readFileSync(join(out, file))))
    const one = hashes(await oneRun())
    const two = hashes(await finishedRun(sceneText, '--workers', '2', '--seed', '007'))
    const other = hashes(await finishedRun(sceneText, '--seed', 'second'))
    expect(two).toEqual(one)
    for (let i = 0; i < 3; i++) expect(other[i]).not.toBe(one[i])
  })

  it('runs again from the scene it wrote, to the same result', async () => {
    const { folder, out } = await oneRun()
    const again = await motelight(folder, 'run', 'out/scene/scene.yaml', '--out', 'again')
    expect(again.exitCode).toBe(0)
    expect(readFileSync(join(folder, 'again/spectra/sed.ecsv'))).toEqual(readFileSync(join(out, 'spectra/sed.ecsv')))
  })

  it.each(['peel', 'exit'])('--estimator %s', async (estimator) => {
    const { result, record, out } = await finishedRun(sceneText, '--estimator', estimator)
    expect(result.exitCode).toBe(0)
    expect(record.estimator).toBe(estimator)
    expect(filesIn(out)).toEqual(products)
  })

  it('with --json writes one document and nothing else', async () => {
    const folder = folderWith({ 'scene.yaml': sceneText })
    const { stdout, stderr, exitCode } = await motelight(folder, 'run', 'scene.yaml', '--json', '--quiet')
    const { folder: where, ...record } = JSON.parse(stdout)
    expect(where).toBe('out/scene')
    expect(record).toEqual(JSON.parse(readFileSync(join(folder, 'out/scene/run.json'), 'utf8')))
    expect({ stderr, exitCode }).toEqual({ stderr: '', exitCode: 0 })
  })

  it('ends with code 4 and a warning when the precision is not reached', async () => {
    const { result, record } = await finishedRun(sceneWith(['precision: none', 'precision: 0.1 %']))
    expect(result.exitCode).toBe(4)
    expect(record).toMatchObject({ state: 'precision-not-reached', precision: { asked: 0.001, reached: false } })
    expect(record.warnings).toContainEqual(expect.stringMatching(/spectrum sed: the precision of 0\.1 % was not reached/))
    expect(result.stdout).toContain('not reached')
  })

  it('warns of light outside the field of a camera, not of faint dust there', async () => {
    const outside = async (wavelength: string) => {
      const { record } = await finishedRun(sceneWith(['field: 2000 au', 'field: 600 au'], ['[2.2 um, 60 um]', `[${wavelength}]`]))
      return record.warnings.filter((warning: string) => warning.includes('outside its field'))
    }
    expect(await outside('60 um')).toEqual([
      expect.stringMatching(/^camera face: about \d+ % of the light at 60um comes from outside its field$/)
    ])
    expect(await outside('2.2 um')).toEqual([])
  })

  it('runs a scene without dust, and one that asks for temperatures only', async () => {
    const bare = sceneText.replace(/opacities:[\s\S]*?(?=grid:)/, '')
    const { out, result } = await finishedRun(bare)
    expect(result.exitCode).toBe(0)
    expect(filesIn(out)).toEqual(products.filter((file) => !file.startsWith('dust/') && !file.includes('column')))
    const warm = await finishedRun(sceneText.replace(/cameras:\n[\s\S]*/, ''))
    expect(warm.result.exitCode).toBe(0)
    expect(filesIn(warm.out)).toEqual(['dust/cells.fits', 'dust/structure.png', 'report.html', 'run.json', 'scene.yaml'])
  })

  it('runs a disk with its maps', async () => {
    const disk = '{kind: disk, inner: 10 au, outer: 1000 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.1}}'
    const { out, result } = await finishedRun(
      sceneWith(
        ['{kind: shell, inner: 10 au, outer: 1000 au, slope: -2}', disk],
        ['radial: 20', 'radial: 12, polar: 8'],
        ['pixels: 8', 'pixels: 4'],
        ['[2.2 um, 60 um]', '[60 um]'],
        ['[1 um, 10 um, 100 um]', '[60 um]'],
        ['precision: none, equilibrium: 8000', 'precision: 20 %, equilibrium: 2e5']
      ),
      '--cell-edges'
    )
    expect(result.exitCode).toBe(0)
    expect(filesIn(out)).toEqual(expect.arrayContaining(['dust/structure.png', 'dust/planes.png']))
  })

  itWith(astropy, 'the table of cells holds the mass and the centres of the cells', async () => {
    const { out, record } = await oneRun()
    const answer = runPython(`
from astropy.table import QTable
import astropy.units as u
t = QTable.read(${JSON.stringify(join(out, 'dust/cells.fits'))})
print(t.colnames)
print((t['density_wind'] * t['volume']).sum().to_value(u.g) / 1.988409870698051e33)
print(t['r'].to_value(u.au).min(), t['r'].to_value(u.au).max(), t['theta'].to_value(u.rad).mean(), t['temperature_wind'].to_value(u.K).max())
`).split('\n')
    expect(answer[0]).toBe("['r', 'theta', 'phi', 'volume', 'density_wind', 'temperature_wind', 'sigma_temperature_wind']")
    // Solar mass in g: IAU 2015 nominal GM over CODATA 2018 G, as astropy.constants gives it.
    expect(Number(answer[1]) / record.found.dust[0].massMsun).toBeCloseTo(1, 4)
    const [nearest, farthest, theta, hottest] = answer[2].split(' ').map(Number)
    expect([nearest, theta]).toEqual([5, expect.closeTo(Math.PI / 2, 12)])
    expect(farthest).toBeGreaterThan(800)
    expect(hottest).toBeCloseTo(record.found.dust[0].temperatures.hottest.kelvin, 6)
  })
})

/** A folder of its own with the run in it. */
async function copiedRun() {
  const folder = folderWith()
  cpSync((await oneRun()).folder, folder, { recursive: true })
  return { folder, out: join(folder, 'out/scene') }
}

describe('a folder that holds a run', () => {
  it('is refused, and replaced with --force, old files and all but what is not ours', async () => {
    const { folder, out } = await copiedRun()
    const before = readFileSync(join(out, 'run.json'))
    const refused = await motelight(folder, 'run', 'scene.yaml')
    expect(refused).toMatchObject({ exitCode: 2, stderr: expect.stringMatching(/already holds a run.*--force/), stdout: '' })
    expect(readFileSync(join(out, 'run.json'))).toEqual(before)

    writeFileSync(join(out, 'notes.txt'), 'mine')
    writeFileSync(join(folder, 'scene.yaml'), sceneWith(['name: face', 'name: front'], ['[2.2 um, 60 um]', '[60 um]']))
    const forced = await motelight(folder, 'run', 'scene.yaml', '--force')
    expect(forced.exitCode).toBe(0)
    const kept = products.filter((file) => !file.startsWith('images/'))
    expect(filesIn(out)).toEqual(
      [...kept, 'images/front-60um.png', 'images/front-column.png', 'images/front.fits', 'notes.txt'].sort()
    )
  })

  it('removes nothing outside, whatever an old record lists', async () => {
    const { folder, out } = await copiedRun()
    writeFileSync(join(folder, 'precious.txt'), 'mine')
    const record = JSON.parse(readFileSync(join(out, 'run.json'), 'utf8'))
    writeFileSync(
      join(out, 'run.json'),
      JSON.stringify({ ...record, files: ['../../precious.txt', join(folder, 'precious.txt'), '..', 7] })
    )
    expect((await motelight(folder, 'run', 'scene.yaml', '--force')).exitCode).toBe(0)
    expect(readFileSync(join(folder, 'precious.txt'), 'utf8')).toBe('mine')
  })
})

it('a run whose files could not all be written is known as one', async () => {
  const { folder, out } = await copiedRun()
  rmSync(join(out, 'images'), { recursive: true })
  writeFileSync(join(out, 'images'), 'in the way')
  const broken = await motelight(folder, 'run', 'scene.yaml', '--force')
  expect(broken).toMatchObject({
    exitCode: 3,
    stderr: expect.stringMatching(/cannot write out\/scene\/images\/face\.fits: a file/)
  })
  expect(JSON.parse(readFileSync(join(out, 'run.json'), 'utf8')).state).toBe('writing')
  expect((await motelight(folder, 'run', 'scene.yaml')).exitCode).toBe(2)
})
