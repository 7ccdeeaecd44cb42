import { execFileSync } from 'node:child_process'
import { join } from 'node:path'
import type { Times } from './times.js'

/** Runs a yardstick: the name of its C file and its arguments. */
export type Native = (name: string, ...words: (string | number)[]) => Times

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
  return (name, ...words) => {
    const program = join(folder, name)
    if (!made.has(name)) execFileSync(COMPILER, [...FLAGS, '-o', program, join(sources, `${name}.c`), '-lm'])
    made.add(name)
    return JSON.parse(execFileSync(program, words.map(String), { encoding: 'utf8' })) as Times
  }
}
