import { readFileSync, statSync } from 'node:fs'

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

/** Reads a text file (UTF-8, at most `limit` bytes); a file that cannot be used gives the reason instead. */
export function readText(file: string, limit: number): { text: string } | { reason: string } {
  const content = readBytes(file, limit)
  return 'reason' in content ? content : decodeText(content.bytes)
}

/** Bytes as text in UTF-8, or the reason why they are none. */
export function decodeText(bytes: Uint8Array): { text: string } | { reason: string } {
  try {
    const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(bytes)
    return text.includes('\0') ? { reason: 'is not a text file' } : { text }
  } catch {
    return { reason: 'is not a text file in UTF-8' }
  }
}

function describe(error: NodeJS.ErrnoException): string {
  if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return 'does not exist'
  if (error.code === 'EACCES' || error.code === 'EPERM') return 'may not be read (permission denied)'
  return `cannot be read (${error.code ?? error.message})`
}
