import { describe, expect, it } from 'vitest'
import { cellRadii } from '../../src/run/dust-cells.js'
import { SOLAR_LUMINOSITY, STEFAN_BOLTZMANN } from '../../src/units/constants.js'
import { askPython, itWith } from '../support/python.js'
import { scipy } from '../support/scipy.js'
import { runText } from './run-text.js'

/** Optical depth of the radius for extinction; little is scattered, so that light scattered twice is 0.1 % or less. */
const DEPTH = 0.5
const ALBEDO = 0.005

const spherical = '{kind: spherical, radial: 70, polar: 60, azimuthal: 60}'
const lengths = (place: number[]) => `[${place.map((value) => `${value} au`).join(', ')}]`
const scene = (at: string, star = '[0 au, 0 au, 0 au]', grid = spherical) => `
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 1 Lsun, at: ${star}}]
opacities: {dark: {law: power, reference: {wavelength: 1 um, absorption: ${1000 * (1 - ALBEDO)} cm2/g}, slope: 0, scattering: {albedo: ${ALBEDO}, asymmetry: 0}}}
dust:
  - {name: ball, opacity: dark, shape: {kind: ball, radius: 10 au, at: ${at}}, amount: {optical-depth: ${DEPTH}, at: 1 um}, temperature: none}
grid: ${grid}
effort: {precision: 1 %, cameras: 4000}
spectra:
  - {name: side, view: {inclination: 70 deg, azimuth: 40 deg}, wavelengths: [1 um]}
  - {name: back, view: {inclination: 130 deg, azimuth: 200 deg}, wavelengths: [1 um]}
`

describe('a uniform ball away from the star, or about it', () => {
  itWith(scipy, 'dims and scatters starlight as an integral by SciPy says', async () => {
    const centres = [
      [16, 8, 12],
      [3, -4, 2]
    ]
    // Scattered and direct light as shares of the luminosity per sr. The scene is turned by the azimuth, so the observer stands at -a.
    const script = `
import numpy as np
def view(i, a):
    i, a = np.radians(i), np.radians(-a)
    return np.array([np.sin(i)*np.cos(a), np.sin(i)*np.sin(a), np.cos(i)])
from scipy.special import roots_legendre
x, w = roots_legendre(40)
def inside(p, u, c, R=10.0):
    # length of the ray from p along u within the ball
    d = p - c
    b = (d*u).sum(-1)
    q = b*b - (d*d).sum(-1) + R*R
    root = np.sqrt(np.maximum(q, 0))
    return np.where(q > 0, np.maximum(0, -b + root) - np.maximum(0, -b - root), 0)
def shares(c, o):
    c = np.array(c, float)
    chi = data['depth']/10.0
    # about the star: directions on the sphere, and the radius between the walls of the ball along each
    away = np.linalg.norm(c)
    axis = c/away
    side = np.cross(axis, [0, 0, 1.0]); side /= np.linalg.norm(side)
    third = np.cross(axis, side)
    edge = np.sqrt(max(0, 1 - (10/away)**2)) if away > 10 else -1.0
    total = 0
    # mu = edge + (1 - edge)(1 - t^2) resolves the limb
    for xt, wt in zip(x, w):
        t = 0.5*(xt + 1)
        mu = edge + (1 - edge)*(1 - t*t)
        for k in range(64):
            phi = 2*np.pi*(k + 0.5)/64
            u = mu*axis + np.sqrt(1 - mu*mu)*(np.cos(phi)*side + np.sin(phi)*third)
            b = c@u
            root = np.sqrt(max(0, b*b - away**2 + 100))
            low, high = max(0, b - root), b + root
            if high <= low: continue
            r = low + 0.5*(x + 1)*(high - low)
            out = inside(r[:, None]*u, o, c)
            f = np.exp(-chi*(r - low) - chi*out)
            total += wt*t*(1 - edge)*(2*np.pi/64)*0.5*(high - low)*(w*f).sum()
    scattered = total*chi*data['albedo']/(4*np.pi)**2
    direct = np.exp(-chi*inside(np.zeros(3), o, c))/(4*np.pi)
    return [float(scattered), float(direct)]
answer = [[shares(c, view(i, a)) for i, a in [(70, 40), (130, 200)]] for c in data['centres']]
`
    const expected = askPython<[number, number][][]>(script, { centres, depth: DEPTH, albedo: ALBEDO })
    for (const [k, centre] of centres.entries()) {
      // About the star, and with the ball at the origin: all moves by the same vector, and nothing else changes.
      const origin = '[0 au, 0 au, 0 au]'
      const away = lengths(centre.map((value) => -value))
      const cubes = scene(origin, away, '{kind: octree, cells-at-most: 4e4}')
      for (const [text, limit] of [[scene(lengths(centre)), 0.02] as const, [cubes, 0.005] as const]) {
        const { spectra } = await runText(text)
        spectra.forEach(({ direct, scattered }, i) => {
          const [scatteredShare, directShare] = expected[k][i]
          // The surface of the ball cuts cells: 1.0 % at most was seen in spherical ones, with 4000 packets and no noise to speak of.
          expect(Math.abs(scattered[0] / direct[0] / (scatteredShare / directShare) - 1)).toBeLessThan(limit)
        })
        const [side, back] = spectra.map(({ direct }) => direct[0])
        expect(Math.abs(side / back / (expected[k][0][1] / expected[k][1][1]) - 1)).toBeLessThan(limit)
      }
    }
  })

  /** Grey dust in the open has T = Tstar sqrt(Rstar / (2 r)) (common practice): one side of the midplane knows nothing of the other. */
  it('is as warm as dust in the open when it is transparent', async () => {
    const run = await runText(`
distance: 100 pc
sources: [{name: star, temperature: 5000 K, luminosity: 1 Lsun}]
opacities: {grey: {law: power, reference: {wavelength: 1 um, absorption: 10 cm2/g}, slope: 0}}
dust: [{name: ball, opacity: grey, shape: {kind: ball, radius: 3 au, at: [2 au, 3 au, 9 au]}, amount: {optical-depth: 1e-5, at: 1 um}}]
grid: {kind: spherical, radial: 12, polar: 16, azimuthal: 12}
effort: {precision: none, equilibrium: 2e5}
`)
    const { model, dust } = run
    const r = cellRadii(model)
    const starRadius = Math.sqrt(SOLAR_LUMINOSITY / (4 * Math.PI * STEFAN_BOLTZMANN * 5000 ** 4))
    let [sum, weights, count] = [0, 0, 0]
    for (let cell = 0; cell < model.cells; cell++) {
      if (!(dust.sigma[cell] > 0)) continue
      const expected = 5000 * Math.sqrt(starRadius / (2 * r[cell]))
      const weight = (expected / dust.sigma[cell]) ** 2
      sum += weight * (dust.temperature[cell] / expected - 1)
      weights += weight
      count++
    }
    expect(count).toBeGreaterThan(50)
    // 4 sigma, which fails by chance once in 16000, and 0.3 % for wavelength bins and the size of cells.
    expect(Math.abs(sum / weights)).toBeLessThan(4 / Math.sqrt(weights) + 0.003)
  })
})
