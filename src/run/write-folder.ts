import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { writeAtomic } from '../output/atomic.js'
import { asOutputError } from './output-error.js'
import type { RunFolder } from './run-folder.js'

/** A file of a result: its path in the folder, and how its bytes are made. */
export interface Product {
  file: string
  make: () => Promise<string | Uint8Array> | string | Uint8Array
}

/**
 * Writes all files of a result, the record (of that name; made from the list of files) last. While they are written the record says
 * so and lists old and new files, so that a folder left half-finished is known as one; files of an older result that the new one
 * lacks go at the end. Throws OutputError.
 */
export async function writeFolder<Content extends { state: string }>(
  folder: RunFolder,
  name: string,
  products: Product[],
  record: (files: string[]) => Content
): Promise<Content> {
  const files = [name, ...products.map(({ file }) => file)]
  const write = async (file: string, data: string | Uint8Array) => {
    const path = join(folder.path, file)
    try {
      await writeAtomic(path, data)
    } catch (error) {
      throw asOutputError(path, error)
    }
  }
  const union = [...new Set([...files, ...folder.oldFiles])]
  await write(name, asText({ ...record(union), state: 'writing' }))
  for (const { file, make } of products) await write(file, await make())
  const finished = record(files)
  await write(name, asText(finished))
  for (const file of folder.oldFiles) if (!files.includes(file)) await rm(join(folder.path, file), { force: true })
  return finished
}

function asText(record: object): string {
  return `${JSON.stringify(record, null, 2)}\n`
}
