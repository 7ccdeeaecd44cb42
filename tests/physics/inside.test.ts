import { describe, expect, it } from 'vitest'
import { pixelSolidAngles } from '../../src/camera/frame.js'
import { planckNu } from '../../src/dust/planck.js'
import { isFromPlace } from '../../src/scene/is-from-place.js'
import { AU, LIGHT_SPEED, STEFAN_BOLTZMANN } from '../../src/units/constants.js'
import { plane, radialTemperatures, sumOf } from './pictures.js'
import { dot, overPixels, overSky } from './places.js'
import { runText } from './run-text.js'

describe('an observer in an isothermal ball that does not scatter', () => {
  const radius = 100
  const temperature = 60
  const planck = planckNu(LIGHT_SPEED / 1e-2, temperature)
  const depth = 1.5
  const sceneOf = (grid: string) => `
distance: 100 pc
opacities: {grey: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: 0}}
dust:
  - {name: ball, opacity: grey, shape: {kind: ball, radius: ${radius} au}, amount: {optical-depth: ${depth}, at: 100 um}, temperature: ${temperature} K}
grid: {${grid}}
cameras:
  - {name: centre, view: {from: [0 au, 0 au, 0 au], field: all-sky}, pixels: 24, wavelengths: [100 um]}
  - {name: ahead, view: {from: [0 au, 0 au, 0 au], toward: [1 au, 2 au, 2 au], field: 90 deg}, pixels: 12, wavelengths: [100 um]}
  - {name: off, view: {from: [30 au, -40 au, 20 au], field: all-sky}, pixels: 24, wavelengths: [100 um]}
  - {name: past, view: {from: [30 au, -40 au, 20 au], toward: [50 au, 10 au, 60 au], field: [100 deg, 60 deg], roll: 35 deg}, pixels: 20, wavelengths: [100 um]}
  - {name: outside, view: {from: [130 au, -60 au, 90 au], toward: [20 au, 0 au, 10 au], field: 80 deg}, pixels: 20, wavelengths: [100 um]}
`

  // Path through a sphere from a point (textbook): -(p u) + sqrt(R2 - p2 + (p u)2), and I = B (1 - exp(-tau)) along it.
  it.each([
    ['one dimension', 'kind: spherical', 2e-3],
    ['three dimensions', 'kind: spherical, radial: 20, polar: 8, azimuthal: 5', 2e-3],
    // Cubes at the edge of the ball are filled in part.
    ['an octree', 'kind: octree, width: 210 au, finest: 5', 0.03]
  ])('sees what a line through the ball emits: %s', async (_, grid, allowed) => {
    const { images } = await runText(sceneOf(grid))
    for (const picture of images) {
      const { view } = picture.camera
      if (!isFromPlace(view)) throw new TypeError('a place is expected')
      const from = view.from.map((component) => component / AU / radius)
      const inside = dot(from, from) < 1
      const total = plane(picture, 'total')
      const expected = overPixels(picture, (direction) => {
        const along = dot(from, direction)
        const half = Math.sqrt(Math.max(0, 1 - dot(from, from) + along * along))
        return -Math.expm1(-depth * (inside ? half - along : along < 0 ? 2 * half : 0))
      })
      const apart = expected.map((value, i) => Math.abs(total[i] / planck - value))
      // The limb of the ball is a sharp edge, among cubes a ragged one.
      if (inside) expect(Math.max(...apart), picture.camera.name).toBeLessThan(allowed)
      expect(sumOf(apart) / apart.length, picture.camera.name).toBeLessThan(allowed / (inside ? 2 : 1))
    }
    expect(overSky(images[0], 'total') / (4 * Math.PI * planck)).toBeCloseTo(-Math.expm1(-depth), grid.includes('octree') ? 2 : 4)
  })
})

const shell = '{kind: shell, inner: 20 au, outer: 100 au}'
const disk = '{kind: disk, inner: 20 au, outer: 100 au, scale-height: {value: 20 au, at: 100 au, flaring: 1.2}}'

describe('scattered light that an observer in the dust sees', () => {
  const bath = 50
  const planck = planckNu(LIGHT_SPEED / 1e-2, bath)

  // In the enclosure of a blackbody everything has its temperature, and I = B(T) along every line (Kirchhoff's law).
  it.each([
    ['a disk in two dimensions', disk, 'kind: spherical, radial: 16, polar: 10', '1e4'],
    ['an octree', shell, 'kind: octree, finest: 4', '1e5']
  ])('is a part of the same blackbody in all directions: %s', async (_, shape, grid, packets) => {
    const { images } = await runText(`
distance: 100 pc
sources: [{name: sky, kind: ambient, spectrum: {blackbody: ${bath} K}}]
opacities: {grey: {law: power, reference: {wavelength: 100 um, absorption: 10 cm2/g}, slope: 0, scattering: {albedo: 0.5, asymmetry: 0.4}}}
dust: [{name: cloud, opacity: grey, shape: ${shape}, amount: {optical-depth: 2, at: 100 um}, temperature: ${bath} K}]
grid: {${grid}}
effort: {precision: none, cameras: ${packets}}
cameras:
  - {name: map, view: {from: [-30 au, 35 au, 8 au], field: all-sky}, pixels: 12, wavelengths: [100 um]}
  - {name: ahead, view: {from: [-30 au, 35 au, 8 au], toward: [9 au, 80 au, -20 au], field: 100 deg}, pixels: 6, wavelengths: [100 um]}
`)
    for (const image of images) {
      const left = plane(image, 'total').map((total, i) => (total + planck - image.deficit![i]) / planck)
      const sigma = plane(image, 'sigma')
      left.forEach((value, i) => {
        expect(Math.abs(value - 1), `${image.camera.name} ${i}`).toBeLessThan((5 * sigma[i]) / planck + 0.003)
      })
      // The noise of pixels is much the same in all.
      const noise = sumOf(sigma) / sigma.length / planck
      expect(noise).toBeLessThan(0.015)
      expect(Math.abs(sumOf(left) / left.length - 1)).toBeLessThan(4 * noise + 0.002)
      expect(Math.max(...plane(image, 'scattered'))).toBeGreaterThan(0.2 * planck)
    }
  })

  // In one dimension it is known by the angle to the radius, of all directions alike. Allowed beside the noise (rms over the sky), and in the mean.
  it.each([
    ['two dimensions', 'kind: spherical, radial: 30, polar: 10', '1e4', 0.03, 0.008],
    ['three dimensions', 'kind: spherical, radial: 20, polar: 8, azimuthal: 12', '5e4', 0.07, 0.03],
    ['an octree', 'kind: octree, finest: 5', '1e5', 0.07, 0.04]
  ])('is the same as in one dimension: %s', async (_, grid, packets, apart, mean) => {
    const sceneOf = (cells: string, count: string) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 30 Lsun, extent: sphere}]
opacities: {grains: {law: power, reference: {wavelength: 1 um, absorption: 1000 cm2/g}, slope: 1, scattering: {albedo: 0.6, asymmetry: 0.5}}}
dust: [{name: dust, opacity: grains, shape: ${shell}, amount: {optical-depth: 1, at: 1 um}, temperature: none}]
grid: {${cells}}
effort: {precision: none, cameras: ${count}}
cameras:
  - {name: map, view: {from: [37 au, 24 au, -28 au], field: all-sky}, pixels: 12, wavelengths: [1 um]}
`
    const [reference] = (await runText(sceneOf('kind: spherical, radial: 60', '5e4'))).images
    const [image] = (await runText(sceneOf(grid, packets))).images
    const angles = pixelSolidAngles(image.camera)
    const overReference = (values: Float64Array) =>
      Math.sqrt(sumOf(values.map((value, i) => angles[i] * (value / reference.scattered[i]) ** 2)) / (4 * Math.PI))
    const noise = overReference(image.sigma)
    expect(noise).toBeLessThan(0.1)
    expect(overReference(image.scattered.map((value, i) => value - reference.scattered[i]))).toBeLessThan(apart + 1.5 * noise)
    expect(Math.abs(overSky(image, 'scattered') / overSky(reference, 'scattered') - 1)).toBeLessThan(mean)
    // Forward and backward differ by more than ten times, so that a mean over directions would be seen.
    expect(Math.max(...image.scattered)).toBeGreaterThan(10 * Math.min(...image.scattered))
  })
})

describe('the map of all directions', () => {
  // Dust takes in what it gives off: of grey dust, the intensity over all directions and frequencies is 4 sigma T^4.
  it('holds the light that heats the dust there', async () => {
    const result = await runText(`
distance: 100 pc
sources: [{name: star, temperature: 4000 K, luminosity: 30 Lsun}]
opacities: {grey: {law: power, reference: {wavelength: 1 um, absorption: 500 cm2/g}, slope: 0, scattering: {albedo: 0.4, asymmetry: 0.5}}}
dust: [{name: dust, opacity: grey, shape: ${shell}, amount: {optical-depth: 3, at: 1 um}}]
grid: {kind: spherical, radial: 60}
effort: {precision: none, equilibrium: 1e5, cameras: 4e3}
cameras:
  - {name: map, view: {from: [20 au, -24 au, 30 au], field: all-sky}, pixels: 12, wavelengths: {from: 0.2 um, to: 2 mm, count: 32}}
`)
    const [image] = result.images
    const nu = image.camera.wavelengths.map((wavelength) => LIGHT_SPEED / wavelength)
    const perLog = nu.map((value, k) => value * overSky(image, 'total', k))
    const step = Math.log(nu[0] / nu[1])
    const all = step * (sumOf(perLog) - 0.5 * (perLog[0] + perLog[nu.length - 1]))
    const radius = Math.hypot(20, 24, 30) * AU
    const cells = radialTemperatures(result)
    const next = cells.findIndex(({ r }) => r > radius)
    const share = Math.log(radius / cells[next - 1].r) / Math.log(cells[next].r / cells[next - 1].r)
    const temperature = cells[next - 1].temperature ** (1 - share) * cells[next].temperature ** share
    expect(cells[next].sigma / temperature).toBeLessThan(0.002)
    expect(Math.abs(all / (4 * STEFAN_BOLTZMANN * temperature ** 4) - 1)).toBeLessThan(0.015)
  })

  it('holds stars: their flux at their distance, and a disk as large as its angle, at the poles too', async () => {
    const { images, model } = await runText(`
distance: 100 pc
sources:
  - {name: near, temperature: 4000 K, radius: 30 Rsun, extent: sphere, at: [1 au, 2 au, 3 au]}
  - {name: far, temperature: 6000 K, luminosity: 3 Lsun, at: [-40 au, 20 au, 5 au]}
cameras:
  - {name: map, view: {from: [1 au, 2.5 au, 3.2 au], field: all-sky}, pixels: 90, wavelengths: [1 um]}
  - {name: pole, view: {from: [1 au, 2 au, 3.6 au], field: all-sky}, pixels: 90, wavelengths: [1 um]}
  - {name: above, view: {from: [-40 au, 20 au, 9 au], field: all-sky}, pixels: 30, wavelengths: [1 um]}
  - {name: away, view: {from: [1 au, 2.5 au, 3.2 au], toward: [-40 au, 20 au, 5 au], field: 40 deg}, pixels: 20, wavelengths: [1 um]}
`)
    const [near, far] = model.stars
    const frequency = LIGHT_SPEED / 1e-4
    const flux = (away: number) => far.spectrum.luminosityNu(frequency) / (4 * Math.PI * (away * AU) ** 2)
    // A sphere that is equally bright all over covers 2 pi (1 - cos(asin(R / d))) (geometry).
    const covered = (away: number) => 2 * Math.PI * (1 - Math.sqrt(1 - (near.spec.radius! / (away * AU)) ** 2))
    const bright = planckNu(frequency, 4000)
    const close = bright * covered(Math.hypot(0.5, 0.2))
    expect(overSky(images[0], 'direct') / (close + flux(Math.hypot(41, 17.5, 1.8)))).toBeCloseTo(1, 2)
    expect(Math.max(...plane(images[0], 'direct')) / bright).toBeCloseTo(1, 6)
    expect(overSky(images[1], 'direct') / (bright * covered(0.6))).toBeCloseTo(1, 2)
    // Straight below, every pixel of the lowest row holds as much of it.
    const lowest = plane(images[2], 'direct').subarray(0, 30)
    expect(Math.min(...lowest) / Math.max(...lowest)).toBeCloseTo(1, 12)
    expect(overSky(images[2], 'direct') / (flux(4) + bright * covered(Math.hypot(41, 18, 6)))).toBeCloseTo(1, 4)
    // What is behind a perspective picture is not in it.
    expect(overSky(images[3], 'direct') / flux(Math.hypot(41, 17.5, 1.8))).toBeCloseTo(1, 6)
  })
})
