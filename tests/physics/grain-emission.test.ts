import { describe, expect, it } from 'vitest'
import { grainOptics } from '../../src/dust/grains/grain-optics.js'
import { makeGrain } from '../../src/dust/grains/make-grain.js'
import { planckNu } from '../../src/dust/planck.js'
import type { GrainsOpacitySpec } from '../../src/scene/types.js'
import { LIGHT_SPEED, PARSEC, SOLAR_MASS } from '../../src/units/constants.js'
import { runText } from './run-text.js'

const scene = `
distance: 100 pc
opacities:
  rock:
    law: grains
    constants:
      oscillators:
        infinity: 2.6
        terms: [{at: 10 um, strength: 0.8, damping: 0.2}, {at: 19 um, strength: 1.6, damping: 0.35}, {at: 0.2 um, strength: 0.3, damping: 0.4}]
    sizes: {smallest: 5 nm, largest: 250 nm}
    grain-density: 3.3 g/cm3
dust:
  - name: cloud
    opacity: rock
    shape: {kind: ball, radius: 1000 au}
    amount: {mass: 1e-10 Msun}
    temperature: 250 K
effort: {precision: none, cameras: 1000}
spectra:
  - {name: sed, wavelengths: {from: 6 um, to: 40 um, count: 25}, unit: Jy}
`

describe('thin dust of silicate-like grains', () => {
  it('shines as mass x Mie absorption x Planck function over distance squared, with its band near 9 um', async () => {
    // Flux of optically thin dust (Hildebrand 1983, QJRAS 24, 267).
    const { model, spectra } = await runText(scene)
    const spec = model.scene.opacities.rock as GrainsOpacitySpec
    const { wavelengths } = spectra[0].spectrum
    const { absorption } = grainOptics(makeGrain(spec.populations[0]), wavelengths)
    wavelengths.forEach((wavelength, w) => {
      const nu = LIGHT_SPEED / wavelength
      const flux = (1e-10 * SOLAR_MASS * absorption[w] * planckNu(nu, 250)) / (100 * PARSEC) ** 2
      expect(Math.abs(spectra[0].total[w] / flux - 1), `${wavelength * 1e4} um`).toBeLessThan(0.006)
    })
    const at = (um: number) =>
      spectra[0].total[
        wavelengths.reduce(
          (best, value, i) => (Math.abs(value * 1e4 - um) < Math.abs(wavelengths[best] * 1e4 - um) ? i : best),
          0
        )
      ]
    // The resonance of small spheres lies on the blue side of the oscillator (Bohren & Huffman 1983, section 12.1).
    expect(at(9.1)).toBeGreaterThan(5 * at(6.5))
    expect(at(9.1)).toBeGreaterThan(2 * at(13))
  })
})

const scattering = (law: string) => `
distance: 100 pc
seed: same
sources: [{name: star, temperature: 6000 K, luminosity: 1 Lsun}]
opacities: {tiny: {${law}}}
dust:
  - name: shell
    opacity: tiny
    shape: {kind: shell, inner: 10 au, outer: 100 au}
    amount: {optical-depth: 0.5, at: 2 um}
    temperature: none
effort: {precision: none, cameras: 4000}
cameras:
  - {name: face, field: 200 au, pixels: 8, wavelengths: [2 um]}
`

describe('light scattered by grains much smaller than its waves', () => {
  it('is polarised as Rayleigh has it, with the matrix of Mie theory', async () => {
    // Bohren & Huffman (1983), section 5.1: at x = 0.03 both differ by x^2.
    const sizes = 'sizes: {smallest: 9 nm, largest: 10 nm}, grain-density: 1 g/cm3'
    const mie = await runText(scattering(`law: grains, constants: {n: 1.5}, ${sizes}, phase: computed`))
    const rayleigh = await runText(scattering(`law: grains, constants: {n: 1.5}, ${sizes}, phase: rayleigh`))
    const [a, b] = [mie, rayleigh].map(({ images }) => images[0])
    const brightest = (plane: Float64Array) => Math.max(...plane.map(Math.abs))
    expect(brightest(b.stokes!.q)).toBeGreaterThan(0.02 * brightest(b.scattered))
    for (const [mine, exact] of [
      [a.scattered, b.scattered],
      [a.stokes!.q, b.stokes!.q],
      [a.stokes!.u, b.stokes!.u]
    ])
      mine.forEach((value, i) => {
        expect(Math.abs(value - exact[i])).toBeLessThan(0.005 * brightest(exact))
      })
  })
})
