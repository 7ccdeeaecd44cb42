import { readFileSync, statSync } from 'node:fs'

/** Reads a text file (UTF-8, at most `limit` bytes); a file that cannot be used gives the reason instead. */
export function readText(file: string, limit: number): { text: string } | { reason: string } {
  try {
    const stat = statSync(file)
    if (stat.isDirectory()) return { reason: 'is a folder, not a file' }
    if (!stat.isFile()) return { reason: 'is not a regular file' }
    if (stat.size > limit) return { reason: `holds ${stat.size} bytes; at most ${limit} are accepted` }
    const text = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true }).decode(readFileSync(file))
    return text.includes('\0') ? { reason: 'is not a text file' } : { text }
  } catch (error) {
    return { reason: describe(error as NodeJS.ErrnoException) }
  }
}

function describe(error: NodeJS.ErrnoException): string {
  if (error.code === 'ERR_ENCODING_INVALID_ENCODED_DATA') return 'is not a text file in UTF-8'
  if (error.code === 'ENOENT' || error.code === 'ENOTDIR') return 'does not exist'
  if (error.code === 'EACCES' || error.code === 'EPERM') return 'may not be read (permission denied)'
  return `cannot be read (${error.code ?? error.message})`
}
