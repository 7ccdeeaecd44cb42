import { setFlagsFromString } from 'node:v8'
import { Worker, type WorkerOptions } from 'node:worker_threads'

/**
 * Starts a thread that compiles its own code. Otherwise V8 optimises on threads of its own, and when one of these allocates while
 * its worker is being ended, Node 20 aborts the process (`NodePlatform::ForIsolate`: assertion failed).
 */
export function startThread(script: URL, options?: WorkerOptions): Worker {
  setFlagsFromString('--no-concurrent-recompilation')
  return new Worker(script, options)
}
