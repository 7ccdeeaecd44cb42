import { createHash } from 'node:crypto'

/** SHA-256 of bytes, or of a text in UTF-8, hexadecimal (FIPS 180-4). */
export function sha256(content: string | Uint8Array): string {
  return createHash('sha256').update(content).digest('hex')
}
