import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import type { InputFile } from '../scene/types.js'

/** Warnings about files that are no longer what was read from them. */
export function changedInputs(inputs: InputFile[]): string[] {
  return inputs
    .filter(({ file, sha256 }) => digestOf(file) !== sha256)
    .map(({ file }) => `${file} has changed since the run began; the results are those of its former content`)
}

function digestOf(file: string): string | undefined {
  try {
    return createHash('sha256').update(readFileSync(file)).digest('hex')
  } catch {
    return undefined
  }
}
