import { createHash } from 'node:crypto'
import { readFileSync } from 'node:fs'
import type { Scene } from '../scene/types.js'

/** A file that a scene was made from. */
export interface InputFile {
  file: string
  /** SHA-256 of its bytes, hexadecimal (FIPS 180-4). */
  sha256: string
}

/** The scene file and every data file it names, each once; throws what the file system throws. */
export function inputFiles(scene: Scene): InputFile[] {
  return inputPaths(scene).map((file) => ({ file, sha256: createHash('sha256').update(readFileSync(file)).digest('hex') }))
}

function inputPaths({ file, sources, opacities }: Scene): string[] {
  const spectra = sources.flatMap(({ spectrum }) => (spectrum.kind === 'table' ? [spectrum.table.file] : []))
  const tables = Object.values(opacities).flatMap((spec) => (spec.law === 'table' ? [spec.table.file] : []))
  return [...new Set([file, ...spectra, ...tables])]
}
