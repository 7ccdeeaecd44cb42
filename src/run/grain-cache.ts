import { createHash } from 'node:crypto'
import { mkdir } from 'node:fs/promises'
import { homedir } from 'node:os'
import { dirname, isAbsolute, join } from 'node:path'
import type { GrainOptics } from '../dust/grains/grain-optics.js'
import type { GrainTableRequest } from '../dust/grains/tabulate-grains.js'
import { writeFileAtomic } from '../output/atomic.js'
import { version } from '../output/version.js'
import { readPiece, writePiece } from './state/piece-file.js'

/** To be raised with every change of Mie theory, materials or their tables that changes a number. */
const METHOD = 2

/** The table kept for a request; undefined when there is none, or none that can be used. */
export function keptTable(request: GrainTableRequest): GrainOptics | undefined {
  try {
    return readPiece(fileOf(request)) as unknown as GrainOptics
  } catch {
    // Missing, damaged or not allowed: it is made anew.
    return undefined
  }
}

/** Keeps a table for later runs, if it can. */
export async function keepTable(request: GrainTableRequest, table: GrainOptics): Promise<void> {
  try {
    const path = fileOf(request)
    await mkdir(dirname(path), { recursive: true })
    await writeFileAtomic(path, (file) => writePiece(file, { ...table }))
  } catch {
    // Without it the next run takes longer, no more.
  }
}

/** A file named for all that decides a bit of the table, in the user's folder for caches (XDG Base Directory Specification 0.8). */
function fileOf(request: GrainTableRequest): string {
  const content = JSON.stringify([METHOD, version, request], (key, value) => {
    if (value instanceof Float64Array) return Array.from(value)
    return key === 'file' ? undefined : value
  })
  const given = process.env.XDG_CACHE_HOME ?? ''
  const folder = isAbsolute(given) ? given : join(homedir(), '.cache')
  return join(folder, 'motelight', 'grains', `${createHash('sha256').update(content).digest('hex')}.table`)
}
