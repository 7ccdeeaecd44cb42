import { type FileHandle, mkdir, open, rename, rm } from 'node:fs/promises'
import { basename, dirname, join } from 'node:path'

/** Writes data to a file so that it appears under its name only when it is complete; folders are made when missing. */
export async function writeAtomic(path: string, data: string | Uint8Array): Promise<void> {
  await mkdir(dirname(path), { recursive: true })
  await writeFileAtomic(path, (file) => file.writeFile(data))
}

/**
 * Lets `write` fill a file that appears under its name only when it is complete: a temporary file in the same folder, flushed
 * to the disk, then renamed.
 */
export async function writeFileAtomic(path: string, write: (file: FileHandle) => Promise<void>): Promise<void> {
  const temporary = join(dirname(path), `.${basename(path)}.${process.pid}.part`)
  try {
    const file = await open(temporary, 'w')
    try {
      await write(file)
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
