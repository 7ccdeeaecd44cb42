import { availableParallelism } from 'node:os'
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

function workerCount(count: number): number {
  if (Number.isInteger(count) && count >= 1 && count <= MOST_WORKERS) return count
  throw new UsageError(`--workers: a whole number from 1 to ${MOST_WORKERS} is expected`)
}
