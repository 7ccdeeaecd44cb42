import { describe, expect, it } from 'vitest'
import { pixelSolidAngles } from '../../src/camera/frame.js'
import type { CameraImages } from '../../src/camera/types.js'
import { azimuthalStokes } from '../../src/output/png/azimuthal-picture.js'
import { isFromPlace } from '../../src/scene/is-from-place.js'
import type { Vector } from '../../src/scene/types.js'
import { AU } from '../../src/units/constants.js'
import { plane, sumOf } from './pictures.js'
import { dot, overPixels } from './places.js'
import { runText } from './run-text.js'

const [inner, outer] = [20, 100]
const shell = `{kind: shell, inner: ${inner} au, outer: ${outer} au}`

interface Options {
  phase: string
  grid: string
  depth: number
  packets: number
  extent: string
  cameras: string
}

const sceneOf = ({ phase, grid, depth, packets, extent, cameras }: Options) => `
distance: 100 pc
seed: polarised from within
sources: [{name: star, temperature: 5000 K, luminosity: 30 Lsun, extent: ${extent}}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.6}, phase: ${phase}}
dust: [{name: dust, opacity: grains, shape: ${shell}, amount: {optical-depth: ${depth}, at: 1 um}, temperature: none}]
grid: {${grid}}
effort: {precision: none, cameras: ${packets}}
cameras:${cameras}
`

describe('starlight scattered once that an observer in the dust sees', () => {
  const cameras = `
  - {name: ahead, view: {from: [37 au, 24 au, -28 au], toward: [4 au, 9 au, 1 au], roll: 25 deg, field: 40 deg}, pixels: 16, wavelengths: [1 um]}
  - {name: axis, view: {from: [0 au, 0 au, 40 au], toward: [9 au, 5 au, 40 au], field: 40 deg}, pixels: 16, wavelengths: [1 um]}
`
  const more = `
  - {name: map, view: {from: [37 au, 24 au, -28 au], field: all-sky}, pixels: 16, wavelengths: [1 um]}
  - {name: outside, view: {from: [0 au, -170 au, 60 au], field: 35 deg, roll: 40 deg}, pixels: 5, wavelengths: [1 um]}
`

  /** Q and U over I along a line of sight through an r^-2 shell, by Rayleigh's law, summed along it (midpoint rule). */
  function polarisation(from: Vector, ahead: Vector): [i: number, q: number, u: number] {
    const steps = 200
    const along = dot(from, ahead)
    const b2 = dot(from, from) - along * along
    const reach = Math.sqrt(Math.max(0, outer * outer - b2))
    const start = Math.max(0, -along - reach)
    const step = (reach - along - start) / steps
    let [i, p] = [0, 0]
    for (let n = 0; n < steps && step > 0; n++) {
      const s = along + start + (n + 0.5) * step
      const r2 = b2 + s * s
      if (r2 < inner * inner || r2 > outer * outer) continue
      // Density and starlight fall as r^-2 each; the scattered light flies against `ahead`.
      const cos2 = (s * s) / r2
      i += ((1 + cos2) * step) / (r2 * r2)
      p += ((1 - cos2) * step) / (r2 * r2)
    }
    // The electric vector is across the plane of the star, the observer and the line of sight.
    const [x, y, z] = ahead
    const across = Math.hypot(x, y)
    const north = [(-z * x) / across, (-z * y) / across, across]
    const east = [-y / across, x / across, 0]
    const star = from.map((component) => -component)
    const [n, e] = [-dot(star, east), dot(star, north)]
    const length2 = n * n + e * e
    return [i, (p * (n * n - e * e)) / length2, (p * 2 * n * e) / length2]
  }

  it.each([
    ['one dimension', 'kind: spherical, radial: 80', cameras + more],
    ['two dimensions', 'kind: spherical, radial: 80, polar: 8', cameras],
    ['three dimensions', 'kind: spherical, radial: 80, polar: 6, azimuthal: 3', cameras]
  ])('is polarised as an integral along its line says, from the local meridian: %s', async (_, grid, seenBy) => {
    const options = { phase: 'rayleigh', grid, depth: 1e-4, packets: 500, extent: 'point', cameras: seenBy }
    const { images } = await runText(sceneOf(options))
    for (const image of images) {
      if (!isFromPlace(image.camera.view)) throw new TypeError('a place is expected')
      const from = image.camera.view.from.map((component) => component / AU) as Vector
      const expected = [0, 1, 2].map((part) => overPixels(image, (ahead) => polarisation(from, ahead)[part]))
      const scale = sumOf(plane(image, 'scattered')) / sumOf(expected[0])
      const { q, u } = image.stokes!
      image.scattered.forEach((value, pixel) => {
        const where = `${image.camera.name} ${pixel}`
        // Pixels at the inner edge of the dust or on its limb are summed coarsely here, as is the halo of the star.
        expect(Math.abs(value - scale * expected[0][pixel]), where).toBeLessThan(
          0.03 * value + 1e-3 * scale * Math.max(...expected[0])
        )
        const share = [q, u].map((plane) => plane[pixel] / (value || 1))
        expect(Math.abs(share[0] - expected[1][pixel] / (expected[0][pixel] || 1)), where).toBeLessThan(0.015)
        expect(Math.abs(share[1] - expected[2][pixel] / (expected[0][pixel] || 1)), where).toBeLessThan(0.015)
      })
      if (image.camera.name === 'outside') {
        // About the star, which is in the middle, it is across the direction to it, but for the size of pixels near to it: with another north
        // than that of the picture, which is 40 deg from it, U would be as large as Q.
        const about = azimuthalStokes(image, 0)
        const strongest = Math.max(...about.q)
        expect(strongest).toBeGreaterThan(0.1 * Math.max(...image.scattered))
        expect(Math.max(...about.u.map(Math.abs))).toBeLessThan(0.05 * strongest)
        expect(Math.min(...about.q)).toBeGreaterThan(-0.05 * strongest)
      }
      // From the axis it is all across meridians.
      const turned = image.camera.name === 'axis' ? 0 : 0.1
      expect(Math.max(...u.map(Math.abs))).toBeGreaterThanOrEqual(turned * Math.max(...q.map(Math.abs)))
    }
  })
})

describe('light scattered many times that an observer in the dust sees', () => {
  const map = `
  - {name: map, view: {from: [37 au, 24 au, -28 au], field: all-sky}, pixels: 12, wavelengths: [1 um]}
`
  const options = { depth: 1, extent: 'sphere', cameras: map }

  /** Root mean square over the sky of some values, relative to the light of another picture. */
  function overLight(values: ArrayLike<number>, { camera, scattered }: CameraImages): number {
    const angles = pixelSolidAngles(camera)
    return Math.sqrt(sumOf(Array.from(values, (value, i) => angles[i] * (value / scattered[i]) ** 2)) / (4 * Math.PI))
  }

  // In one dimension it is known by the angle to the radius, of all directions alike. Allowed beside the noise, as cells are coarse.
  it.each([
    ['two dimensions, by the law of Rayleigh', 'kind: spherical, radial: 30, polar: 16', 'rayleigh', '5e3', 0.02, 0.02],
    ['an octree, by the law of Rayleigh', 'kind: octree, finest: 5', 'rayleigh', '3e4', 0.03, 0.02],
    [
      'two dimensions, by two laws of Henyey and Greenstein',
      'kind: spherical, radial: 30, polar: 16',
      '{two-term: {first: 0.6, second: -0.2, share: 80 %}}',
      '5e3',
      0.03,
      0
    ]
  ])('is the same as in one dimension: %s', async (_, grid, phase, packets, apart, polarised) => {
    const [reference] = (await runText(sceneOf({ ...options, phase, grid: 'kind: spherical, radial: 60', packets: 2e4 }))).images
    const [image] = (await runText(sceneOf({ ...options, phase, grid, packets: Number(packets) }))).images
    const noise = overLight(image.sigma, reference)
    expect(noise).toBeLessThan(0.1)
    const difference = (one: Float64Array, other: Float64Array) =>
      overLight(
        one.map((value, i) => value - other[i]),
        reference
      )
    expect(difference(image.scattered, reference.scattered)).toBeLessThan(apart + 1.5 * noise)
    if (!polarised) {
      expect(image.stokes).toBeUndefined()
      return
    }
    for (const part of ['q', 'u'] as const) {
      const sigma = overLight(image.stokes![part === 'q' ? 'sigmaQ' : 'sigmaU'], reference)
      expect(sigma).toBeLessThan(0.04)
      expect(difference(image.stokes![part], reference.stokes![part]), part).toBeLessThan(polarised + 1.5 * sigma)
      expect(overLight(reference.stokes![part], reference)).toBeGreaterThan(0.2)
    }
  })
})
