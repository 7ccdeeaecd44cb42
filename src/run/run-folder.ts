import { existsSync, statSync } from 'node:fs'
import { mkdir, readdir, readFile, rm, rmdir, writeFile } from 'node:fs/promises'
import { basename, dirname, join, resolve, sep } from 'node:path'
import type { InputFile } from '../scene/types.js'
import { asOutputError, OutputError } from './output-error.js'

/** A folder in which a run may write. */
export interface RunFolder {
  path: string
  /** Files of an older run, relative to the folder, which the new one replaces. */
  oldFiles: string[]
  /** Removes the folders made for this run, as far as they are empty. */
  abandon: () => Promise<void>
}

/** How a run comes to a folder: it wants one without a run, replaces what is there, or goes on with the run there, if any. */
export type Entry = 'begin' | 'replace' | 'continue'

/** The file that makes a folder a run, and the folder in it where an unfinished run keeps its pieces. */
export const recordName = 'run.json'
export const stateName = 'state'

/**
 * Makes the folder, whose `record` tells what is in it, and tries whether it can be written. Throws OutputError when it cannot, when it holds what the entry does
 * not allow, or when one of the `inputs` lies in it.
 */
export async function openRunFolder(path: string, entry: Entry, inputs: InputFile[], record = recordName): Promise<RunFolder> {
  const input = inputs.find(({ file }) => resolve(file).startsWith(resolve(path) + sep))
  if (input) throw new OutputError(`${input.file} lies in the folder ${path}; choose another with --out`)
  const made: string[] = []
  const abandon = () => removeEmpty(made)
  try {
    await makeFolders(path, made)
    const entries = (await readdir(path)).filter((name) => !name.startsWith('.'))
    const state = entries.includes(stateName)
    if (record !== recordName && (state || entries.includes(recordName)))
      throw new OutputError(`the folder ${path} holds a run; choose another with --out`)
    if (entries.length > 0 && !(entry === 'replace' || (entry === 'continue' && state)))
      throw new OutputError(refusal(path, entries, record))
    const probe = join(path, `.${process.pid}.part`)
    await writeFile(probe, '')
    await rm(probe)
    if (entry === 'replace') await rm(join(path, stateName), { recursive: true, force: true })
    return { path, oldFiles: entries.includes(record) ? await filesOf(path, record) : [], abandon }
  } catch (error) {
    await abandon()
    throw asOutputError(path, error)
  }
}

function refusal(path: string, entries: string[], record: string): string {
  if (entries.includes(stateName))
    return `the folder ${path} holds an unfinished run; go on with it with --resume, choose another with --out, or replace it with --force`
  const content = entries.includes(record) ? `already holds a ${record === recordName ? 'run' : 'result'}` : 'is not empty'
  return `the folder ${path} ${content}; choose another with --out, or replace what is there with --force`
}

/** Files that a run's record lists, as far as they lie in its folder. */
async function filesOf(path: string, record: string): Promise<string[]> {
  try {
    const { files } = JSON.parse(await readFile(join(path, record), 'utf8')) as { files?: unknown }
    const inside = (file: unknown): file is string =>
      typeof file === 'string' && resolve(path, file).startsWith(resolve(path) + sep)
    return Array.isArray(files) ? files.filter(inside) : []
  } catch (error) {
    if (error instanceof SyntaxError) return []
    throw error
  }
}

/** Removes what processes that died while they wrote have left behind. */
export async function sweep(path: string): Promise<void> {
  const files = await readdir(path, { recursive: true })
  for (const file of files) if (/^\.(.+\.)?\d+\.part$/.test(basename(file))) await rm(join(path, file), { force: true })
}

/** Makes a folder and those above it, one by one: `mkdir` with `recursive` never returns below /proc (Node 20). */
async function makeFolders(path: string, made: string[]): Promise<void> {
  const missing: string[] = []
  for (let folder = resolve(path); !existsSync(folder); folder = dirname(folder)) missing.push(folder)
  for (const folder of missing.reverse()) {
    try {
      await mkdir(folder)
      made.push(folder)
    } catch (error) {
      // Another process may have made it meanwhile.
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST' || !statSync(folder).isDirectory()) throw error
    }
  }
}

async function removeEmpty(made: string[]): Promise<void> {
  for (const folder of [...made].reverse()) {
    try {
      await rmdir(folder)
    } catch {
      return // Somebody put a file there meanwhile.
    }
  }
}
