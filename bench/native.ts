import { execFile, execFileSync } from 'node:child_process'
import { join } from 'node:path'
import { promisify } from 'node:util'
import type { Times } from './times.js'

/** Runs a yardstick: the name of its C file and its arguments. */
export interface Native {
  (name: string, ...words: (string | number)[]): Times
  /** The same, several at a time. */
  start: (name: string, ...words: (string | number)[]) => Promise<Times>
}

const COMPILER = 'gcc'
const FLAGS = ['-O3', '-march=native', '-Wall']

/** Compiles the yardsticks into a folder; undefined where there is no compiler. `sources` is the folder of the C files. */
export function compileNative(sources: string, folder: string): Native | undefined {
  try {
    execFileSync(COMPILER, ['--version'], { stdio: 'ignore' })
  } catch {
    return undefined
  }
  const made = new Set<string>()
  const programOf = (name: string): string => {
    const program = join(folder, name)
    if (!made.has(name)) execFileSync(COMPILER, [...FLAGS, '-o', program, join(sources, `${name}.c`), '-lm'])
    made.add(name)
    return program
  }
  const run = (name: string, ...words: (string | number)[]) =>
    JSON.parse(execFileSync(programOf(name), words.map(String), { encoding: 'utf8' })) as Times
  const start = async (name: string, ...words: (string | number)[]) =>
    JSON.parse((await promisify(execFile)(programOf(name), words.map(String))).stdout) as Times
  return Object.assign(run, { start })
}
