import { expect, it } from 'vitest'
import type { CameraImages } from '../../src/camera/types.js'
import { standardError } from '../../src/math/stats.js'
import { cellRadii } from '../../src/run/dust-cells.js'
import type { RunResult } from '../../src/run/run-result.js'
import { GROUPS } from '../../src/solve/groups.js'
import { AU } from '../../src/units/constants.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

const scene = (shape: string, depth: number, grid: string) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 10 Lsun}]
opacities: {soot: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.4}}}
dust: [{name: dust, opacity: soot, shape: ${shape}, amount: {optical-depth: ${depth}, at: 1 um}}]
grid: ${grid}
effort: {precision: none, equilibrium: 6e5, cameras: 6e4}
spectra: [{name: all, view: {inclination: 50 deg}, wavelengths: [1 um, 30 um, 100 um]}]
cameras: [{name: c, view: {inclination: 50 deg}, field: 200 au, pixels: 15, wavelengths: [1 um, 30 um]}]
`

/** Mean temperatures, by mass, between radii (au), and their 1 sigma. */
function meanTemperatures({ model, dust }: RunResult, radii: number[]): { value: number; sigma: number }[] {
  const r = cellRadii(model)
  const [{ density }] = model.components
  return radii.slice(1).map((to, k) => {
    let [sum, weights] = [0, 0]
    const groups = new Float64Array(GROUPS)
    for (let cell = 0; cell < model.cells; cell++) {
      if (r[cell] < radii[k] * AU || r[cell] >= to * AU || !(dust.temperature[cell] > 0)) continue
      const mass = model.volume[cell] * density[cell]
      sum += mass * dust.temperature[cell]
      weights += mass
      // A relative change of what is absorbed changes T by T / slope times it.
      const response = (mass * dust.temperature[cell]) / dust.slope[cell]
      for (let g = 0; g < GROUPS; g++) groups[g] += response * dust.deviation[cell * GROUPS + g]
    }
    return { value: sum / weights, sigma: standardError(groups) / weights }
  })
}

/** Median relative difference over the pixels that hold 95 % of the light of the dust, and the median 1 sigma of both there. */
function apart(one: CameraImages, other: CameraImages, k: number): { median: number; sigma: number } {
  const dust = (images: CameraImages) => plane(images, 'emitted', k).map((value, i) => value + plane(images, 'scattered', k)[i])
  const [a, b] = [dust(one), dust(other)]
  const brightest = Array.from(a.keys()).sort((i, j) => a[j] - a[i])
  let held = 0
  const pixels = brightest.filter((i) => {
    held += a[i]
    return held - a[i] <= 0.95 * sumOf(a)
  })
  const median = (value: (i: number) => number) => pixels.map(value).sort((p, q) => p - q)[pixels.length >> 1]
  return {
    median: median((i) => Math.abs(b[i] / a[i] - 1)),
    sigma: median((i) => Math.hypot(plane(one, 'sigma', k)[i], plane(other, 'sigma', k)[i]) / a[i])
  }
}

const disk =
  '{kind: disk, inner: 10 au, outer: 100 au, surface-slope: -1, scale-height: {value: 15 au, at: 100 au, flaring: 1.15}}'

it.each([
  ['shell', '{kind: shell, inner: 10 au, outer: 100 au, slope: -1.5}', 1, '{kind: spherical, radial: 150}'],
  ['disk', disk, 3, '{kind: spherical, radial: 100, polar: 50}']
])('a %s in cubes has the temperatures, pictures and fluxes that it has in spherical cells', async (_, shape, depth, grid) => {
  const round = await runText(scene(shape, depth, grid))
  const cubes = await runText(scene(shape, depth, '{kind: octree, cells-at-most: 8e4}'))
  const radii = [12, 20, 30, 45, 65, 90]
  const expected = meanTemperatures(round, radii)
  // 1 % where resolved, and 4 sigma of both runs, which fails by chance once in 16000.
  for (const [k, { value, sigma }] of meanTemperatures(cubes, radii).entries()) {
    const noise = Math.hypot(sigma, expected[k].sigma) / expected[k].value
    expect(noise).toBeLessThan(0.01)
    expect(Math.abs(value / expected[k].value - 1)).toBeLessThan(0.01 + 4 * noise)
  }
  const [all] = round.spectra
  const [seen] = cubes.spectra
  for (const k of all.spectrum.wavelengths.keys()) {
    const [flux, other] = [all, seen].map(({ emitted, scattered }) => emitted[k] + scattered[k])
    // 0.5 %, and 4 sigma of both runs, which fails by chance once in 16000.
    expect(Math.abs(other / flux - 1)).toBeLessThan(0.005 + (4 * Math.hypot(all.sigma[k], seen.sigma[k])) / flux)
  }
  for (const k of [0, 1]) {
    const { median, sigma } = apart(round.images[0], cubes.images[0], k)
    // Half of all differences by noise alone are below 0.67 sigma.
    expect(median).toBeLessThan(Math.hypot(0.015, 0.67 * sigma))
  }
})
