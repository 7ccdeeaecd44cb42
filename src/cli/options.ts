import { availableParallelism } from 'node:os'
import type { InferredOptionTypes } from 'yargs'
import type { Estimator } from '../run/estimator.js'
import type { Part } from '../run/run-part.js'
import { UsageError } from './failure.js'

/** The positional argument of commands that take a scene. */
export const sceneArgument = { describe: 'Scene file (YAML)', type: 'string', demandOption: true } as const

/** Most worker threads that make sense to start. */
const MOST_WORKERS = 512

/** Options of commands that read a scene. */
export const sceneOptions = {
  seed: { describe: 'Seed of the random numbers, instead of that of the scene', type: 'string', requiresArg: true },
  workers: {
    describe: 'Worker threads',
    type: 'number',
    requiresArg: true,
    default: availableParallelism(),
    defaultDescription: 'number of cores',
    coerce: workerCount
  },
  json: { describe: 'Write one JSON document to standard output, and nothing else', type: 'boolean', default: false },
  quiet: { describe: 'Show no progress', type: 'boolean', default: false }
} as const

/** Options of commands that run a scene. */
export const runOptions = {
  out: {
    describe: 'Folder for the results',
    type: 'string',
    requiresArg: true,
    defaultDescription: 'out/<name of the scene file>'
  },
  estimator: {
    describe: 'How scattered light is estimated; peel and exit are slow cross-checks',
    choices: ['emissivity', 'peel', 'exit'] satisfies Estimator[] as Estimator[],
    default: 'emissivity' as Estimator
  },
  memory: {
    describe: 'Most memory that may be used, such as 4GB; a scene that needs more is refused',
    type: 'string',
    requiresArg: true,
    defaultDescription: 'that of the machine',
    coerce: bytesOf
  },
  'cell-edges': {
    describe: 'Show the edges of the cells in the pictures of the dust',
    type: 'boolean',
    default: false
  },
  ...sceneOptions
} as const

export type RunWords = InferredOptionTypes<typeof runOptions>

function workerCount(count: number): number {
  if (Number.isInteger(count) && count >= 1 && count <= MOST_WORKERS) return count
  throw new UsageError(`--workers: a whole number from 1 to ${MOST_WORKERS} is expected`)
}

const SIZES = { MB: 1e6, GB: 1e9, TB: 1e12 }

function bytesOf(text: string): number {
  const [, number, unit] = /^(\d+(?:\.\d+)?) ?(MB|GB|TB)$/.exec(text) ?? []
  if (number !== undefined) return Number(number) * SIZES[unit as keyof typeof SIZES]
  throw new UsageError('--memory: a size such as 500MB, 4GB or 1.5TB is expected')
}

export function partOf(text: string): Part {
  const [, index, of] = /^(\d+)\/(\d+)$/.exec(text)?.map(Number) ?? []
  if (index >= 1 && index <= of) return { index, of }
  throw new UsageError('--part: the number of a part and how many there are, such as 3/16, are expected')
}
