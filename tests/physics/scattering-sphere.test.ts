import { describe, expect, it } from 'vitest'
import { planckNu } from '../../src/dust/planck.js'
import type { RunResult } from '../../src/run/run-result.js'
import { LIGHT_SPEED } from '../../src/units/constants.js'
import { plane, starlight } from './pictures.js'
import { runText } from './run-text.js'

/**
 * A homogeneous sphere that scatters isotropically: optical radius T, albedo w, radius R. The values were computed apart from
 * this program from the integral equation
 *   u(r) = source + (w / 2) int_0^T [E1(|r - t|) - E1(r + t)] u(t) dt,   u = r S,
 * and agreed with Osterbrock's escape formula at w = 0, with a Monte Carlo of 1e6 packets at T = 2, and with the flux integral
 * of the image to 2e-4.
 */
const wavelength = 1e-4
const radius = 1e14

const sceneOf = (depth: number, albedo: number, source: 'star' | 'dust') => `
distance: 100 pc
sources: [${source === 'star' ? '{name: star, temperature: 5000 K, luminosity: 1 Lsun}' : ''}]
opacities:
  grey: ${
    albedo === 1
      ? '{law: table, file: white-dust.csv}'
      : `{law: power, reference: {wavelength: 1 um, absorption: 1 cm2/g}, slope: 0, scattering: {albedo: ${albedo}}}`
  }
dust:
  - name: ball
    opacity: grey
    shape: {kind: ball, radius: ${radius} cm}
    amount: {optical-depth: ${depth}, at: 1 um}
    temperature: ${source === 'star' ? 'none' : '1500 K'}
effort: {precision: none, cameras: 1e5}
spectra:
  - {name: all, wavelengths: [1 um]}
cameras:
  - {name: strip, field: [${2.004 * radius} cm, ${0.004 * radius} cm], pixels: [501, 1], wavelengths: [1 um]}
`

/** 4 pi d2 F over the power emitted, and its error. */
function escaped({ model, spectra }: RunResult, power: number) {
  const sphere = 4 * Math.PI * model.scene.distance ** 2
  return { value: (sphere * spectra[0].total[0]) / power, sigma: (sphere * spectra[0].sigma[0]) / power }
}

interface Central {
  depth: number
  albedo: number
  share: number
  /** 16 pi2 R2 I(b) / L of the scattered light, at b / R = 0.1, 0.3, 0.5, 0.7, 0.9. */
  image?: number[]
}

const fromTheCentre: Central[] = [
  { depth: 1, albedo: 0.2, share: 0.42961337 },
  { depth: 1, albedo: 0.5, share: 0.56083457, image: [5.500047, 1.589041, 0.799786, 0.451587, 0.223624] },
  { depth: 1, albedo: 0.8, share: 0.77327491 },
  { depth: 1, albedo: 0.95, share: 0.93399081 },
  { depth: 1, albedo: 1, share: 1, image: [14.04018, 5.071389, 2.898063, 1.763, 0.895599] },
  { depth: 5, albedo: 0.2, share: 0.01047525 },
  { depth: 5, albedo: 0.5, share: 0.02654148, image: [0.551348, 0.16285, 0.081257, 0.046077, 0.025357] },
  { depth: 5, albedo: 0.8, share: 0.12681984 },
  { depth: 5, albedo: 0.95, share: 0.49890365 },
  { depth: 5, albedo: 1, share: 1, image: [8.233894, 6.247701, 5.009258, 3.840854, 2.499467] }
]

const fromEverywhere = [
  [1, 0.2, 0.58068795],
  [1, 0.5, 0.68661434],
  [1, 0.8, 0.84388859],
  [1, 0.95, 0.95547907],
  [5, 0.2, 0.17281399],
  [5, 0.5, 0.23844151],
  [5, 0.8, 0.41012528],
  [5, 0.95, 0.71234637]
]

/** Allowed beside 4 sigma: a cell holds its scattered light as one mean value. */
const CELLS = 0.002

describe('scattering sphere', () => {
  it.each(fromTheCentre)(
    'optical radius $depth, albedo $albedo: light of a star at the centre',
    async ({ depth, albedo, share, image }) => {
      const run = await runText(sceneOf(depth, albedo, 'star'))
      const { value, sigma } = escaped(run, starlight(run, wavelength))
      expect(Math.abs(value - share)).toBeLessThan(4 * sigma + CELLS * share)
      const scattered = plane(run.images[0], 'scattered')
      const noise = plane(run.images[0], 'sigma')
      const unit = starlight(run, wavelength) / (16 * Math.PI ** 2 * radius ** 2)
      image?.forEach((expected, i) => {
        // Pixels are 0.004 R wide, so the middle of this one is at b / R = 0.1 + 0.2 i.
        const pixel = 250 + 25 + 50 * i
        const apart = Math.abs(scattered[pixel] / unit - expected)
        expect(apart, `image at ${0.1 + 0.2 * i} R`).toBeLessThan((4 * noise[pixel]) / unit + CELLS * expected)
      })
    }
  )

  it.each(fromEverywhere)('optical radius %d, albedo %d: light emitted evenly', async (depth, albedo, share) => {
    const run = await runText(sceneOf(depth, albedo, 'dust'))
    // The optical radius holds absorption and scattering; the emission coefficient is that of absorption alone.
    const absorption = ((1 - albedo) * depth) / radius
    const volume = (4 / 3) * Math.PI * radius ** 3
    const power = 4 * Math.PI * absorption * planckNu(LIGHT_SPEED / wavelength, 1500) * volume
    const { value, sigma } = escaped(run, power)
    expect(Math.abs(value - share)).toBeLessThan(4 * sigma + CELLS * share)
  })
})
