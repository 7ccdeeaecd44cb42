import { describe, expect, it } from 'vitest'
import { sphericalOf } from '../../src/grid/cells.js'
import { SceneError } from '../../src/scene/error.js'
import { SOLAR_RADIUS } from '../../src/units/constants.js'
import { runText } from './run-text.js'

const sceneOf = (shape: string, amount: string, rest = '', sources = '{name: star, temperature: 2500 K, radius: 100 Rsun}') => `
distance: 1 kpc
sources: [${sources}]
opacities:
  grains: {law: table, file: envelope-dust.csv, phase: isotropic}
dust:
  - {name: envelope, opacity: grains, shape: ${shape}, amount: ${amount}}
effort: {precision: 3 %, equilibrium: 4e6}
${rest}
`

/**
 * The spherical dusty envelope of Ivezic et al. (1997, MNRAS 291, 121), as in `dusty-envelope.test.ts`: radii at which the dust has
 * 800 K, in radii of a star of 2500 K, computed apart from this program by moment equations to 2e-4.
 */
describe('an inner radius found from its temperature', () => {
  it.each([
    [0, 1, 8.3446],
    [0, 10, 8.3598],
    [0, 100, 8.4964]
  ])('is that of the dusty envelope: r^-%d, optical depth %d, radius %d within 0.002', async (slope, depth, expected) => {
    const shape = `{kind: shell, inner: {temperature: 800 K}, outer: {times-inner: 1000}, slope: ${-slope}}`
    const { innerRadii, model } = await runText(sceneOf(shape, `{optical-depth: ${depth}, at: 1 um}`))
    const [{ radius, sigma }] = innerRadii!.found
    expect(innerRadii!.settled).toBe(true)
    expect(sigma).toBeLessThan(0.8e-3)
    expect(Math.abs(radius / (100 * SOLAR_RADIUS) / expected - 1)).toBeLessThan(2e-3)
    const edges = model.scene.dust[0].shape
    expect(edges).toMatchObject({ inner: radius, outer: radius * 1000 })
    expect(sphericalOf(model.walls).r[1]).toBe(radius)
  })

  it('is where thin grey dust has it, T = T* (R* / 2 r)^1/2, about two components too', async () => {
    // Grey dust heated by a point: 4 sigma T^4 = L / (4 pi r^2) (Lamers & Cassinelli 1999, eq. 7.34 for s = 0, from memory).
    const text = `
distance: 1 kpc
sources: [{name: star, temperature: 2500 K, radius: 100 Rsun}]
opacities:
  grey: {law: power, reference: {wavelength: 1 um, absorption: 1 cm2/g}, slope: 0}
dust:
  - {name: warm, opacity: grey, shape: {kind: shell, inner: {temperature: 500 K}, outer: 900 au}, amount: {optical-depth: 1e-5, at: 1 um}}
  - name: hot
    opacity: grey
    shape: {kind: disk, inner: {temperature: 900 K}, outer: {times-inner: 50}, scale-height: {value: 1 au, at: 10 au, flaring: 1}}
    amount: {mass: 1e-15 Msun}
grid: {kind: spherical, radial: 40, polar: 16}
effort: {precision: 3 %, equilibrium: 4e6}
`
    const { innerRadii } = await runText(text)
    innerRadii!.found.forEach(({ radius }, i) => {
      const expected = 50 * SOLAR_RADIUS * (2500 / [500, 900][i]) ** 2
      expect(Math.abs(radius / expected - 1), `component ${i}`).toBeLessThan(2e-3)
    })
  })

  it.each([
    ['beyond its outer edge', '{kind: shell, inner: {temperature: 800 K}, outer: 3 au}', '{mass: 1e-9 Msun}', /beyond the outer/],
    [
      'inside the star',
      '{kind: shell, inner: {temperature: 2400 K}, outer: 30 au}',
      '{mass: 1e-15 Msun}',
      /inside a star/,
      '{name: star, temperature: 2500 K, radius: 100 Rsun, extent: sphere}'
    ]
  ] as [string, string, string, RegExp, string?][])(
    'is refused where it stands: %s',
    async (_, shape, amount, message, sources) => {
      const refused = await runText(sceneOf(shape, amount, '', sources)).then(
        () => undefined,
        (error: unknown) => error
      )
      expect(refused).toBeInstanceOf(SceneError)
      const [problem] = (refused as SceneError).problems
      expect(problem).toMatchObject({ key: 'dust.0.shape.inner', location: { line: 7 } })
      expect(problem.message).toMatch(message)
    }
  )
})
