import { beforeAll, describe, expect, it } from 'vitest'
import type { CameraImages } from '../../src/camera/types.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

const n = 14

/** Views of a disk of fixed temperature in which light scatters, too. */
const scene = `
distance: 140 pc
sources: [{name: star, temperature: 4500 K, luminosity: 2 Lsun}]
opacities:
  grains: {law: power, reference: {wavelength: 1 um, absorption: 3000 cm2/g}, slope: 1, scattering: {albedo: 0.5, asymmetry: 0.4}}
dust:
  - name: disk
    opacity: grains
    shape: {kind: disk, inner: 5 au, outer: 100 au, scale-height: {value: 8 au, at: 100 au, flaring: 1.2}}
    amount: {optical-depth: 20, at: 1 um}
    temperature: 50 K
effort: {precision: none, cameras: 2e4}
cameras:
${[
  ['upright', 65, 0, 0],
  ['rolled', 65, 0, 90],
  ['slanted', 65, 0, -90],
  ['turned', 65, 130, 0],
  ['below', 115, 0, 0]
]
  .map(
    ([name, inclination, azimuth, roll]) =>
      `  - {name: ${name}, view: {inclination: ${inclination} deg, azimuth: ${azimuth} deg, roll: ${roll} deg}, field: 220 au, pixels: ${n}, wavelengths: [1.6 um, 300 um]}`
  )
  .join('\n')}
`

/** Pixels are divided alike but for their places: rays are placed to a tenth of 1 %, single pixels to three times that. */
const PLACING = 0.003

/** What the dust sends at the first and at the second wavelength; the star would outshine it. */
const PARTS = ['scattered', 'emitted'] as const

type Place = (x: number, y: number) => [number, number]

describe('pictures of a disk', () => {
  const images: Record<string, CameraImages> = {}
  beforeAll(async () => {
    for (const image of (await runText(scene)).images) images[image.camera.name] = image
  })

  /**
   * Largest relative difference between the pixels (x, y) of one picture and those at `place` of another, over the brightest
   * pixels that hold 95 % of the light: those for which accuracy is promised.
   */
  function apart(a: CameraImages, b: CameraImages, place: Place, k: number): number {
    const one = plane(a, PARTS[k], k)
    const other = plane(b, PARTS[k], k)
    const brightest = Array.from(one.keys()).sort((i, j) => one[j] - one[i])
    let held = 0
    let worst = 0
    for (const i of brightest) {
      if (held > 0.95 * sumOf(one)) break
      held += one[i]
      const [u, v] = place(i % n, Math.floor(i / n))
      worst = Math.max(worst, Math.abs(other[v * n + u] / one[i] - 1))
    }
    return worst
  }
  const mirror: Place = (x, y) => [n - 1 - x, y]

  it('are the same left and right', () => {
    for (const name of ['upright', 'below', 'turned']) {
      for (const k of [0, 1]) expect(apart(images[name], images[name], mirror, k), name).toBeLessThan(1e-9)
    }
  })

  it('do not depend on azimuth', () => {
    for (const k of [0, 1]) expect(apart(images.upright, images.turned, (x, y) => [x, y], k)).toBeLessThan(1e-12)
  })

  it('turn north to east (counter-clockwise, east to the left) with a positive roll', () => {
    // A point at (x, y) from the middle goes to (-y, x) when it turns by 90 deg counter-clockwise.
    for (const k of [0, 1]) {
      expect(apart(images.upright, images.rolled, (x, y) => [n - 1 - y, x], k)).toBeLessThan(PLACING)
      expect(apart(images.upright, images.slanted, (x, y) => [y, n - 1 - x], k)).toBeLessThan(PLACING)
    }
    // The test can tell one turn from the other.
    expect(apart(images.upright, images.rolled, (x, y) => [y, n - 1 - x], 0)).toBeGreaterThan(0.05)
  })

  it('are upside down when seen from the other side of the midplane', () => {
    // Thermal emission has no noise here.
    expect(apart(images.upright, images.below, (x, y) => [x, n - 1 - y], 1)).toBeLessThan(PLACING)
  })

  it('are brighter where the near side scatters forward: below the centre at 65 deg', () => {
    const total = plane(images.upright, 'scattered', 0)
    const half = (from: number) => total.subarray(from, from + (n * n) / 2).reduce((sum, value) => sum + value, 0)
    expect(half(0)).toBeGreaterThan(1.1 * half((n * n) / 2))
  })
})
