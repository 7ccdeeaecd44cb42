import { describe, expect, it } from 'vitest'
import { folderWith } from '../support/folder-with.js'
import { filesIn, motelight, sceneText, sceneWith } from './motelight.js'

async function checked(text: string, ...words: string[]) {
  const folder = folderWith({
    'scene.yaml': text,
    'soot.csv': 'wavelength [um],absorption [cm2/g],scattering [cm2/g]\n0.3,1e4,1e4\n30,100,0.1\n'
  })
  const result = await motelight(folder, 'check', 'scene.yaml', ...words)
  expect(filesIn(folder)).toEqual(['scene.yaml', 'soot.csv'])
  return result
}

async function report(text: string) {
  const { stdout, exitCode, stderr } = await checked(text, '--json')
  expect({ exitCode, stderr }).toEqual({ exitCode: 0, stderr: '' })
  return JSON.parse(stdout)
}

describe('check', () => {
  it('tells luminosity, radius, mass and optical depths', async () => {
    const check = await report(sceneWith(['radial: 20', 'radial: 100']))
    // R = sqrt(L / (4 pi sigma T^4)) with sigma = 5.670374e-5 erg/s/cm2/K4 (CODATA 2018), nominal solar values (IAU 2015 B3).
    const radius = Math.sqrt((5000 * 3.828e33) / (4 * Math.PI * 5.670374e-5 * 3000 ** 4)) / 6.957e10
    expect(check.sources[0]).toMatchObject({ luminosityLsun: 5000, temperatureK: 3000 })
    expect(check.sources[0].radiusRsun).toBeCloseTo(radius, 3)
    // A shell of density ~ r^-2 has tau = kappa rho0 ri^2 (1/ri - 1/ro) and M = 4 pi rho0 ri^2 (ro - ri), so M = 4 pi tau ri ro / kappa;
    // with an albedo of 0.5 the extinction is twice the absorption of 1e4 cm2/g.
    const au = 1.495978707e13
    expect(check.dust[0].massMsun).toBeCloseTo((4 * Math.PI * 1.5 * 10 * 1000 * au * au) / 2e4 / 1.988409870698051e33, 12)
    // kappa ~ 1/wavelength.
    const depths = check.opticalDepths.components[0].wavelengths
    for (const { wavelengthUm, opticalDepth, scattering } of depths) {
      expect(opticalDepth).toBeCloseTo((1.5 * 0.55) / wavelengthUm, 10)
      expect(scattering).toBeCloseTo(opticalDepth / 2, 10)
    }
    expect(depths).toHaveLength(5)
    // Spherical: the same from everywhere, through the cells.
    for (const { name, wavelengths } of check.opticalDepths.observers) {
      for (const { wavelengthUm, opticalDepth } of wavelengths)
        expect(opticalDepth / ((1.5 * 0.55) / wavelengthUm), name).toBeCloseTo(1, 2)
    }
    expect(check.cells).toMatchObject({
      count: 100,
      radial: 100,
      polar: 1,
      azimuthal: 1,
      reason: expect.stringContaining('spherical symmetry')
    })
    expect(check.memoryBytes).toBeGreaterThan(5e7)
    expect(check.forecast.seconds.all).toBeGreaterThan(0)
    expect(check.warnings).toEqual([])
  })

  it('says it in words', async () => {
    const { stdout, exitCode } = await checked(sceneText)
    expect(exitCode).toBe(0)
    for (const text of [
      'Small wind (scene.yaml), at 300 pc',
      '3000 K',
      '5000 Lsun',
      'shell of soot',
      'along its radius',
      'inclination 0 deg',
      '20: 20 in radius',
      'memory about',
      'time about'
    ])
      expect(stdout).toContain(text)
    expect(stdout).not.toContain('Warnings')
  })

  it.each([
    [
      'an unresolved edge',
      sceneWith(['optical-depth: 1.5', 'optical-depth: 3e6'], ['precision: none', 'precision: 50 %']),
      /first cell with dust has optical depth/
    ],
    [
      'a pixel larger than the source',
      sceneWith(['field: 2000 au', 'field: 20000 au']),
      /a pixel \(2500 au\) is larger than the source \(2000 au\)/
    ],
    [
      'a star larger than the cavity',
      sceneWith(['5000 Lsun', '5000 Lsun\n    extent: sphere'], ['inner: 10 au', 'inner: 0.5 au']),
      /giant: its radius, 1\.22 au, is larger than the cavity of dust wind \(0\.5 au\)/
    ],
    [
      'a table that ends too early',
      sceneWith(
        ['law: power', 'law: table\n    file: soot.csv'],
        [
          '    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}\n    slope: 1\n    scattering: {albedo: 0.5, asymmetry: 0.3}\n',
          ''
        ]
      ),
      /opacity soot: it is given from 0\.3um to 30um and is extrapolated for 2 observed wavelengths/
    ],
    [
      'a precision out of reach',
      sceneWith(['precision: none', 'precision: 0.01 %'], ['cameras: 2000', 'cameras: 20000']),
      /precision of 0\.01 % is unlikely/
    ]
  ])('warns of %s', async (_, text, message) => {
    const { warnings } = await report(text)
    expect(warnings).toContainEqual(expect.stringMatching(message))
  })

  it('expects a time of the right order', async () => {
    const text = sceneWith(['equilibrium: 8000, cameras: 2000', 'equilibrium: 4e5, cameras: 4e5'])
    const timedRun = async () => {
      const start = performance.now()
      await motelight(folderWith({ 'scene.yaml': text }), 'run', 'scene.yaml')
      return (performance.now() - start) / 1000
    }
    // Side by side: what else the machine does slows both.
    const [{ forecast }, seconds] = await Promise.all([report(text), timedRun()])
    const ratio = forecast.seconds.all / seconds
    expect(ratio).toBeGreaterThan(0.1)
    expect(ratio).toBeLessThan(10)
  })
})
