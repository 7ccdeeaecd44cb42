import { readFileSync, statSync } from 'node:fs'
import { DataError } from './error.js'

/** Largest file read at one go, bytes. */
const LARGEST = 2 * 1024 * 1024 * 1024

/** Reads a file of at most `limit` bytes; one that cannot be used gives the reason instead. */
export function readBytes(file: string, limit: number): { bytes: Uint8Array } | { reason: string } {
  try {
    const stat = statSync(file)
    if (stat.isDirectory()) return { reason: 'is a folder, not a file' }
    if (!stat.isFile()) return { reason: 'is not a regular file' }
    if (stat.size > limit) return { reason: `holds ${stat.size} bytes; at most ${limit} are accepted` }
    return { bytes: readFileSync(file) }
  } catch (error) {
    return { reason: describe(error as NodeJS.ErrnoException) }
  }
}

/** The bytes of a file. Throws a DataError. */
export function bytesOf(file: string): Uint8Array {
  const content = readBytes(file, LARGEST)
  if ('reason' in content) throw new DataError(file, content.reason)
  return content.bytes
}

function describe(error: NodeJS.ErrnoException): string {
  if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return 'does not exist'
  if (error.code === 'EACCES' || error.code === 'EPERM') return 'may not be read (permission denied)'
  return `cannot be read (${error.code ?? error.message})`
}
