import { parseScene } from '../../src/scene/read.js'
import type { Scene } from '../../src/scene/types.js'

const shell = 'shape: {kind: shell, inner: 2 au, outer: 60 au}, amount: {optical-depth: 3, at: 1 um}'
const disk =
  'shape: {kind: disk, inner: 2 au, outer: 60 au, scale-height: {value: 5 au, at: 60 au, flaring: 1.2}}, amount: {optical-depth: 20, at: 1 um}'

/** Its inner radius is found from a temperature, and other dust sublimates. */
const fittedDust = `shape: {kind: shell, inner: {temperature: 300 K}, outer: {times-inner: 20}}, amount: {optical-depth: 3, at: 1 um}}
  - {name: more, opacity: grains, shape: {kind: ball, radius: 9 au}, amount: {optical-depth: 0.1, at: 1 um}, sublimation: 900 K`

const textOf = (dust: string, grid: string, effort: string, phase = 'henyey-greenstein') => `
distance: 100 pc
seed: small
sources: [{name: star, temperature: 4000 K, luminosity: 50 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 1, scattering: {albedo: 0.4, asymmetry: 0.3}, phase: ${phase}}
dust:
  - {name: main, opacity: grains, ${dust}}
grid: ${grid}
effort: ${effort}
cameras:
  - {name: c, view: {inclination: 50 deg}, field: 120 au, pixels: [4, 20], wavelengths: [2 um, 20 um]}
spectra:
  - {name: s, view: {inclination: 50 deg}, wavelengths: [2 um, 20 um]}
`
const fixed = '{precision: none, equilibrium: 5000, cameras: 1500}'

/** Scenes that run in well under a second. */
export const smallScenes: Record<'shell' | 'disk' | 'precise' | 'fitted' | 'polarised', string> = {
  shell: textOf(shell, '{kind: spherical, radial: 15}', fixed),
  disk: textOf(disk, '{kind: spherical, radial: 8, polar: 6}', fixed),
  fitted: textOf(fittedDust, '{kind: spherical, radial: 15}', fixed).replace(
    'sources: [',
    'sources: [{name: sky, kind: ambient, spectrum: interstellar, strength: 1000}, '
  ),
  precise: textOf(shell, '{kind: spherical, radial: 15}', '{precision: 5 %, equilibrium: 1e5, cameras: 5e4}'),
  polarised: textOf(`${disk}, temperature: none`, '{kind: spherical, radial: 8, polar: 6}', fixed, 'rayleigh')
}

export function smallScene(kind: keyof typeof smallScenes): Scene {
  return parseScene(smallScenes[kind], 'scene.yaml')
}
