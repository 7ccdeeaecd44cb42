import { createHash } from 'node:crypto'
import { readFileSync, writeFileSync } from 'node:fs'
import { open } from 'node:fs/promises'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { stream } from '../../src/math/random.js'
import { readPiece, writePiece } from '../../src/run/state/piece-file.js'
import { folderWith } from '../support/folder-with.js'

const path = join(folderWith(), 'piece.bin')
const piece = {
  rounds: [{ packets: 3, error: Number.NaN, change: Number.POSITIVE_INFINITY }],
  done: 2,
  name: 'µm "quoted"',
  flags: [true, null],
  empty: new Float64Array(0),
  nested: { sums: [Float64Array.of(1, -0, Number.NaN, 1e-320, Number.NEGATIVE_INFINITY), Float32Array.of(0.1, -2)] }
}

async function written(value: Record<string, unknown>): Promise<Buffer> {
  const file = await open(path, 'w')
  await writePiece(file, value)
  await file.close()
  return readFileSync(path)
}

const read = (bytes: Uint8Array) => {
  writeFileSync(path, bytes)
  return readPiece(path)
}

describe('a piece on disk', () => {
  it('comes back bit for bit', async () => {
    const back = read(await written(piece)) as typeof piece
    expect(back).toEqual(piece)
    const bits = ({ nested: { sums } }: typeof piece) => sums.map(({ buffer }) => Buffer.from(buffer).toString('hex'))
    expect(bits(back)).toEqual(bits(piece))
  })

  it('ends with the SHA-256 of all before it (FIPS 180-4, by node:crypto)', async () => {
    const bytes = await written(piece)
    const digest = createHash('sha256').update(bytes.subarray(0, -32)).digest()
    expect(bytes.subarray(-32)).toEqual(digest)
  })

  it('larger than a chunk comes back', async () => {
    const values = Float64Array.from({ length: 1_200_000 }, (_, i) => Math.sin(i))
    const back = read(await written({ values })) as { values: Float64Array }
    expect(Buffer.from(back.values.buffer).equals(Buffer.from(values.buffer))).toBe(true)
  })

  it('cut short anywhere is refused', async () => {
    const bytes = await written(piece)
    for (let length = 0; length < bytes.length; length++)
      expect(() => read(bytes.subarray(0, length)), `${length} bytes`).toThrow(/cut short|checksum|not a piece/)
    expect(() => read(Buffer.concat([bytes, Buffer.from('x')]))).toThrow(/checksum/)
  })

  it('with one bit turned in any byte is refused', async () => {
    const bytes = await written(piece)
    for (let i = 0; i < bytes.length; i++) {
      const turned = Buffer.from(bytes)
      turned[i] ^= 1 << ((5 * i) % 8)
      expect(() => read(turned), `byte ${i}`).toThrow(/checksum|not a piece/)
    }
  })

  it('anything else is refused', () => {
    const uniform = stream('noise')
    for (let length = 1; length < 2000; length = Math.ceil(1.3 * length)) {
      const noise = Buffer.from(Array.from({ length }, () => Math.floor(256 * uniform())))
      expect(() => read(noise)).toThrow(/cut short|not a piece/)
    }
  })
})
