import { closeSync, existsSync, fsyncSync, mkdirSync, openSync, readdirSync, readFileSync, writeSync } from 'node:fs'
import { hostname } from 'node:os'
import { join } from 'node:path'
import { asOutputError } from '../../run/output-error.js'
import { type ModelResult, orNaN } from './model-result.js'
import type { ResultStore } from './result-store.js'
import type { SweepFolder } from './sweep-folder.js'

/** Models of consecutive numbers whose results are in files of one name. */
export const packSize = 100

/** Told apart from every other process that may write. */
const writer = `${hostname()}-${process.pid}-${Date.now().toString(36)}`

/**
 * Results as lines of JSON, in one file for each hundred of models and process that made any of them. Lines are only added; one
 * cut short by a crash is no result.
 */
export class PackStore implements ResultStore {
  constructor(private readonly folder: SweepFolder) {}

  finished(models: Iterable<number>): Map<number, ModelResult> {
    const wanted = new Set(models)
    const blocks = new Set([...wanted].map(blockOf))
    const found = new Map<number, ModelResult>()
    if (!existsSync(this.folder.packs)) return found
    for (const name of readdirSync(this.folder.packs).sort()) {
      if (!blocks.has(Number(name.split('.')[0]))) continue
      const lines = readFileSync(join(this.folder.packs, name), 'utf8').split('\n')
      // What stands after the last line end is a line cut short.
      for (const line of lines.slice(0, -1)) {
        const result = parseResult(line)
        if (result && wanted.has(result.model) && !found.has(result.model)) found.set(result.model, result)
      }
    }
    return found
  }

  /** Adds a result; it is on the disk when this returns. Throws OutputError. */
  add(result: ModelResult): void {
    const path = join(this.folder.packs, `${blockOf(result.model)}.${writer}.jsonl`)
    try {
      mkdirSync(this.folder.packs, { recursive: true })
      const file = openSync(path, 'a')
      try {
        writeSync(file, `${JSON.stringify(result)}\n`)
        fsyncSync(file)
      } finally {
        closeSync(file)
      }
    } catch (error) {
      throw asOutputError(path, error)
    }
  }
}

function blockOf(model: number): number {
  return Math.floor((model - 1) / packSize)
}

function parseResult(line: string): ModelResult | undefined {
  try {
    const { spectra, images, ...rest } = JSON.parse(line) as ModelResult
    return {
      ...rest,
      spectra: spectra.map((one) => ({ ...one, flux: one.flux.map(orNaN), sigma: one.sigma.map(orNaN) })),
      images: images.map((one) => ({
        ...one,
        fluxJy: one.fluxJy.map(orNaN),
        peak: one.peak.map(orNaN),
        peakSigma: one.peakSigma.map(orNaN)
      }))
    }
  } catch {
    return undefined // A line that a crash or a full disk left incomplete.
  }
}
