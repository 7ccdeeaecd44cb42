import { expect, it } from 'vitest'
import { runText } from './run-text.js'

const head = 'distance: 100 pc\neffort: {precision: none, cameras: 2000}\n'
const seen = `
cameras: [{name: c, view: {inclination: 0 deg}, field: [8 Rsun, 8 Rsun], pixels: 80, wavelengths: [1 um]}]
spectra: [{name: s, view: {inclination: 0 deg}, wavelengths: [1 um]}, {name: back, view: {inclination: 180 deg}, wavelengths: [1 um]}]
`
const two = (x: number, y: number) => `${head}
sources:
  - {name: large, temperature: 5000 K, radius: 2 Rsun, extent: sphere, at: [0 au, 0 au, -1 au]}
  - {name: small, temperature: 8000 K, radius: 1 Rsun, extent: sphere, at: [${x} Rsun, ${y} Rsun, 1 au]}
${seen}`

/** Area that two circles share; MathWorld, "Circle-Circle Intersection", eq. 14 (from memory). */
function lens(d: number, r: number, R: number): number {
  if (d >= r + R) return 0
  if (d <= R - r) return Math.PI * r * r
  const root = Math.sqrt((-d + r + R) * (d + r - R) * (d - r + R) * (d + r + R))
  return (
    r * r * Math.acos((d * d + r * r - R * R) / (2 * d * r)) +
    R * R * Math.acos((d * d + R * R - r * r) / (2 * d * R)) -
    0.5 * root
  )
}

it.each([
  [0, 0],
  [1, 1],
  [-1.5, 1.5],
  [3, 1]
])('a star hides what it covers of another, at (%d, %d)', async (x, y) => {
  const { images, spectra } = await runText(two(x, y))
  const [large, small] = images[0].stars.map(({ flux }) => flux[0])
  // From behind the large star is in front.
  const shared = lens(Math.hypot(x, y), 1, 2) / Math.PI
  const all = spectra.map(({ direct }) => direct[0])
  const alone = await runText(two(20, 0))
  const [largeAlone, smallAlone] = alone.images[0].stars.map(({ flux }) => flux[0])
  expect(Math.abs(small / smallAlone - 1)).toBeLessThan(1e-12)
  // 128 by 128 points on a disk.
  expect(Math.abs(large / largeAlone - (1 - shared / 4))).toBeLessThan(0.01)
  expect(Math.abs((all[1] - largeAlone) / smallAlone - (1 - shared))).toBeLessThan(0.01)
  // The picture holds the same light.
  const pixel = (8 / 80) ** 2
  const sum = images[0].direct.reduce((total, value) => total + value, 0) * pixel
  const bright = alone.images[0].direct.reduce((total, value) => total + value, 0) * pixel
  if (Math.abs(x) < 3) expect(Math.abs(sum / bright / (all[0] / largeAlone) - 1)).toBeLessThan(0.03)
})

it('a cloud dims the star behind it, and not the one before it', async () => {
  const { images } = await runText(`${head}
sources:
  - {name: behind, temperature: 5000 K, luminosity: 1 Lsun, at: [3 au, 4 au, -20 au]}
  - {name: before, temperature: 5000 K, luminosity: 1 Lsun, at: [3 au, 4 au, 20 au]}
  - {name: beside, temperature: 5000 K, luminosity: 1 Lsun, at: [-9 au, 4 au, -20 au]}
opacities: {dark: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 0}}
dust: [{name: cloud, opacity: dark, shape: {kind: ball, radius: 6 au, at: [3 au, 4 au, 3 au]}, amount: {optical-depth: 0.5, at: 1 um}, temperature: none}]
grid: {kind: octree, cells-at-most: 3e4}
cameras: [{name: c, view: {inclination: 0 deg}, field: [40 au, 40 au], pixels: 40, wavelengths: [1 um]}]
`)
  const [behind, before, beside] = images[0].stars.map(({ flux }) => flux[0])
  expect(before).toBeCloseTo(beside, 40)
  // Through the middle of the cloud: twice its radius. The edge cuts cells.
  expect(Math.abs(Math.log(before / behind) - 1)).toBeLessThan(0.01)
  // With azimuth 0 and inclination 0 x points down and y to the right (`viewBasis`): the pixels that meet at the star.
  const lit = [...images[0].direct].flatMap((value, pixel) => (value > 0 ? [pixel] : []))
  expect(new Set(lit.map((pixel) => `${pixel % 40} ${Math.floor(pixel / 40)}`))).toEqual(
    new Set([23, 24].flatMap((column) => [16, 17, 28, 29].map((row) => `${column} ${row}`)))
  )
})
