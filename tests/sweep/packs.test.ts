import { appendFileSync, existsSync, readdirSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { FolderStore } from '../../src/sweep/folder/folder-store.js'
import { mostModelFolders } from '../../src/sweep/folder/is-packed.js'
import type { ModelResult } from '../../src/sweep/folder/model-result.js'
import { openResults } from '../../src/sweep/folder/open-results.js'
import { PackStore } from '../../src/sweep/folder/pack-store.js'
import { openSweep } from '../../src/sweep/folder/sweep-folder.js'
import { runHere } from '../../src/sweep/players/run-here.js'
import { folderWith } from '../support/folder-with.js'
import { planned } from './example.js'

const plan = (count: number) => `vary: {dust.wind.amount.optical-depth: {from: 0.5, to: 2, count: ${count}}}\n`
const options = { workers: 2, onProgress: () => {} }
const comparable = (results: Map<number, ModelResult>) => [...results.values()].map(({ cpuSeconds, ...rest }) => rest)

describe('packed results', () => {
  it('of a large sweep are those that folders would hold, without the folders', async () => {
    const large = planned(plan(mostModelFolders + 1))
    const packed = await openSweep(join(folderWith(), 'out'), large)
    const foldered = await openSweep(join(folderWith(), 'out'), { ...large, models: large.models.slice(0, 2) })
    await runHere(packed, [1, 2], options)
    await runHere(foldered, [1, 2], options)
    expect(openResults(packed)).toBeInstanceOf(PackStore)
    expect(openResults(foldered)).toBeInstanceOf(FolderStore)
    const found = openResults(packed).finished([1, 2, 3])
    expect(new Map([...found].sort()).size).toBe(2)
    const inOrder = new Map([...found].sort(([a], [b]) => a - b))
    expect(comparable(inOrder)).toEqual(comparable(openResults(foldered).finished([1, 2])))
    expect(existsSync(packed.model(1))).toBe(false)
    // One file for each process and hundred models.
    expect(readdirSync(packed.packs).length).toBeLessThanOrEqual(2)
  })

  it('a line cut short is no result, and a model that two made counts once', async () => {
    const folder = await openSweep(join(folderWith(), 'out'), planned(plan(mostModelFolders + 1)))
    const store = new PackStore(folder)
    const result = (model: number, packets: number): ModelResult => ({
      model,
      precise: true,
      spectra: [{ name: 'sed', unit: 'Jy', wavelengthUm: [1], flux: [Number.NaN], sigma: [0.1] }],
      images: [],
      packets,
      warnings: [],
      cpuSeconds: 1
    })
    store.add(result(7, 1))
    store.add(result(7, 1))
    store.add(result(100, 2))
    store.add(result(101, 3))
    const [first] = readdirSync(folder.packs)
    appendFileSync(join(folder.packs, first), '{"model": 9, "precise": tr')
    const found = store.finished([7, 8, 9, 100, 101])
    expect([...found.keys()]).toEqual([7, 100, 101])
    expect(found.get(7)).toEqual(result(7, 1))
    expect(
      readdirSync(folder.packs)
        .map((name) => name.split('.')[0])
        .sort()
    ).toEqual(['0', '1'])
  })
})
