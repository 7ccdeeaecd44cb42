import { createHash } from 'node:crypto'

/** SHA-256 of a text in UTF-8, hexadecimal (FIPS 180-4). */
export function sha256(text: string): string {
  return createHash('sha256').update(text).digest('hex')
}
