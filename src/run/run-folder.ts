import { existsSync } from 'node:fs'
import { mkdir, readdir, readFile, rm, rmdir, writeFile } from 'node:fs/promises'
import { dirname, join, resolve, sep } from 'node:path'
import type { InputFile } from './input-files.js'
import { asOutputError, OutputError } from './output-error.js'

/** A folder in which a run may write. */
export interface RunFolder {
  path: string
  /** Files of an older run, relative to the folder, which the new one replaces. */
  oldFiles: string[]
  /** Removes the folders made for this run, as far as they are empty. */
  abandon: () => Promise<void>
}

/**
 * Makes the folder and tries whether it can be written. Throws OutputError when it cannot, when it holds anything and
 * `force` is not set, or when one of the `inputs` lies in it.
 */
export async function openRunFolder(path: string, force: boolean, inputs: InputFile[]): Promise<RunFolder> {
  const input = inputs.find(({ file }) => resolve(file).startsWith(resolve(path) + sep))
  if (input) throw new OutputError(`${input.file} lies in the folder ${path}; choose another with --out`)
  const made: string[] = []
  const abandon = () => removeEmpty(made)
  try {
    await makeFolders(path, made)
    const entries = (await readdir(path)).filter((entry) => !entry.startsWith('.'))
    if (entries.length > 0 && !force) throw new OutputError(refusal(path, entries))
    const probe = join(path, `.${process.pid}.part`)
    await writeFile(probe, '')
    await rm(probe)
    return { path, oldFiles: entries.includes(recordName) ? await filesOf(path) : [], abandon }
  } catch (error) {
    await abandon()
    throw asOutputError(path, error)
  }
}

/** The file that makes a folder a run. */
export const recordName = 'run.json'

function refusal(path: string, entries: string[]): string {
  const content = entries.includes(recordName) ? 'already holds a run' : 'is not empty'
  return `the folder ${path} ${content}; choose another with --out, or replace what is there with --force`
}

/** Files that a run's record lists, as far as they lie in its folder. */
async function filesOf(path: string): Promise<string[]> {
  try {
    const { files } = JSON.parse(await readFile(join(path, recordName), 'utf8')) as { files?: unknown }
    const inside = (file: unknown): file is string =>
      typeof file === 'string' && resolve(path, file).startsWith(resolve(path) + sep)
    return Array.isArray(files) ? files.filter(inside) : []
  } catch (error) {
    if (error instanceof SyntaxError) return []
    throw error
  }
}

/** Makes a folder and those above it, one by one: `mkdir` with `recursive` never returns below /proc (Node 20). */
async function makeFolders(path: string, made: string[]): Promise<void> {
  const missing: string[] = []
  for (let folder = resolve(path); !existsSync(folder); folder = dirname(folder)) missing.push(folder)
  for (const folder of missing.reverse()) {
    await mkdir(folder)
    made.push(folder)
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
