import { readBytes } from '../data/read-bytes.js'

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
