import { describe, expect, it } from 'vitest'
import { sphericalOf } from '../../src/grid/cells.js'
import { cellRadii } from '../../src/run/dust-cells.js'
import { findings } from '../../src/run/findings.js'
import { resultWarnings } from '../../src/run/result-warnings.js'
import { AU, SOLAR_RADIUS } from '../../src/units/constants.js'
import { runText } from './run-text.js'

const starRadius = 100 * SOLAR_RADIUS

const sceneOf = (opacity: string, shape: string, amount: string, effort = '{precision: 3 %, equilibrium: 4e6}') => `
distance: 1 kpc
sources: [{name: star, temperature: 2500 K, radius: 100 Rsun}]
opacities:
  grains: {law: table, file: envelope-dust.csv, phase: isotropic}
  grey: {law: power, reference: {wavelength: 1 um, absorption: 1 cm2/g}, slope: 0}
dust:
  - {name: main, opacity: ${opacity}, shape: ${shape}, amount: ${amount}, sublimation: 800 K}
effort: ${effort}
`

describe('dust that sublimates', () => {
  it('ends where a shell of the same density about the same star begins at that temperature', async () => {
    // Dusty envelope of Ivezic et al. (1997), r^-2 and optical depth 10 from r1 to 1000 r1: 800 K at r1 = 11.2089 R*, as in
    // `dusty-envelope.test.ts`. The density is what the shell has at 5 r1; dust that is there inside r1 has to go.
    const r1 = 11.2089 * starRadius
    // 1000 cm2/g at 1 um.
    const density = 10 / (1000 * r1 * 0.999) / 25
    const shape = `{kind: shell, inner: ${5 * starRadius} cm, outer: ${1000 * r1} cm, slope: -2}`
    const result = await runText(sceneOf('grains', shape, `{density: ${density} g/cm3, at: ${5 * r1} cm}`))
    const [{ radius, temperature }] = result.innerRadii!.found
    expect(temperature).toBe(800)
    expect(Math.abs(radius / r1 - 1)).toBeLessThan(2.5e-3)
    expect(Math.max(...result.dust.temperature)).toBeLessThan(808)
    // Mass ~ r for density r^-2.
    const [dust] = findings(result).dust
    const lost = (r1 - 5 * starRadius) / (1000 * r1 - 5 * starRadius)
    expect(dust.sublimatedMsun! / (dust.massMsun + dust.sublimatedMsun!) / lost).toBeCloseTo(1, 1)
    expect(dust.innerRadius!.au).toBeCloseTo(radius / AU, 10)
  })

  it('leaves alone what is cool enough', async () => {
    const result = await runText(
      sceneOf(
        'grey',
        '{kind: shell, inner: 60 au, outer: 100 au}',
        '{optical-depth: 1, at: 1 um}',
        '{precision: 3 %, equilibrium: 2e5}'
      )
    )
    expect(result.innerRadii!.found).toEqual([])
    expect(result.sublimation!.gone.every((value) => value === 0)).toBe(true)
    expect(findings(result).dust[0].sublimatedMsun).toBe(0)
    expect(resultWarnings(result).filter((text) => text.includes('gone'))).toEqual([])
  })

  it('goes cell by cell from a shape without an inner edge, until none is too hot', async () => {
    const scene = sceneOf(
      'grey',
      '{kind: ball, radius: 9 au}',
      '{optical-depth: 1e-4, at: 1 um}',
      '{precision: 3 %, equilibrium: 3e5}'
    )
    const result = await runText(scene)
    // Thin grey dust has T = T* (R* / 2 r)^1/2 (as in `inner-radius.test.ts`): 800 K at this radius, at most a cell away.
    const front = 50 * SOLAR_RADIUS * (2500 / 800) ** 2
    const { components } = result.model
    const walls = sphericalOf(result.model.walls)
    const first = components[0].density.findIndex((value) => value > 0)
    expect(walls.r[first]).toBeGreaterThan(front * (walls.r[first] / walls.r[first + 1]))
    expect(walls.r[first]).toBeLessThan(front * (walls.r[first + 1] / walls.r[first]))
    expect(result.sublimation!.settled).toBe(true)
    expect(Math.max(...result.dust.temperature)).toBeLessThan(804)
    expect(resultWarnings(result)).toContainEqual(expect.stringMatching(/of its mass would be hotter than 800 K and is gone/))
  })

  it('goes cell by cell from cubes', async () => {
    const scene = sceneOf(
      'grey',
      '{kind: shell, inner: 1 au, outer: 6 au, slope: 0}',
      '{optical-depth: 1e-4, at: 1 um}',
      '{precision: 3 %, equilibrium: 3e5}\ngrid: {kind: octree, cells-at-most: 4000}'
    )
    const { model, sublimation, dust } = await runText(scene)
    // As above: T = T* (R* / 2 r)^1/2, to half the diagonal of a cell.
    const front = 50 * SOLAR_RADIUS * (2500 / 800) ** 2
    const radii = cellRadii(model)
    const { density } = model.components[0]
    density.forEach((value, cell) => {
      const corner = Math.sqrt(0.75) * Math.cbrt(model.volume[cell])
      if (radii[cell] + corner < front) expect(value).toBe(0)
      if (radii[cell] - corner > front && radii[cell] + corner < 6 * AU) expect(value).toBeGreaterThan(0)
    })
    expect(sublimation!.settled).toBe(true)
    expect(Math.max(...dust.temperature)).toBeLessThan(840)
  })

  it('that would vanish altogether is refused', async () => {
    const text = sceneOf('grey', '{kind: shell, inner: 1 au, outer: 2 au}', '{optical-depth: 1e-3, at: 1 um}')
    await expect(runText(text)).rejects.toThrow(/all of the dust would sublimate/)
  })
})
