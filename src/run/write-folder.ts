import { rm } from 'node:fs/promises'
import { join } from 'node:path'
import { writeOutput } from './output-error.js'
import type { RunFolder } from './run-folder.js'

/** A file of a result: its path in the folder, and how its bytes are made. */
export interface Product {
  file: string
  make: () => Promise<string | Uint8Array> | string | Uint8Array
}

/** Those of the products that are data: no pictures, no plots. */
export function dataAmong(products: Product[]): Product[] {
  return products.filter(({ file }) => !/\.(png|svg)$/.test(file))
}

/** The page in the folder of a result. */
export const reportName = 'report.html'

/**
 * Writes all files of a result, the record (of that name; made from the list of files) last. While they are written the record says
 * so and lists old and new files, so that a folder left half-finished is known as one; files of an older result that the new one
 * lacks go at the end. `report` makes the page of a result from the finished record and the files in the folder. Throws OutputError.
 */
export async function writeFolder<Content extends { state: string }>(
  folder: RunFolder,
  name: string,
  products: Product[],
  record: (files: string[]) => Content,
  report?: (record: Content) => string
): Promise<Content> {
  const files = [name, ...products.map(({ file }) => file), ...(report ? [reportName] : [])]
  const write = (file: string, data: string | Uint8Array) => writeOutput(join(folder.path, file), data)
  const union = [...new Set([...files, ...folder.oldFiles])]
  await write(name, asText({ ...record(union), state: 'writing' }))
  for (const { file, make } of products) await write(file, await make())
  const finished = record(files)
  if (report) await write(reportName, report(finished))
  await write(name, asText(finished))
  for (const file of folder.oldFiles) if (!files.includes(file)) await rm(join(folder.path, file), { force: true })
  return finished
}

function asText(record: object): string {
  return `${JSON.stringify(record, null, 2)}\n`
}

/** Writes the page of a finished result anew, and lists it in its record if it was not there. Throws OutputError. */
export async function rewriteReport(path: string, name: string, record: { files: string[] }, page: string): Promise<string> {
  const file = join(path, reportName)
  await writeOutput(file, page)
  if (!record.files.includes(reportName))
    await writeOutput(join(path, name), asText({ ...record, files: [...record.files, reportName] }))
  return file
}
