import { describe, expect, it } from 'vitest'
import type { CameraImages } from '../../src/camera/types.js'
import type { RunResult } from '../../src/run/run-result.js'
import { plane, sumOf } from './pictures.js'
import { runText } from './run-text.js'

const n = 9

interface Options {
  phase?: string
  law?: string
  shape?: string
  depth?: number
  inclination?: number
  roll?: number
  packets?: number
}

const shell = '{kind: shell, inner: 10 au, outer: 100 au, slope: -2}'
const disk = '{kind: disk, inner: 10 au, outer: 100 au, scale-height: {value: 10 au, at: 100 au, flaring: 1.2}}'
const circling = '{table: circling.csv}'

const grey = 'law: power, reference: {wavelength: 1 um, absorption: 1 cm2/g}, slope: 0, scattering: {albedo: 0.9}'
/** Grains of 1 nm, which Mie theory makes scatter by the law of Rayleigh. */
const tiny =
  'law: grains, constants: {n: 1.5, k: 0}, sizes: {smallest: 0.9 nm, largest: 1 nm, slope: -3.5}, grain-density: 3 g/cm3'

const sceneOf = ({
  phase = 'rayleigh',
  law = grey,
  shape = disk,
  depth = 5,
  inclination = 60,
  roll = 0,
  packets = 2e4
}: Options) => `
distance: 100 pc
seed: polarised
sources: [{name: star, temperature: 5000 K, luminosity: 100 Lsun}]
opacities:
  dust: {${law}, phase: ${phase}}
dust:
  - {name: dust, opacity: dust, shape: ${shape}, amount: {optical-depth: ${depth}, at: 1 um}, temperature: none}
grid: {kind: spherical, radial: 40${shape === disk ? ', polar: 20' : ''}}
effort: {precision: none, cameras: ${packets}}
cameras:
  - {name: c, view: {inclination: ${inclination} deg, roll: ${roll} deg}, field: 200 au, pixels: ${n}, wavelengths: [1 um]}
spectra:
  - {name: all, view: {inclination: ${inclination} deg, roll: ${roll} deg}, wavelengths: [1 um]}
`

/** Errors come from 16 groups: pulls follow Student's t, and lie beyond 4.5 by chance in less than 1 of 2000 comparisons. */
const SIGMAS = 4.5

const parts = [
  ['q', 'sigmaQ'],
  ['u', 'sigmaU'],
  ['v', 'sigmaV']
] as const

describe('single scattering of a point star in a thin r^-2 shell', () => {
  it.each([
    ['by the law of Rayleigh', { phase: 'rayleigh' }],
    ['by Mie theory for tiny grains', { phase: 'computed', law: tiny }]
  ])('is polarised by its scattering law alone, in closed form: %s', async (_, options) => {
    const { images } = await runText(sceneOf({ ...options, shape: shell, depth: 1e-4, packets: 1000 }))
    const { q, u } = images[0].stokes!
    const scattered = plane(images[0], 'scattered')
    for (const column of [5, 6, 7]) {
      // Pixels on the row through the centre, beyond the inner edge: b is the distance of a point in the pixel.
      let [i, perpendicular] = [0, 0]
      const fine = 200
      for (let k = 0; k < fine * fine; k++) {
        const x = ((column + ((k % fine) + 0.5) / fine) / n - 0.5) * 200
        const y = ((4 + (Math.floor(k / fine) + 0.5) / fine) / n - 0.5) * 200
        const b = Math.hypot(x, y)
        if (b >= 100) continue
        // s = b cot(theta): I ~ int (1 + cos^2) sin^2 dtheta / b^3, Q ~ int sin^4 dtheta / b^3, inside the outer radius.
        const from = Math.asin(b / 100)
        const to = Math.PI - from
        const sin2 = (t: number) => 0.5 * t - 0.25 * Math.sin(2 * t)
        const sin4 = (t: number) => 0.375 * t - 0.25 * Math.sin(2 * t) + Math.sin(4 * t) / 32
        const between = (f: (t: number) => number) => f(to) - f(from)
        i += (2 * between(sin2) - between(sin4)) / b ** 3
        // The electric vector is across the radius, seen as turned by the point's place in the pixel.
        perpendicular += (between(sin4) / b ** 3) * ((x * x - y * y) / (b * b))
      }
      const at = 4 * n + column
      // Cells hold mean densities, which shift the light of all directions much alike.
      expect(Math.abs(q[at] / scattered[at] - perpendicular / i)).toBeLessThan(2e-3)
      expect(Math.abs(u[at])).toBeLessThan(1e-3 * scattered[at])
    }
  })
})

/** Mean square of the pulls of one Stokes parameter between two runs, where the second knows the pixel. */
function pulls(a: CameraImages, b: CameraImages, [part, sigma]: (typeof parts)[number]): { meanSquare: number; count: number } {
  const total = plane(a, 'total')
  let sum = 0
  let count = 0
  for (let i = 0; i < n * n; i++) {
    // Near the edge few packets of peel-off come to a pixel, and their scatter says little.
    const inside = Math.hypot((i % n) - 4, Math.floor(i / n) - 4) < 3.5
    if (!(inside && b.stokes![sigma][i] > 0 && b.sigma[i] < 0.1 * total[i])) continue
    // Beside noise: cells hold mean values, half a per cent of the light.
    const apart = Math.max(0, Math.abs(a.stokes![part][i] - b.stokes![part][i]) - 0.005 * total[i])
    sum += apart ** 2 / (a.stokes![sigma][i] ** 2 + b.stokes![sigma][i] ** 2)
    count++
  }
  return { meanSquare: sum / count, count }
}

describe.each([
  { name: 'shell, Rayleigh', options: { shape: shell, inclination: 30, roll: 20 }, peeled: 4e4, circular: false },
  { name: 'disk, Rayleigh, rolled', options: { roll: 20 }, peeled: 4e4, circular: false },
  { name: 'disk, a law with s34', options: { phase: circling }, peeled: 1e5, circular: true }
])('emissivity and peel-off agree in Q, U and V: $name', ({ options, peeled, circular }) => {
  it('pixel by pixel and in the flux', async () => {
    const ours = await runText(sceneOf(options))
    const theirs = await runText(sceneOf({ ...options, packets: peeled }), { estimator: 'peel' })
    const [a] = ours.images
    const [b] = theirs.images
    for (const part of parts.slice(0, circular ? 3 : 2)) {
      const { meanSquare, count } = pulls(a, b, part)
      expect(count, part[0]).toBeGreaterThanOrEqual(15)
      // The mean of squares of Student's t with 15 degrees of freedom: 15 / 13, variance 2 (15 / 13)^2 14 / 11.
      expect(meanSquare, part[0]).toBeLessThan((15 / 13) * (1 + SIGMAS * Math.sqrt((2 * 14) / 11 / count)))
      // And there is something to agree upon.
      const strongest = Math.max(
        ...Array.from(b.stokes![part[0]], (value, i) => Math.abs(value) / (b.stokes![part[1]][i] || Infinity))
      )
      expect(strongest, part[0]).toBeGreaterThan(10)
    }
    const [f, g] = [ours.spectra[0], theirs.spectra[0]]
    for (const [part, sigma] of parts.slice(0, 2)) {
      const allowed = SIGMAS * Math.hypot(f.stokes![sigma][0], g.stokes![sigma][0]) + 0.002 * f.scattered[0]
      expect(Math.abs(f.stokes![part][0] - g.stokes![part][0])).toBeLessThan(allowed)
    }
  })
})

describe('symmetry of polarised light', () => {
  let upright: RunResult

  it('roll turns Q and U: twice the angle, east of north', async () => {
    upright = await runText(sceneOf({ phase: circling }))
    const rolled = await runText(sceneOf({ phase: circling, roll: 30 }))
    const [{ stokes: s }] = upright.spectra
    const [{ stokes: t, total }] = rolled.spectra
    const [cos, sin] = [Math.cos(Math.PI / 3), Math.sin(Math.PI / 3)]
    expect(Math.abs(t!.q[0] - (s!.q[0] * cos - s!.u[0] * sin))).toBeLessThan(1e-9 * total[0])
    expect(Math.abs(t!.u[0] - (s!.q[0] * sin + s!.u[0] * cos))).toBeLessThan(1e-9 * total[0])
    // More than half a per cent of the light, by far more than its error.
    expect(Math.hypot(t!.q[0], t!.u[0])).toBeGreaterThan(0.005 * total[0])
    expect(t!.sigmaU[0]).toBeLessThan(0.1 * Math.abs(t!.u[0]))
  })

  it('a quarter turn moves pixels and changes the sign of Q and U', async () => {
    const [a] = upright.images
    const [b] = (await runText(sceneOf({ phase: circling, roll: 90 }))).images
    const total = plane(a, 'total')
    for (let row = 0; row < n; row++) {
      for (let column = 0; column < n; column++) {
        // North to east: up goes to the left, right goes up.
        const [from, to] = [row * n + column, column * n + (n - 1 - row)]
        // Where rays at the edge of the light are placed otherwise, all of it may differ.
        const allowed = 0.005 * total[from] + Math.abs(plane(b, 'total')[to] - total[from])
        expect(Math.abs(b.stokes!.q[to] + a.stokes!.q[from])).toBeLessThanOrEqual(allowed)
        expect(Math.abs(b.stokes!.u[to] + a.stokes!.u[from])).toBeLessThanOrEqual(allowed)
        expect(Math.abs(b.stokes!.v[to] - a.stokes!.v[from])).toBeLessThanOrEqual(allowed)
      }
    }
  })

  it('left and right: Q is even, U and V are odd, where both halves are traced', async () => {
    // At 180 deg of roll, unlike at 0, no mirror is used.
    const [{ stokes, ...image }] = (await runText(sceneOf({ phase: circling, roll: 180 }))).images
    const total = plane(image, 'total')
    let strongest = 0
    for (let i = 0; i < n * n; i++) {
      const twin = i - (i % n) + (n - 1 - (i % n))
      // As above: a pixel that holds a corner of the light has its rays elsewhere than its twin.
      const allowed = 0.005 * total[i] + Math.abs(total[twin] - total[i])
      expect(Math.abs(stokes!.q[i] - stokes!.q[twin])).toBeLessThanOrEqual(allowed)
      expect(Math.abs(stokes!.u[i] + stokes!.u[twin])).toBeLessThanOrEqual(allowed)
      expect(Math.abs(stokes!.v[i] + stokes!.v[twin])).toBeLessThanOrEqual(allowed)
      strongest = Math.max(strongest, Math.abs(stokes!.u[i]) / (total[i] || 1))
    }
    expect(strongest).toBeGreaterThan(0.1)
  })

  it('face-on, an unresolved disk has no net polarisation', async () => {
    const { images, spectra } = await runText(sceneOf({ inclination: 0, roll: 10 }))
    const [{ stokes, total, samplingError }] = spectra
    for (const [part, sigma] of parts) {
      expect(Math.abs(stokes![part][0])).toBeLessThan(SIGMAS * stokes![sigma][0] + samplingError[0] * total[0])
      expect(Math.abs(sumOf(images[0].stokes![part]))).toBeLessThan(2e-3 * sumOf(plane(images[0], 'scattered')))
    }
    // Though its pixels are highly polarised.
    expect(images[0].stokes!.sigmaQ[4 * n]).toBeGreaterThan(0)
    expect(Math.abs(images[0].stokes!.q[4 * n])).toBeGreaterThan(0.3 * plane(images[0], 'scattered')[4 * n])
  })
})
