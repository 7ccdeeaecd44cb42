import { expect, it } from 'vitest'
import { AU, LIGHT_SPEED } from '../../src/units/constants.js'
import { plane, starlight, sumOf } from './pictures.js'
import { runText } from './run-text.js'

/** Pictures of the middle of a layer, a square of such a side (au) on it, for cosines of the angle to its normal. */
const views = (cosines: number[], side: number) =>
  cosines
    .map((mu, i) => {
      const inclination = (Math.acos(mu) * 180) / Math.PI
      return `  - {name: c${i}, view: {inclination: ${inclination} deg, azimuth: 90 deg}, field: [${side} au, ${side * Math.abs(mu)} au], pixels: [3, 3], wavelengths: [1 um]}`
    })
    .join('\n')

/** A layer 2 au thick and 32 au wide about the origin. */
const layer = (
  source: string,
  albedo: number,
  asymmetry: number,
  depth: number,
  cosines: number[],
  side: number,
  packets: number,
  grid: string
) => `
distance: 100 pc
sources: [${source}]
opacities: {dust: {law: power, reference: {wavelength: 1 um, absorption: ${1000 * (1 - albedo)} cm2/g}, slope: 0, scattering: {albedo: ${albedo}, asymmetry: ${asymmetry}}}}
dust: [{name: layer, opacity: dust, shape: {kind: slab, thickness: 2 au, width: 32 au}, amount: {optical-depth: ${depth}, at: 1 um}, temperature: none}]
grid: ${grid}
effort: {precision: none, cameras: ${packets}}
cameras:
${views(cosines, side)}
`

/** Mean scattered intensity over the picture, and its 1 sigma at most. */
async function scattered(text: string) {
  const run = await runText(text)
  return {
    run,
    seen: run.images.map((images) => {
      const values = plane(images, 'scattered')
      return {
        value: sumOf(values) / values.length,
        sigma: sumOf(plane(images, 'sigma')) / values.length
      }
    })
  }
}

/**
 * X and Y functions of Chandrasekhar, Radiative Transfer (1950), chapter VIII, in numbers from his integral equations: intensities over the
 * incident flux pi F for isotropic scattering, optical depth 1, albedo 0.8, mu0 = 0.5, reflected and transmitted.
 */
const beam: [number, number][] = [
  [0.2, 0.2339464],
  [0.5, 0.1747906],
  [1, 0.1175546],
  [-1, 0.09556424],
  [-0.5, 0.1173793],
  [-0.2, 0.10495]
]

it('a plane layer in the light of a far star has the intensities of Chandrasekhar (1950)', async () => {
  const far = 80
  const star = `{name: star, temperature: 5000 K, luminosity: 1000 Lsun, at: [${far * Math.sqrt(0.75)} au, 0 au, ${far * 0.5} au]}`
  const { run, seen } = await scattered(
    layer(
      star,
      0.8,
      0,
      1,
      beam.map(([mu]) => mu),
      10,
      4e6,
      '{kind: octree, width: 160 au, cells-at-most: 1.5e5}'
    )
  )
  const F = starlight(run, 1e-4) / (4 * Math.PI ** 2 * (far * AU) ** 2)
  for (const [i, [, expected]] of beam.entries()) {
    // Within 5 au of the middle the star is farther by 0.2 % at most; cells may get 1 % wrong, and 3 sigma fail once in 60 such tests.
    const error = seen[i].sigma / F / expected
    expect(error).toBeLessThan(0.04)
    expect(Math.abs(seen[i].value / F / expected - 1)).toBeLessThan(0.012 + 3 * error)
  }
})

/**
 * Fractions of the incident light that is reflected and transmitted, by cosine of its angle: what isotropic light from all sides sends
 * back into that direction, over its intensity, by reciprocity. Isotropic scattering, optical depth 1, albedo 0.8: from X and Y functions of
 * Chandrasekhar (1950). Henyey-Greenstein law of asymmetry 0.5, optical depth 0.5, albedo 0.9: by adding and doubling with 40 streams, a
 * method that gives the value of van de Hulst, Multiple Light Scattering (1980), for asymmetry 0.75.
 */
it.each([
  [0.8, 0, 1, { 0.2: 0.419187945 + 0.197774015, 0.5: 0.312702153 + 0.21508901, 1: 0.210846566 + 0.173520155 }],
  [0.9, 0.5, 0.5, { 0.2: 0.366992 + 0.388843, 0.5: 0.182881 + 0.341482, 1: 0.072038 + 0.260672 }]
] as [number, number, number, Record<string, number>][])(
  'a plane layer of albedo %d and asymmetry %d in isotropic light sends back its share',
  async (albedo, asymmetry, depth, shares) => {
    const sky = '{name: sky, kind: ambient, spectrum: {blackbody: 3000 K, dilution: 1e-6}}'
    const cosines = Object.keys(shares).map(Number)
    const { run, seen } = await scattered(
      layer(sky, albedo, asymmetry, depth, cosines, 12, 1.2e6, '{kind: octree, width: 32 au, cells-at-most: 1e5}')
    )
    const intensity = run.model.fields[0].spectrum.intensityNu(LIGHT_SPEED / 1e-4)
    for (const [i, expected] of Object.values(shares).entries()) {
      const error = seen[i].sigma / intensity / expected
      expect(error).toBeLessThan(0.012)
      // Cells may get 1 % wrong; 3 sigma fail by chance once in 100 such tests.
      expect(Math.abs(seen[i].value / intensity / expected - 1)).toBeLessThan(0.01 + 3 * error)
    }
  }
)
