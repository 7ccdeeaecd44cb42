import { readFileSync, writeFileSync } from 'node:fs'

/** Writes lists of numbers one after another as doubles, for a yardstick to read. */
export function writeDoubles(path: string, parts: ArrayLike<number>[]): void {
  const all = new Float64Array(parts.reduce((sum, part) => sum + part.length, 0))
  let at = 0
  for (const part of parts) {
    all.set(part, at)
    at += part.length
  }
  writeFileSync(path, new Uint8Array(all.buffer))
}

/** Doubles that a yardstick wrote. */
export function readDoubles(path: string): Float64Array {
  const bytes = readFileSync(path)
  return new Float64Array(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.length))
}
