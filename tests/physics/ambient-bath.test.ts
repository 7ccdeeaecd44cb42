import { describe, expect, it } from 'vitest'
import { planckNu } from '../../src/dust/planck.js'
import { resultWarnings } from '../../src/run/result-warnings.js'
import type { RunResult } from '../../src/run/run-result.js'
import { LIGHT_SPEED } from '../../src/units/constants.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

const shell = '{kind: shell, inner: 80 au, outer: 100 au, slope: -1}'
const disk = '{kind: disk, inner: 30 au, outer: 100 au, scale-height: {value: 20 au, at: 100 au, flaring: 1.2}}'
const bath = 50

/** Grey dust that absorbs and scatters alike, and perhaps a black star of the same temperature, in a blackbody field. */
const sceneOf = (shape: string, depth: number, packets: string, grid = 'kind: auto', star = '') => `
distance: 100 pc
sources:
  - {name: sky, kind: ambient, spectrum: {blackbody: ${bath} K}}
${star}
opacities:
  grey: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: 0, scattering: {albedo: 0.5, asymmetry: 0.4}}
dust:
  - {name: cloud, opacity: grey, shape: ${shape}, amount: {optical-depth: ${depth}, at: 100 um}}
grid: {${grid}}
effort: {precision: none, equilibrium: ${packets}, cameras: 1e5}
cameras: [{name: c, view: {inclination: 60 deg}, field: 210 au, pixels: 7, wavelengths: [100 um]}]
spectra: [{name: s, view: {inclination: 60 deg}, wavelengths: [100 um]}]
`
const coal = `  - {name: coal, temperature: ${bath} K, radius: 20 au, extent: sphere}`

/** Mean of T over the dust by mass, largest deviation, and chi squared a cell, of temperatures over the bath's. */
function temperatures({ model, dust }: RunResult) {
  const { density } = model.components[0]
  let [mass, sum, worst, chi, count] = [0, 0, 0, 0, 0]
  density.forEach((rho, cell) => {
    if (rho === 0) return
    const deviation = dust.temperature[cell] / bath - 1
    mass += rho * model.volume[cell]
    sum += rho * model.volume[cell] * deviation
    worst = Math.max(worst, Math.abs(deviation))
    chi += ((deviation * bath) / dust.sigma[cell]) ** 2
    count++
  })
  return { mean: sum / mass, worst, chi: chi / count }
}

/**
 * In the enclosure of a blackbody everything comes to its temperature and nothing can be seen against it (Kirchhoff's law): the light
 * of dust and star, scattered light and what is left of the field add up to B(T) along every ray.
 */
describe('dust in a bath of blackbody radiation', () => {
  const planck = planckNu(LIGHT_SPEED / 1e-2, bath)

  // Starlight is dimmed by the dust itself, all else by cells: they have to resolve it before the star.
  // The last number: what single cells may be off. In two and three dimensions they are known to 0.3 % and 0.9 % (1 sigma) at worst.
  it.each([
    ['thin shell', sceneOf(shell, 0.1, '2e5'), 0.003],
    ['thick shell', sceneOf(shell, 10, '4e5'), 0.003],
    ['shell about a star as hot', sceneOf(shell, 1, '3e5', 'kind: auto', coal), 0.003],
    ['disk in two dimensions', sceneOf(disk, 1, '4e5', 'kind: spherical, radial: 20, polar: 10'), 0.015],
    ['disk in three dimensions', sceneOf(disk, 1, '1.6e6', 'kind: spherical, radial: 16, polar: 24, azimuthal: 3', coal), 0.04]
  ])('has its temperature and is not seen: %s', async (_, text, cells) => {
    const result = await runText(text)
    const { mean, worst, chi } = temperatures(result)
    expect(Math.abs(mean)).toBeLessThan(0.003)
    expect(worst).toBeLessThan(cells)
    expect(chi).toBeLessThan(2.5)
    const { emitted, escaped, returned, kept } = result.equilibrium!.budget
    expect(Math.abs((escaped + returned + kept) / emitted - 1)).toBeLessThan(1e-11)
    const [image] = result.images
    const deficit = image.deficit!
    const away = plane(image, 'total').map((total, i) => Math.abs(total - deficit[i]))
    expect(Math.max(...deficit)).toBeLessThan(1.002 * planck)
    // Pixels that hold the rim of a disk are placed to a few per cent only; together they are far better.
    expect(sumOf(away) / sumOf(deficit)).toBeLessThan(0.01)
    if (result.model.dimensions === 1) expect(Math.max(...away)).toBeLessThan(0.004 * planck)
    const [flux] = result.spectra
    expect(flux.sigma[0]).toBeLessThan(0.004 * flux.total[0])
    expect(Math.abs(flux.total[0] - flux.deficit![0])).toBeLessThan(4.5 * flux.sigma[0] + 1e-3 * flux.deficit![0])
  })

  // Few packets come to most cells and none to some: what diffuses there counts. 3 sigma and more: 1 chance in 100 each, for cells of one
  // radius move together.
  it.each([
    [100, '3e5'],
    [1000, '6e5']
  ])('has its temperature in every cell of a ball of optical depth %d', async (depth, packets) => {
    const { model, dust } = await runText(`
distance: 100 pc
sources: [{name: sky, kind: ambient, spectrum: {blackbody: ${bath} K}}]
opacities:
  grey: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: 0, scattering: {albedo: 0.5, asymmetry: 0.4}}
dust: [{name: ball, opacity: grey, shape: {kind: ball, radius: 100 au}, amount: {optical-depth: ${depth}, at: 100 um}}]
grid: {kind: spherical, radial: 12}
effort: {precision: none, equilibrium: ${packets}}
`)
    for (let cell = 0; cell < model.cells; cell++) {
      expect(Math.abs(dust.temperature[cell] / bath - 1), `cell ${cell}`).toBeLessThan(0.003)
      expect(dust.sigma[cell], `cell ${cell}`).toBeLessThan(0.001 * bath)
    }
  })

  it.each(['peel', 'exit'] as const)('is not seen by %s either', async (estimator) => {
    const { spectra } = await runText(sceneOf(shell, 1, '5e4', 'kind: auto', coal), { estimator })
    const { total, deficit, sigma } = spectra[0]
    expect(sigma[0]).toBeLessThan(0.005 * total[0])
    expect(Math.abs(total[0] - deficit![0])).toBeLessThan(5 * sigma[0])
  })

  it('takes out of a thin field what a chord absorbs and scatters', async () => {
    const result = await runText(sceneOf(shell, 0.1, '1e4'))
    const { images, spectra } = result
    expect(resultWarnings(result)).toContainEqual(
      expect.stringMatching(/camera c: ambient light .* not subtracted: see the extension DEFICIT/)
    )
    const [image] = images
    // Through the middle of a shell, whose radius has optical depth 0.1; the middle pixel spans 0.15 of the radius.
    const middle = image.deficit![image.deficit!.length >> 1]
    expect(Math.abs(middle / (-planck * Math.expm1(-0.2)) - 1)).toBeLessThan(0.01)
    const sum = sumOf(image.deficit!) * (image.camera.field[0] / image.width) ** 2
    expect(Math.abs(spectra[0].deficit![0] / sum - 1)).toBeLessThan(2e-3)
    expect(Math.max(...image.total)).toBeGreaterThan(0)
  })
})
