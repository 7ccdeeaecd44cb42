import { setTimeout } from 'node:timers/promises'
import type { SweepFolder } from '../folder/sweep-folder.js'
import { isHopeless, isLive, type QueueEntry, queueOf } from './queue.js'
import { SlurmError } from './slurm-command.js'
import { readSubmissions } from './submission.js'

/** Time between two questions, s: it grows, for the controller has more to do than to answer. */
const [FIRST, LONGEST] = [1, 30]
/** Without an answer for so long, waiting ends, s. */
const PATIENCE = 600

/** Jobs just submitted, or nodes just lost, may look hopeless for a moment; so many looks in a row make it certain. */
const CERTAIN = 3

/**
 * Waits until no job of a sweep can go on: all have ended, or what is left waits for what can never come. What the queue held in
 * the end. Throws SlurmError when Slurm is not there, or does not answer for ten minutes.
 */
export async function waitForJobs(
  folder: SweepFolder,
  onProgress: (queue: QueueEntry[]) => void,
  stop?: AbortSignal
): Promise<QueueEntry[]> {
  let answered = Date.now()
  let hopeless = 0
  for (let pause = FIRST; ; pause = Math.min(LONGEST, 1.3 * pause)) {
    try {
      const queue = await queueOf(readSubmissions(folder))
      answered = Date.now()
      onProgress(queue)
      hopeless = isHopeless(queue) ? hopeless + 1 : 0
      if (stop?.aborted || !queue.some(isLive) || hopeless >= CERTAIN) return queue
    } catch (error) {
      const silent = (Date.now() - answered) / 1000
      if (!(error instanceof SlurmError) || !error.present || silent > PATIENCE) throw error
    }
    await setTimeout(1000 * pause, undefined, stop && { signal: stop }).catch(() => {})
  }
}
