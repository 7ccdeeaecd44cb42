import { expect, it } from 'vitest'
import { takePicture } from '../../src/observe/picture.js'
import { type CameraSource, openRun } from '../../src/observe/run-source.js'
import { modelVisibilities } from '../../src/observe/visibilities.js'
import { cameraFits } from '../../src/output/fits/camera-fits.js'
import { ARCSECOND } from '../../src/units/angles.js'
import { runText } from '../physics/run-text.js'
import { folderWith } from '../support/folder-with.js'
import { pictureSpec } from './sources.js'

const SEEDS = 20

const sceneOf = (seed: number) => `
distance: 60 pc
seed: ${seed}
sources: [{name: star, temperature: 4000 K, luminosity: 20 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.6, asymmetry: 0.3}}
dust:
  - name: disk
    opacity: grains
    shape: {kind: disk, inner: 10 au, outer: 80 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}}
    amount: {optical-depth: 20, at: 1 um}
grid: {kind: spherical, radial: 16, polar: 10}
effort: {precision: none, equilibrium: 1e4, cameras: 2e3}
cameras:
  - {name: c, view: {inclination: 50 deg}, field: 160 au, pixels: 16, wavelengths: [1.6 um, 1.7 um, 60 um]}
`

async function sourceOf(seed: number): Promise<CameraSource> {
  const { images, model } = await runText(sceneOf(seed), { workers: 1 })
  const record = JSON.stringify({ program: 'motelight', state: 'done', files: ['images/c.fits'] })
  return openRun(folderWith({ 'run.json': record, 'images/c.fits': cameraFits(images[0], model.scene) })).camera('c')!
}

interface Measured {
  values: Float64Array
  sigma: Float64Array
}

/** Root mean square scatter of values over seeds, over the root mean square of the 1 sigma stated. */
function scatterOverSigma(runs: Measured[]): number {
  let [scatter, stated] = [0, 0]
  runs[0].values.forEach((_, i) => {
    const mean = runs.reduce((sum, { values }) => sum + values[i], 0) / runs.length
    scatter += runs.reduce((sum, { values }) => sum + (values[i] - mean) ** 2, 0) / (runs.length - 1)
    stated += runs.reduce((sum, { sigma }) => sum + sigma[i] ** 2, 0) / runs.length
  })
  return Math.sqrt(scatter / stated)
}

/**
 * Of 20 seeds a variance is known to sqrt(2 / 19) = 32 % where all values move together, better where they do not: the ratio lies within
 * 1 +- 0.4 but for 1 time in 80. As an upper limit, without its modes, 1 sigma is 1.6 to 2.2 times as large.
 */
it('the 1 sigma stated behind a beam, in larger pixels, in a band and of visibilities is what seeds show', async () => {
  const sources: CameraSource[] = []
  for (let seed = 1; seed <= SEEDS; seed++) sources.push(await sourceOf(seed))
  const beam = { kind: 'gaussian' as const, major: 0.6 * ARCSECOND, minor: 0.6 * ARCSECOND, positionAngle: 0 }
  const at = (...weights: number[]) => ({
    weights: Float64Array.from(weights),
    coarse: Float64Array.from(weights),
    wavelength: 1e-4
  })
  const seen = (change: object, weights: ReturnType<typeof at>, of = sources) =>
    scatterOverSigma(
      of.map((source) => {
        const { expected, sigma } = takePicture(pictureSpec(change), source, weights, '')
        return { values: expected, sigma }
      })
    )
  // Baselines, cm, that resolve two pixels of the camera at most.
  const visible = (weights: ReturnType<typeof at>, longest: number) =>
    scatterOverSigma(
      sources.map((source) => {
        const baselines: [number, number][] = [0, 0.3, 0.6].map((share) => [share * longest, 0.5 * longest])
        const { expected, sigma } = modelVisibilities(baselines, source, weights.weights)
        return { values: expected.re, sigma }
      })
    )
  const ratios = {
    'pixels at 1.6 um': seen({}, at(1, 0, 0)),
    'pixels at 60 um': seen({}, at(0, 0, 1)),
    'beam at 1.6 um': seen({ beam }, at(1, 0, 0)),
    'beam at 60 um': seen({ beam }, at(0, 0, 1)),
    'larger pixels': seen({ pixel: [0.5 * ARCSECOND, 0.5 * ARCSECOND] }, at(1, 0, 0)),
    band: seen({ beam }, at(0.5, 0.5, 0)),
    'visibilities at 1.6 um': visible(at(1, 0, 0), 50),
    'visibilities at 60 um': visible(at(0, 0, 1), 1900)
  }
  for (const [name, ratio] of Object.entries(ratios)) {
    expect(ratio, name).toBeGreaterThan(0.6)
    expect(ratio, name).toBeLessThan(1.4)
  }
  const without = sources.map(({ modes: _, ...source }) => source)
  expect(seen({ beam }, at(1, 0, 0), without)).toBeLessThan(0.75 * ratios['beam at 1.6 um'])
}, 300_000)
