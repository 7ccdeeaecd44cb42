import { createHash } from 'node:crypto'
import { cpSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import type { Estimator } from '../../src/run/estimator.js'
import { type FolderRequest, joinInFolder, runInFolder } from '../../src/run/run-in-folder.js'
import { readScene } from '../../src/scene/read.js'
import { divide, groupOf } from '../../src/solve/batches.js'
import { GROUPS } from '../../src/solve/groups.js'
import { shareOf } from '../../src/solve/share.js'
import { folderWith } from '../support/folder-with.js'
import { smallScenes } from './small-scenes.js'

const folder = folderWith()
const files = ['images/c.fits', 'spectra/s.ecsv', 'dust/cells.fits']

function sceneOf(kind: keyof typeof smallScenes, seed?: string) {
  const file = join(folder, `${kind}.yaml`)
  writeFileSync(file, smallScenes[kind])
  return readScene(file, { ...(seed !== undefined && { seed }) })
}

const newPath = () => join(folderWith(), 'out')

const base = { workers: 1, estimator: 'emissivity' as Estimator, onProgress: () => {}, force: false, resume: false }
const play = (scene: ReturnType<typeof sceneOf>, request: Partial<FolderRequest> & { path: string }) =>
  runInFolder(scene, { ...base, ...request })

function digests(path: string): string[] {
  return files.map((file) =>
    createHash('sha256')
      .update(readFileSync(join(path, file)))
      .digest('hex')
  )
}

describe('batches', () => {
  it.each([
    [1, 0],
    [31, 0],
    [32, 1e3],
    [5000, 1e5],
    [262_144, 1e5],
    [262_145, 1e6],
    [1e6, 1e7],
    [4e6, 1e7],
    [1e12, 0]
  ])('of %d packets among %d cells: as many in each group, in one piece', (packets, cells) => {
    const batches = divide(packets, cells)
    expect(batches.count % GROUPS).toBe(0)
    expect(batches.packets).toBe(Math.max(1, Math.round(packets / batches.count)))
    const groups = Array.from({ length: batches.count }, (_, batch) => groupOf(batch, batches))
    expect(groups).toEqual(Array.from({ length: batches.count }, (_, batch) => Math.floor(batch / (batches.count / GROUPS))))
  })

  it('hold more packets where a tally tells of more cells than half a million', () => {
    expect(divide(4e6, 5e5)).toEqual(divide(4e6, 0))
    expect(divide(4e6, 1e7).packets).toBeGreaterThan(1e5)
    expect(divide(2.5e6, 1e7, 1)).toEqual({ count: GROUPS, packets: 156_250 })
  })

  it.each([1, 2, 5, 16, 31, 32])('fall to %i parts, each once, in equal numbers to one', (parts) => {
    const batches = divide(1000, 0)
    const ranges = Array.from({ length: parts }, (_, part) => shareOf(part, parts, batches))
    expect(ranges[0].from).toBe(0)
    expect(ranges[parts - 1].to).toBe(batches.count)
    for (let i = 1; i < parts; i++) expect(ranges[i].from).toBe(ranges[i - 1].to)
    const sizes = ranges.map(({ from, to }) => to - from)
    expect(Math.max(...sizes) - Math.min(...sizes)).toBeLessThanOrEqual(1)
  })
})

describe('parts', () => {
  it.each<['shell' | 'disk' | 'fitted', Estimator]>([
    ['shell', 'emissivity'],
    ['disk', 'emissivity'],
    ['fitted', 'emissivity'],
    ['shell', 'peel']
  ])('%s, %s: 1/5 to 5/5 joined are the same bits as one run', async (kind, estimator) => {
    const scene = sceneOf(kind)
    const [whole, apart] = [newPath(), newPath()]
    await play(scene, { path: whole, estimator })
    await play(scene, { path: apart, estimator, stage: 'dust' })
    for (const index of [4, 1, 5, 3, 2])
      await play(scene, { path: apart, estimator, part: { index, of: 5 }, workers: 1 + (index % 3) })
    await joinInFolder(scene, { ...base, estimator, path: apart, runFolders: [] })
    expect(digests(apart)).toEqual(digests(whole))
  })

  it('stages one after the other are the same bits as one run', async () => {
    const scene = sceneOf('shell')
    const [whole, apart] = [newPath(), newPath()]
    await play(scene, { path: whole })
    const dust = await play(scene, { path: apart, stage: 'dust' })
    expect(dust).toMatchObject({ kind: 'dust', stage: { equilibrium: { reached: true } } })
    await play(scene, { path: apart, stage: 'cameras' })
    expect(digests(apart)).toEqual(digests(whole))
  })

  it('may lie in several folders; what is missing, double, unfinished, damaged or foreign is named', async () => {
    const scene = sceneOf('shell')
    const whole = newPath()
    await play(scene, { path: whole })
    const [here, there, out] = [newPath(), newPath(), newPath()]
    await play(scene, { path: here, stage: 'dust' })
    cpSync(here, there, { recursive: true })
    const join3 = (seed?: string) => joinInFolder(sceneOf('shell', seed), { ...base, path: out, runFolders: [here, there] })
    await expect(join3()).rejects.toThrow(/there are no parts in /)
    await play(scene, { path: here, part: { index: 1, of: 3 } })
    await expect(join3()).rejects.toThrow(/parts 2\/3, 3\/3 not found/)
    await play(scene, { path: there, part: { index: 2, of: 3 } })
    await play(scene, { path: there, part: { index: 3, of: 3 } })

    const copy = (from: string, to: string, name: string) =>
      cpSync(join(from, 'state', name), join(to, 'state', name), { recursive: true })
    copy(here, there, 'part-1-of-3')
    await expect(join3()).rejects.toThrow(/part 1\/3 is there twice: .* and /)
    rmSync(join(there, 'state/part-1-of-3'), { recursive: true })

    await play(scene, { path: there, part: { index: 1, of: 2 } })
    await expect(join3()).rejects.toThrow(/parts of different divisions: .*part-1-of-3 and .*part-1-of-2/)
    rmSync(join(there, 'state/part-1-of-2'), { recursive: true })

    await expect(join3('other')).rejects.toThrow(/belongs to another run: its seed was "small", now it is "other"/)

    const piece = join(there, 'state/part-3-of-3/light-1.bin')
    const bytes = readFileSync(piece)
    rmSync(piece)
    await expect(join3()).rejects.toThrow(/part 3\/3 in .* is unfinished \(1 of 2 wavelengths\)/)
    bytes[bytes.length >> 1] ^= 4
    writeFileSync(piece, bytes)
    await expect(join3()).rejects.toThrow(/light-1\.bin cannot be used: its checksum/)
    bytes[bytes.length >> 1] ^= 4
    writeFileSync(piece, bytes)

    await join3()
    expect(digests(out)).toEqual(digests(whole))
  })

  it('are refused where they cannot be', async () => {
    const scene = sceneOf('shell')
    const part = { index: 1, of: 3 }
    await expect(play(scene, { path: newPath(), part })).rejects.toThrow(/no dust temperatures; make them with run --stage dust/)
    await expect(play(scene, { path: newPath(), stage: 'cameras' })).rejects.toThrow(/no dust temperatures/)
    await expect(play(scene, { path: newPath(), part: { index: 1, of: 33 } })).rejects.toThrow(
      /33 parts are too many.* 32 batches/
    )
    await expect(play(sceneOf('precise'), { path: newPath(), part })).rejects.toThrow(
      /precise\.yaml:\d+:\d+: effort\.precision: parts need/
    )
    const path = newPath()
    await play(scene, { path, stage: 'dust' })
    await expect(play(sceneOf('shell', 'other'), { path, part })).rejects.toThrow(/dust\.bin belongs to another run: its seed/)
    await play(scene, { path, part })
    await expect(play(scene, { path, part })).rejects.toThrow(/is there already; go on with it with --resume/)
    await play(scene, { path, part, resume: true })
  })
})
