import { readFileSync } from 'node:fs'
import { DataError } from './error.js'

const reasons: Record<string, string> = {
  ENOENT: 'does not exist',
  ENOTDIR: 'does not exist',
  EISDIR: 'is a folder, not a file',
  EACCES: 'may not be read (permission denied)',
  EPERM: 'may not be read (permission denied)',
  ERR_FS_FILE_TOO_LARGE: 'is too large (2 GB at most)'
}

/** The bytes of a file. Throws a DataError. */
export function readBytes(file: string): Uint8Array {
  try {
    return readFileSync(file)
  } catch (error) {
    const { code = '' } = error as NodeJS.ErrnoException
    throw new DataError(file, reasons[code] ?? `cannot be read (${code || (error as Error).message})`)
  }
}
