import { createHash } from 'node:crypto'
import { closeSync, fstatSync, openSync, readSync } from 'node:fs'
import type { FileHandle } from 'node:fs/promises'
import { endianness } from 'node:os'
import type { Piece } from '../../workers/ledger.js'

/*
 * A piece on disk: MAGIC, the length of the header (uint32, low byte first), the header (JSON, with an entry { array, length } where a typed
 * array stood), the arrays in the order of their entries and in the byte order of the machine, and the SHA-256 (FIPS 180-4) of all that.
 */

const MAGIC = Buffer.from(`motelight piece 1 ${endianness()}\n`)
const START = MAGIC.length + 4
const DIGEST_BYTES = 32
/** Read, written and hashed at a time, bytes. */
const CHUNK = 4 * 1024 * 1024

const KINDS = { Float64Array, Float32Array, Int8Array }
type Kind = keyof typeof KINDS
type Values = Float64Array | Float32Array | Int8Array

/** The file is not a whole piece; the message says how. */
export class BrokenPiece extends Error {
  override name = 'BrokenPiece'
}

/** Writes a piece into an open file, giving way to other work between chunks. */
export async function writePiece(file: FileHandle, piece: Piece): Promise<void> {
  const arrays: Values[] = []
  const header = Buffer.from(JSON.stringify(piece, (_, value) => written(value, arrays)))
  const length = Buffer.alloc(4)
  length.writeUInt32LE(header.length)
  const hash = createHash('sha256')
  for (const { buffer, byteOffset, byteLength } of [MAGIC, length, header, ...arrays]) {
    for (let at = 0; at < byteLength; at += CHUNK) {
      const chunk = new Uint8Array(buffer, byteOffset + at, Math.min(CHUNK, byteLength - at))
      hash.update(chunk)
      await file.writeFile(chunk)
    }
  }
  await file.writeFile(hash.digest())
}

/** Reads a piece. Throws BrokenPiece for anything that `writePiece` did not write to the end, and what the file system throws. */
export function readPiece(path: string): Piece {
  const descriptor = openSync(path, 'r')
  try {
    const { size } = fstatSync(descriptor)
    if (size < START + DIGEST_BYTES) throw new BrokenPiece('it is cut short')
    const start = bytesAt(descriptor, 0, START)
    if (!start.subarray(0, MAGIC.length).equals(MAGIC))
      throw new BrokenPiece('it is not a piece of a run, or not one from this kind of machine')
    if (!digestOf(descriptor, size - DIGEST_BYTES).equals(bytesAt(descriptor, size - DIGEST_BYTES, DIGEST_BYTES)))
      throw new BrokenPiece('its checksum does not fit: it was damaged or cut short')
    const length = start.readUInt32LE(MAGIC.length)
    let at = START + length
    const revive = (_: string, value: unknown) => {
      if (!isEntry(value)) return value
      if ('number' in value) return Number(value.number)
      const array = new KINDS[value.array](value.length)
      const bytes = new Uint8Array(array.buffer)
      fill(descriptor, at, bytes)
      at += bytes.length
      return array
    }
    return JSON.parse(bytesAt(descriptor, START, length).toString(), revive) as Piece
  } finally {
    closeSync(descriptor)
  }
}

type Entry = { array: Kind; length: number } | { number: string }

/** The header's word for a value: JSON knows neither arrays of doubles nor NaN and the infinities. */
function written(value: unknown, arrays: Values[]): unknown {
  if (typeof value === 'number' && !Number.isFinite(value)) return { number: String(value) } satisfies Entry
  if (!(value instanceof Float64Array || value instanceof Float32Array || value instanceof Int8Array)) return value
  arrays.push(value)
  return { array: value.constructor.name as Kind, length: value.length } satisfies Entry
}

function isEntry(value: unknown): value is Entry {
  return typeof value === 'object' && value !== null && ('array' in value || 'number' in value)
}

function digestOf(descriptor: number, size: number): Buffer {
  const hash = createHash('sha256')
  for (let at = 0; at < size; at += CHUNK) hash.update(bytesAt(descriptor, at, Math.min(CHUNK, size - at)))
  return hash.digest()
}

function bytesAt(descriptor: number, at: number, length: number): Buffer {
  const bytes = Buffer.alloc(length)
  fill(descriptor, at, bytes)
  return bytes
}

function fill(descriptor: number, at: number, bytes: Uint8Array): void {
  for (let done = 0; done < bytes.length; ) {
    const count = readSync(descriptor, bytes, done, Math.min(CHUNK, bytes.length - done), at + done)
    if (count === 0) throw new BrokenPiece('it is cut short')
    done += count
  }
}
