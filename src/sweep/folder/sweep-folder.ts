import { createHash } from 'node:crypto'
import { existsSync, mkdirSync, readdirSync, readFileSync } from 'node:fs'
import { join, resolve, sep } from 'node:path'
import { writeAtomic } from '../../output/atomic.js'
import { asOutputError, OutputError } from '../../run/output-error.js'
import { seenAs } from '../data/see-model.js'
import type { Sweep } from '../types.js'
import { isPacked } from './is-packed.js'

/** The file that makes a folder a sweep. */
const sweepName = 'sweep.json'

/** Folders and files of a sweep. All of its state is in them. */
export class SweepFolder {
  constructor(
    readonly path: string,
    readonly sweep: Sweep
  ) {}

  /** Numbers as folders have them, all of the same length. */
  number(model: number): string {
    return String(model).padStart(Math.max(4, String(this.sweep.models.length).length), '0')
  }

  model(model: number): string {
    return join(this.path, 'models', this.number(model))
  }

  /** Where the dust temperatures are that a model leads. */
  dust(lead: number): string {
    return join(this.path, 'dust', this.number(lead))
  }

  failure(model: number): string {
    return join(this.path, 'failures', `${this.number(model)}.json`)
  }

  get packs(): string {
    return join(this.path, 'packs')
  }

  get slurm(): string {
    return join(this.path, 'slurm')
  }
}

/**
 * The folder of a sweep, made when it is not there. Throws OutputError when the path holds something else, another sweep, or
 * cannot be written.
 */
export async function openSweep(path: string, sweep: Sweep): Promise<SweepFolder> {
  const full = resolve(path)
  const inside = [...sweep.inputs.map(({ file }) => file), sweep.sceneFile, sweep.plan].find((file) =>
    resolve(file).startsWith(full + sep)
  )
  if (inside) throw new OutputError(`${inside} lies in the folder ${path}; choose another with --out`)
  try {
    const kept = join(full, sweepName)
    if (existsSync(kept)) {
      const why = difference(JSON.parse(readFileSync(kept, 'utf8')) as Sweep, sweep)
      if (why) throw new OutputError(`the folder ${path} holds another sweep: ${why}; choose another with --out, or remove it`)
    } else {
      mkdirSync(full, { recursive: true })
      if (readdirSync(full).some((name) => !name.startsWith('.')))
        throw new OutputError(`the folder ${path} is not empty; choose another with --out`)
    }
    const text = `${JSON.stringify(sweep)}\n`
    if (!existsSync(kept) || readFileSync(kept, 'utf8') !== text) await writeAtomic(kept, text)
    return new SweepFolder(full, sweep)
  } catch (error) {
    throw asOutputError(path, error)
  }
}

/** The sweep that a folder holds, with nothing but the folder. Throws OutputError when it holds none. */
export function reopenSweep(path: string): SweepFolder {
  try {
    return new SweepFolder(resolve(path), JSON.parse(readFileSync(join(path, sweepName), 'utf8')) as Sweep)
  } catch (error) {
    if ((error as NodeJS.ErrnoException).code === 'ENOENT') throw new OutputError(`the folder ${path} holds no sweep`)
    throw asOutputError(path, error)
  }
}

/** What decides the results of a sweep: its title, the values of the data and how Slurm is asked may change. */
function substance({ version, sceneFile, base, seed, inputs, parameters, models, dataSpectra }: Sweep) {
  return { version, sceneFile, base, seed, inputs, parameters, models, dataSpectra }
}

/** A text of 12 letters that tells sweeps apart. */
export function sweepId(sweep: Sweep): string {
  return createHash('sha256')
    .update(JSON.stringify(substance(sweep)))
    .digest('hex')
    .slice(0, 12)
}

/** What differs between a sweep begun and the one at hand, in words. */
function difference(kept: Sweep, present: Sweep): string | undefined {
  if (kept.version !== present.version) return `it was begun by motelight ${kept.version}, this is ${present.version}`
  const changed = present.inputs.find(({ sha256 }, i) => sha256 !== kept.inputs[i]?.sha256)
  if (changed) return `${changed.file} has changed since`
  if (JSON.stringify([kept.parameters, kept.models]) !== JSON.stringify([present.parameters, present.models]))
    return 'its models had other parameters'
  if (isPacked(present) && seenAs(present) !== seenAs(kept) && seenAs(present))
    return 'its data or instrument were others, and of so many models no images are kept that new ones could be applied to'
  return sweepId(kept) === sweepId(present) ? undefined : 'its base scene, precision, seed or wavelengths of the data were others'
}
