import { OutputError } from '../../run/output-error.js'
import { reopenSweep } from '../folder/sweep-folder.js'
import { attempt, type Outcome } from './attempt.js'
import type { Job } from './job.js'

/** Sent to a player: a job with the threads and memory (bytes) it may take, or the word to end. */
export type ToPlayer = { kind: 'job'; job: Job; workers: number; memory: number } | { kind: 'stop' }

/** Sent by a player: what became of its job; `broken` says why nothing more can be written. */
export type FromPlayer = { outcome: Outcome } | { broken: string }

/** Runs in a process of its own: does one job of a sweep after the other, as its parent says, and ends with it. */
const folder = reopenSweep(process.argv[2])
const controller = new AbortController()

process.on('disconnect', () => process.exit())
// Ctrl-C reaches every process of the terminal; the parent decides.
process.on('SIGINT', () => {})
process.on('SIGTERM', () => controller.abort())
process.on('message', async (message: ToPlayer) => {
  if (message.kind === 'stop') {
    controller.abort()
    return
  }
  const { job, workers, memory } = message
  const options = { workers, memory, onProgress: () => {}, stop: controller.signal }
  try {
    reply({ outcome: await attempt(folder, job, options) })
  } catch (error) {
    if (error instanceof OutputError) reply({ broken: error.message })
    else throw error
  }
})

function reply(message: FromPlayer): void {
  process.send!(message)
}
