import { createHash } from 'node:crypto'
import { describe, expect, it } from 'vitest'
import { STOKES } from '../../src/camera/stokes-planes.js'
import type { RunResult } from '../../src/run/run-result.js'
import { runText } from './run-text.js'

const shell = 'shape: {kind: shell, inner: 2 au, outer: 60 au}, amount: {optical-depth: 3, at: 1 um}'
const disk =
  'shape: {kind: disk, inner: 2 au, outer: 60 au, scale-height: {value: 5 au, at: 60 au, flaring: 1.2}}, amount: {optical-depth: 20, at: 1 um}'

const sceneOf = (dust: string, grid: string, effort: string, seed = 'bits', phase = 'henyey-greenstein') => `
distance: 100 pc
seed: ${seed}
sources: [{name: star, temperature: 4000 K, luminosity: 50 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.4, asymmetry: 0.3}, phase: ${phase}}
dust:
  - {name: main, opacity: grains, ${dust}}
grid: ${grid}
effort: ${effort}
cameras:
  - {name: c, view: {inclination: 50 deg}, field: 120 au, pixels: 4, wavelengths: [2 um, 20 um]}
spectra:
  - {name: s, view: {inclination: 50 deg}, wavelengths: [2 um, 20 um]}
`

/** A digest of every number that a user gets. */
function digest({ dust, images, spectra, lightPackets }: RunResult): string {
  const hash = createHash('sha256')
  const add = (values: Float64Array) => hash.update(new Uint8Array(values.buffer, values.byteOffset, values.byteLength))
  add(dust.temperature)
  add(dust.sigma)
  for (const product of [...images, ...spectra]) {
    for (const part of ['total', 'sigma', 'direct', 'emitted', 'scattered'] as const) add(product[part])
    for (const part of STOKES) if (product.stokes) add(product.stokes[part])
    add(Float64Array.from(product.samplingError))
  }
  add(Float64Array.from(lightPackets, ({ packets }) => packets))
  return hash.digest('hex')
}

const fixed = '{precision: none, equilibrium: 2e4, cameras: 5e3}'
const few = '{precision: none, cameras: 2e3}'
const cases: [string, string, 'emissivity' | 'peel' | 'exit'][] = [
  ['shell, temperatures solved', sceneOf(shell, '{kind: auto}', fixed), 'emissivity'],
  [
    'shell, rounds until a precision',
    sceneOf(shell, '{kind: auto}', '{precision: 3 %, equilibrium: 1e5, cameras: 5e4}'),
    'emissivity'
  ],
  ['disk, temperatures solved', sceneOf(disk, '{kind: spherical, radial: 30, polar: 20}', fixed), 'emissivity'],
  ['disk, three dimensions', sceneOf(disk, '{kind: spherical, radial: 15, polar: 10, azimuthal: 4}', fixed), 'emissivity'],
  ['disk, cubes', sceneOf(`${disk}, temperature: none`, '{kind: octree, cells-at-most: 3000}', few), 'emissivity'],
  ['shell, peel-off', sceneOf(shell, '{kind: auto}', fixed), 'peel'],
  ['shell, polarised', sceneOf(`${shell}, temperature: none`, '{kind: auto}', few, 'bits', 'rayleigh'), 'emissivity'],
  [
    'disk, polarised',
    sceneOf(`${disk}, temperature: none`, '{kind: spherical, radial: 15, polar: 10}', few, 'bits', 'rayleigh'),
    'emissivity'
  ],
  ['shell, polarised, peel-off', sceneOf(`${shell}, temperature: none`, '{kind: auto}', few, 'bits', 'rayleigh'), 'peel'],
  ['shell, exit bins', sceneOf(shell, '{kind: auto}', fixed), 'exit']
]

describe('same seed, same bits', () => {
  it.each(cases)('with 1, 2, 3 and 8 workers: %s', async (_, text, estimator) => {
    const one = digest(await runText(text, { workers: 1, estimator }))
    for (const workers of [2, 3, 8]) expect(digest(await runText(text, { workers, estimator })), `${workers} workers`).toBe(one)
  })

  it('another seed gives other bits', async () => {
    const [one, other] = await Promise.all(['a', 'b'].map((seed) => runText(sceneOf(shell, '{kind: auto}', fixed, seed))))
    expect(digest(one)).not.toBe(digest(other))
  })
})
