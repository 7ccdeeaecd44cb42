import { describe, expect, it } from 'vitest'
import { runText } from './run-text.js'

/**
 * Stars seen through dust on single lines, whose optical depths have closed forms: chords of a uniform ball, and lines from the centre
 * of a disk in which h = 0.1 R. Cells are few: their mean densities miss by 0.6 % to 43 % here.
 */
const head = `
distance: 100 pc
effort: {precision: none, cameras: 200}
opacities: {dark: {law: power, reference: {wavelength: 1 um, absorption: 100 cm2/g}, slope: 0}}
`
const star = (name: string, at: number[]) =>
  `{name: ${name}, temperature: 6000 K, luminosity: 1 Lsun, at: [${at.map((value) => `${value} au`).join(', ')}]}`

/** -ln of what the dust leaves of the light of stars, from spectra with and without it. */
async function depths(
  sources: string,
  dust: string,
  inclinations: number[],
  grid = '{kind: octree, cells-at-most: 3000}'
): Promise<number[]> {
  const spectra = inclinations.map((i) => `{name: s${i}, view: {inclination: ${i} deg}, wavelengths: [1 um]}`).join(', ')
  const seen = async (amount: number) => {
    const result =
      await runText(`${head}grid: ${grid}\nsources: [${sources}]\ndust:\n  - {name: d, opacity: dark, temperature: none, ${dust},
     amount: {optical-depth: ${amount}, at: 1 um}}\nspectra: [${spectra}]`)
    return result.spectra.map(({ direct }) => direct[0])
  }
  const [bare, dimmed] = [await seen(1e-9), await seen(3)]
  return dimmed.map((flux, i) => -Math.log(flux / bare[i]))
}

describe('a star behind dust', () => {
  it.each([0, 5, 12, 19, 19.9])('is dimmed along the chord of a ball %d au from its middle', async (b) => {
    const ball = 'shape: {kind: ball, radius: 20 au, at: [3 au, 4 au, 5 au]}'
    const sources = star('behind', [3 + b, 4, -50])
    const [depth] = await depths(sources, `${ball}`, [0])
    expect(Math.abs(depth / ((3 * 2 * Math.sqrt(400 - b * b)) / 20) - 1)).toBeLessThan(0.005)
  })

  it.each(['{kind: octree, cells-at-most: 3000}', '{kind: spherical, radial: 10, polar: 12}'])(
    'in the middle of a disk is dimmed as at that height, with %s',
    async (grid) => {
      const disk = 'shape: {kind: disk, inner: 5 au, outer: 50 au, scale-height: {value: 10 au, at: 100 au, flaring: 1}}'
      const inclinations = [90, 87, 83, 80]
      const found = await depths(star('inside', [0, 0, 0]), disk, inclinations, grid)
      inclinations.forEach((inclination, k) => {
        const angle = (inclination * Math.PI) / 180
        const expected = (3 * Math.exp(-0.5 / (0.1 * Math.tan(angle)) ** 2)) / Math.sin(angle)
        expect(Math.abs(found[k] / expected - 1)).toBeLessThan(0.005)
      })
    }
  )
})
