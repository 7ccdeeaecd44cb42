import { chmodSync, readdirSync, readFileSync, statSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { afterEach, beforeEach, describe, expect, it } from 'vitest'
import { tabulateGrains } from '../../src/dust/grains/tabulate-grains.js'
import { grainRequest } from '../../src/dust/grains-law.js'
import { grainTables } from '../../src/run/grain-tables.js'
import { parseScene } from '../../src/scene/read.js'
import type { GrainsOpacitySpec } from '../../src/scene/types.js'
import { sceneWith } from '../cli/motelight.js'
import { folderWith } from '../support/folder-with.js'

const power = `law: power
    reference: {wavelength: 0.55 um, absorption: 1e4 cm2/g}
    slope: 1
    scattering: {albedo: 0.5, asymmetry: 0.3}`
const grains = `law: grains
    constants: {handbook: silicon-carbide}
    sizes: {smallest: 5 nm, largest: 250 nm}
    grain-density: 3.2 g/cm3`
const scene = parseScene(sceneWith([power, grains]), 'scene.yaml')

let cache = ''
const before = process.env.XDG_CACHE_HOME
beforeEach(() => {
  cache = folderWith()
  process.env.XDG_CACHE_HOME = cache
})
afterEach(() => {
  if (before === undefined) delete process.env.XDG_CACHE_HOME
  else process.env.XDG_CACHE_HOME = before
})
const kept = () => readdirSync(join(cache, 'motelight/grains')).map((name) => join(cache, 'motelight/grains', name))

describe('grainTables', () => {
  it('are the same from one thread, from several and from the cache; what is damaged is made anew', async () => {
    const plain = tabulateGrains(grainRequest(scene.opacities.soot as GrainsOpacitySpec))
    const stages: string[] = []
    const { soot } = await grainTables(scene, 2, ({ stage, opacity }) => stages.push(`${stage} ${opacity}`))
    expect(soot).toEqual(plain)
    expect(new Set(stages)).toEqual(new Set(['grains soot']))

    const [file] = kept()
    const made = statSync(file).mtimeMs
    const again: string[] = []
    expect(await grainTables(scene, 1, ({ stage }) => again.push(stage))).toEqual({ soot })
    expect({ again, made: statSync(file).mtimeMs }).toEqual({ again: [], made })

    const bytes = readFileSync(file)
    bytes[bytes.length >> 1] ^= 1
    for (const damaged of [bytes, bytes.subarray(0, 100), '']) {
      writeFileSync(file, damaged)
      expect(await grainTables(scene, 1)).toEqual({ soot })
      expect(statSync(file).size).toBe(bytes.length)
    }
    expect(kept()).toEqual([file])
  })

  it('are kept by content: other grains are another table, other names of files are not', async () => {
    const folder = folderWith()
    const constants = 'wavelength [um],n,k\n0.1,1.6,0.5\n1,1.7,0.03\n10,1.5,0.8\n'
    for (const name of ['a.csv', 'b.csv']) writeFileSync(join(folder, name), constants)
    const withFile = (name: string, density = '3.2') =>
      parseScene(
        sceneWith([power, grains.replace('{handbook: silicon-carbide}', name).replace('3.2', density)]),
        join(folder, 'scene.yaml')
      )
    await grainTables(withFile('a.csv'), 1)
    await grainTables(withFile('b.csv'), 1)
    expect(kept()).toHaveLength(1)
    await grainTables(withFile('a.csv', '3.3'), 1)
    expect(kept()).toHaveLength(2)
  })

  it('do without a cache where it cannot be written', async () => {
    writeFileSync(join(cache, 'motelight'), 'a file in the way')
    chmodSync(cache, 0o500)
    const { soot } = await grainTables(scene, 1)
    expect(soot.wavelengths.length).toBeGreaterThan(200)
  })

  it('are made only for dust that is there', async () => {
    expect(await grainTables(parseScene(sceneWith(), 'scene.yaml'), 1)).toEqual({})
  })
})
