import { describe, expect, it } from 'vitest'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

describe('a perspective picture from far away', () => {
  const far = 4e5
  const half = 110
  const views = [
    [60, 130, 25],
    [115, -40, 0]
  ]
  const degree = Math.PI / 180
  const placeAt = ([inclination, azimuth]: number[]) => {
    const [i, a] = [inclination * degree, -azimuth * degree]
    return [Math.sin(i) * Math.cos(a), Math.sin(i) * Math.sin(a), Math.cos(i)]
      .map((component) => `${far * component} au`)
      .join(', ')
  }
  const sceneOf = (shape: string, extent: string, grid: string) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 30 Lsun, extent: ${extent}}]
opacities: {grains: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.6, asymmetry: 0.5}}}
dust:
  - {name: dust, opacity: grains, shape: ${shape}, amount: {optical-depth: 3, at: 1 um}, temperature: 50 K}
grid: {${grid}}
effort: {precision: none, cameras: 1e4}
cameras:
${views
  .map(
    (view, n) => `
  - {name: far${n}, view: {inclination: ${view[0]} deg, azimuth: ${view[1]} deg, roll: ${view[2]} deg}, field: ${2 * half} au, pixels: 11, wavelengths: [1 um, 100 um]}
  - {name: place${n}, view: {from: [${placeAt(view)}], field: ${(2 * Math.atan(half / far)) / degree} deg, roll: ${view[2]} deg}, pixels: 11, wavelengths: [1 um, 100 um]}`
  )
  .join('')}
`

  it.each([
    ['a shell', '{kind: shell, inner: 20 au, outer: 100 au}', 'point', 'kind: auto'],
    [
      'a disk',
      '{kind: disk, inner: 20 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}}',
      'sphere',
      'kind: spherical, radial: 24, polar: 12'
    ],
    ['a shell of cubes', '{kind: shell, inner: 20 au, outer: 100 au}', 'point', 'kind: octree, finest: 5']
  ])('is that along parallel lines, pixel by pixel: %s', async (_, shape, extent, grid) => {
    const { images } = await runText(sceneOf(shape, extent, grid))
    views.forEach((_, n) => {
      const [parallel, perspective] = [images[2 * n], images[2 * n + 1]]
      for (const k of [0, 1]) {
        const [one, other, sigma] = [plane(parallel, 'total', k), plane(perspective, 'total', k), plane(parallel, 'sigma', k)]
        const bright = 1e-3 * (sumOf(one) / one.length)
        // Rays are placed to three times a tenth of 1 % in a pixel, at sharp edges of cells not so well.
        let well = 0
        one.forEach((value, i) => {
          if (value < bright) return
          expect(Math.abs(other[i] - value), `view ${n}, ${k}, pixel ${i}`).toBeLessThan(0.03 * value + 4 * sigma[i])
          if (Math.abs(other[i] - value) < 0.005 * value + sigma[i]) well++
        })
        expect(well).toBeGreaterThan(0.9 * one.filter((value) => value >= bright).length)
        expect(Math.abs(sumOf(other) / sumOf(one) - 1)).toBeLessThan(0.002)
      }
    })
  })
})
