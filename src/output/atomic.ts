import { mkdir, open, rename, rm } from 'node:fs/promises'
import { basename, dirname, join } from 'node:path'

/**
 * Writes a file so that it appears under its name only when it is complete: a temporary file in the same folder
 * (made when missing), flushed to the disk, then renamed.
 */
export async function writeAtomic(path: string, data: string | Uint8Array): Promise<void> {
  const folder = dirname(path)
  await mkdir(folder, { recursive: true })
  const temporary = join(folder, `.${basename(path)}.${process.pid}.part`)
  try {
    const file = await open(temporary, 'w')
    try {
      await file.writeFile(data)
      await file.sync()
    } finally {
      await file.close()
    }
    await rename(temporary, path)
  } catch (error) {
    await rm(temporary, { force: true })
    throw error
  }
}
