import { describe, expect, it } from 'vitest'
import { tabulateGrains } from '../../src/dust/grains/tabulate-grains.js'
import { grainRequest } from '../../src/dust/grains-law.js'
import { buildModel, planCells } from '../../src/model/build-model.js'
import { sceneWarnings } from '../../src/run/scene-warnings.js'
import { parseScene } from '../../src/scene/read.js'
import type { GrainsOpacitySpec } from '../../src/scene/types.js'
import { sceneWith } from '../cli/motelight.js'

const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const grains = (sizes: string) => `law: grains
    constants: {n: 1.7, k: 0.1}
    sizes: ${sizes}
    grain-density: 3 g/cm3`

const warningsOf = (...changes: [string, string][]) => sceneWarnings(buildModel(parseScene(sceneWith(...changes), 'scene.yaml')))
const about = (warnings: string[], words: RegExp) => warnings.filter((warning) => words.test(warning))

describe('grains out of equilibrium', () => {
  const tiny: [string, string] = [power, grains('{smallest: 0.5 nm, largest: 10 nm}')]
  const far: [string, string] = ['outer: 1000 au', 'outer: 1e5 au']

  it('are told where single photons heat them above their temperature', () => {
    const [warning, ...others] = about(warningsOf(tiny, far), /one photon/)
    expect(others).toEqual([])
    expect(warning).toMatch(/^dust wind: \d+ % of its mass is in grains below \d[\d.]* nm, which one photon \(1?\d?\.?\d+ eV\)/)
    // mean photon of 3000 K weighted by absorption ~ 1/wavelength: 0.7 to 1.5 eV (2.7 k T = 0.7 eV at constant opacity)
    const energy = Number(/\(([\d.]+) eV\)/.exec(warning)![1])
    expect(energy).toBeGreaterThan(0.7)
    expect(energy).toBeLessThan(1.5)
  })

  it('are told in interstellar light: below about 10 nm, as the literature has it', () => {
    // Draine (2003, ARA&A 41, 241), recalled: steady temperatures need more than about 10 nm
    const dim: [string, string][] = [
      ['    temperature: 3000 K\n    luminosity: 5000 Lsun', '    kind: ambient\n    spectrum: interstellar'],
      [power, grains('{smallest: 5 nm, largest: 250 nm}')]
    ]
    const [warning] = about(warningsOf(...dim), /one photon/)
    const nm = Number(/below ([\d.]+) nm/.exec(warning)?.[1])
    expect(nm).toBeGreaterThan(5)
    expect(nm).toBeLessThan(20)
  })

  it.each([
    ['large grains', [[power, grains('{smallest: 50 nm, largest: 1 um}')], far]],
    ['warm dust', [tiny, ['outer: 1000 au', 'outer: 20 au']]],
    ['dust of a given temperature', [tiny, far, ['    amount:', '    temperature: 30 K\n    amount:']]],
    ['dust that is not made of grains', [far]]
  ] as [string, [string, string][]][])('are not feared with %s', (_, changes) => {
    expect(about(warningsOf(...changes), /one photon/)).toEqual([])
  })
})

describe('rough optics', () => {
  it('are told, with the wavelength where they are worst', () => {
    const scene = parseScene(sceneWith([power, grains('{smallest: 50 nm, largest: 60 nm}')]), 'scene.yaml')
    const optics = tabulateGrains(grainRequest(scene.opacities.soot as GrainsOpacitySpec))
    const warningsWith = (error: Float64Array) =>
      about(sceneWarnings(buildModel(scene, planCells(scene, { soot: { ...optics, error } }))), /integration over sizes/)
    expect(warningsWith(optics.error)).toEqual([])
    const row = optics.wavelengths.findIndex((wavelength) => wavelength > 1e-4)
    expect(warningsWith(optics.error.map((error, w) => (w === row ? 0.031 : error)))).toEqual([
      expect.stringMatching(/^opacity soot: .* error of 3\.1 % at most, near 1(\.\d+)?um/)
    ])
  })
})
