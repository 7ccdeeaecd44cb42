import { describe, expect, it } from 'vitest'
import { STOKES_PAIRS } from '../../src/camera/stokes-planes.js'
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
  const disk = '{kind: disk, inner: 20 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}}'
  const placeAt = ([inclination, azimuth]: number[]) => {
    const [i, a] = [inclination * degree, -azimuth * degree]
    return [Math.sin(i) * Math.cos(a), Math.sin(i) * Math.sin(a), Math.cos(i)]
      .map((component) => `${far * component} au`)
      .join(', ')
  }
  const sceneOf = (shape: string, extent: string, grid: string, directions = views) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 30 Lsun, extent: ${extent}}]
opacities: {grains: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.6, asymmetry: 0.5}}}
dust:
  - {name: dust, opacity: grains, shape: ${shape}, amount: {optical-depth: 3, at: 1 um}, temperature: 50 K}
grid: {${grid}}
effort: {precision: none, cameras: 1e4}
cameras:
${directions
  .map(
    (view, n) => `
  - {name: far${n}, view: {inclination: ${view[0]} deg, azimuth: ${view[1]} deg, roll: ${view[2]} deg}, field: ${2 * half} au, pixels: 11, wavelengths: [1 um, 100 um]}
  - {name: place${n}, view: {from: [${placeAt(view)}], field: ${(2 * Math.atan(half / far)) / degree} deg, roll: ${view[2]} deg}, pixels: 11, wavelengths: [1 um, 100 um]}`
  )
  .join('')}
`

  it.each([
    ['a shell', '{kind: shell, inner: 20 au, outer: 100 au}', 'point', 'kind: auto'],
    ['a disk', disk, 'sphere', 'kind: spherical, radial: 24, polar: 12'],
    ['a shell of cubes', '{kind: shell, inner: 20 au, outer: 100 au}', 'point', 'kind: octree, finest: 5']
  ])('is that along parallel lines, pixel by pixel: %s', async (_, shape, extent, grid) => {
    const { images } = await runText(sceneOf(shape, extent, grid))
    views.forEach((_, n) => {
      const [parallel, perspective] = [images[2 * n], images[2 * n + 1]]
      for (const k of [0, 1]) {
        const [one, other] = [plane(parallel, 'total', k), plane(perspective, 'total', k)]
        const [sigma, others] = [plane(parallel, 'sigma', k), plane(perspective, 'sigma', k)]
        const bright = 1e-3 * (sumOf(one) / one.length)
        // Rays are placed to three times a tenth of 1 % in a pixel, at sharp edges of cells not so well. Below the midplane of two-dimensional
        // cells the two are made of different packets.
        let well = 0
        one.forEach((value, i) => {
          if (value < bright) return
          expect(Math.abs(other[i] - value), `view ${n}, ${k}, pixel ${i}`).toBeLessThan(0.03 * value + 4 * sigma[i])
          if (Math.abs(other[i] - value) < 0.005 * value + 2 * Math.hypot(sigma[i], others[i])) well++
        })
        expect(well).toBeGreaterThan(0.9 * one.filter((value) => value >= bright).length)
        expect(Math.abs(sumOf(other) / sumOf(one) - 1)).toBeLessThan(0.002)
      }
    })
  })

  // Without a roll the meridian of the observer is up in both pictures.
  it.each([
    ['two dimensions', 'kind: spherical, radial: 16, polar: 10', '3e3'],
    ['three dimensions', 'kind: spherical, radial: 10, polar: 8, azimuthal: 8', '4e3']
  ])('is polarised as that along parallel lines: %s', async (_, grid, packets) => {
    const angles = [57, 123].map((inclination) => [inclination, 130, 0])
    const scene = sceneOf(disk, 'sphere', grid, angles)
      .replace('asymmetry: 0.5}', 'asymmetry: 0.5}, phase: {table: circling.csv}')
      .replace('cameras: 1e4', `cameras: ${packets}`)
      .replaceAll('pixels: 11, wavelengths: [1 um, 100 um]', 'pixels: 5, wavelengths: [1 um]')
    const { images } = await runText(scene)
    angles.forEach((_, n) => {
      const [parallel, perspective] = [images[2 * n], images[2 * n + 1]]
      const total = plane(parallel, 'total')
      const bright = 1e-3 * (sumOf(total) / total.length)
      for (const [part, sigma] of STOKES_PAIRS) {
        const [one, other] = [parallel.stokes![part], perspective.stokes![part]]
        let strongest = 0
        let well = 0
        const lit = total.filter((value) => value >= bright).length
        total.forEach((value, i) => {
          if (value < bright) return
          // The packets are the same; those of a mirror image are others.
          const noise = n === 1 ? Math.hypot(parallel.stokes![sigma][i], perspective.stokes![sigma][i]) : 0
          // As with the intensity: at sharp edges of cells rays are placed not so well.
          const apart = Math.abs(other[i] - one[i])
          expect(apart, `${n} ${part} ${i}`).toBeLessThan(0.03 * value + 4.5 * noise)
          if (apart < 0.005 * value + noise) well++
          strongest = Math.max(strongest, Math.abs(one[i]) / value)
        })
        expect(well).toBeGreaterThan(0.8 * lit)
        expect(strongest).toBeGreaterThan(part === 'v' ? 0.005 : 0.2)
      }
    })
  })
})
