import { mkdirSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { writeAtomic } from '../../src/output/atomic.js'
import { folderWith } from '../support/folder-with.js'

const folder = folderWith()

describe('writeAtomic', () => {
  it('makes the folder, writes, replaces, and leaves nothing else', async () => {
    const path = join(folder, 'images', 'a.bin')
    await writeAtomic(path, 'first')
    await writeAtomic(path, new Uint8Array([1, 2, 3]))
    expect([...readFileSync(path)]).toEqual([1, 2, 3])
    expect(readdirSync(join(folder, 'images'))).toEqual(['a.bin'])
  })

  it('removes its temporary file when it cannot finish', async () => {
    mkdirSync(join(folder, 'taken', 'b.txt', 'inside'), { recursive: true })
    await expect(writeAtomic(join(folder, 'taken', 'b.txt'), 'text')).rejects.toThrow()
    expect(readdirSync(join(folder, 'taken'))).toEqual(['b.txt'])
  })
})
