import { Worker } from 'node:worker_threads'
import type { FromWorker, ToWorker } from './messages.js'

/** A task for a worker: the name of its handler and what to hand it. */
export interface Task {
  name: string
  input: unknown
}

/** A worker threw or died while it held a task. */
export class WorkerFailure extends Error {
  override name = 'WorkerFailure'
}

/** Tasks in hand when a run is stopped may take this long to come to their end, s; then they are given up. */
const GRACE = 5

/** Results wait for their turn, so at most this many tasks a worker are begun ahead of the first unfinished one. */
const AHEAD = 4

/**
 * Worker threads that run tasks side by side and hand back the results in the order of the tasks, so that what is made of
 * them depends neither on the number of workers nor on their speed.
 */
export class WorkerPool {
  /** Busy time of all workers so far, s. */
  cpuSeconds = 0
  private readonly workers: Worker[] = []
  private readonly idle: Worker[] = []
  private readonly held = new Map<Worker, number>()
  private failure: Error | undefined
  private job: Job | undefined
  private closing = false
  private serial = 0

  constructor(
    readonly size: number,
    script: URL
  ) {
    for (let i = 0; i < size; i++) {
      const worker = new Worker(script)
      worker.on('message', (message: FromWorker) => this.receive(worker, message))
      worker.on('error', (error) => this.fail(new WorkerFailure(`a worker thread died: ${error.message}`, { cause: error })))
      worker.on('exit', (code) => {
        if (!this.closing) this.fail(new WorkerFailure(`a worker thread ended unexpectedly (code ${code})`))
      })
      this.workers.push(worker)
      this.idle.push(worker)
    }
  }

  /** Gives every worker a value under a key; typed arrays on shared memory are not copied. */
  share(key: string, value: unknown): void {
    for (const worker of this.workers) this.post(worker, { kind: 'share', key, value })
  }

  forget(key: string): void {
    for (const worker of this.workers) this.post(worker, { kind: 'forget', key })
  }

  /**
   * Runs the tasks; `onResult` gets each result in the order of the tasks. When `stop` is aborted, tasks not yet begun are
   * left, and those in hand are finished, or given up with the whole pool if that takes long. Resolves to the number of tasks
   * done; rejects with WorkerFailure.
   */
  run(tasks: Task[], onResult: (output: unknown, index: number) => void, stop?: AbortSignal): Promise<number> {
    if (this.job) throw new Error('the pool runs one list of tasks at a time')
    if (this.failure) return Promise.reject(this.failure)
    return new Promise((resolve, reject) => {
      this.job = { tasks, onResult, stop, resolve, reject, begun: 0, handed: 0, base: this.serial, waiting: new Map() }
      this.serial += tasks.length
      if (stop?.aborted) this.end()
      else stop?.addEventListener('abort', this.end)
      this.feed()
    })
  }

  /** Ends every worker. */
  async close(): Promise<void> {
    this.closing = true
    await Promise.all(this.workers.map((worker) => worker.terminate()))
  }

  /** Waits for what is in hand, no longer than GRACE. */
  private readonly end = () => {
    const job = this.job
    setTimeout(() => {
      if (!job || this.job !== job) return
      this.finish(job, () => job.resolve(job.handed))
      this.failure ??= new WorkerFailure('the pool was stopped')
    }, 1000 * GRACE).unref()
  }

  private finish(job: Job, settle: () => void): void {
    this.job = undefined
    job.stop?.removeEventListener('abort', this.end)
    settle()
  }

  private post(worker: Worker, message: ToWorker): void {
    worker.postMessage(message)
  }

  private feed(): void {
    const job = this.job
    if (!job) return
    while (
      this.idle.length > 0 &&
      job.begun < job.tasks.length &&
      job.begun - job.handed < AHEAD * this.size &&
      !job.stop?.aborted
    ) {
      const worker = this.idle.pop() as Worker
      const { name, input } = job.tasks[job.begun]
      this.held.set(worker, job.begun)
      this.post(worker, { kind: 'task', id: job.base + job.begun, name, input })
      job.begun++
    }
    if (this.held.size === 0 && (job.begun === job.tasks.length || job.stop?.aborted)) {
      this.finish(job, () => job.resolve(job.handed))
    }
  }

  private receive(worker: Worker, message: FromWorker): void {
    if (message.kind === 'ready') return
    this.held.delete(worker)
    this.idle.push(worker)
    const job = this.job
    if (!job) return
    if (message.kind === 'failed') {
      this.fail(new WorkerFailure(`a worker thread failed: ${message.message}`, { cause: message.stack }))
      return
    }
    this.cpuSeconds += message.cpuSeconds
    job.waiting.set(message.id - job.base, message.output)
    try {
      while (job.waiting.has(job.handed)) {
        const output = job.waiting.get(job.handed)
        job.waiting.delete(job.handed)
        job.onResult(output, job.handed++)
      }
    } catch (error) {
      this.fail(error as Error)
      return
    }
    this.feed()
  }

  private fail(error: Error): void {
    this.failure ??= error
    const { job } = this
    if (job) this.finish(job, () => job.reject(error))
  }
}

interface Job {
  tasks: Task[]
  onResult: (output: unknown, index: number) => void
  stop: AbortSignal | undefined
  resolve: (done: number) => void
  reject: (error: Error) => void
  begun: number
  handed: number
  base: number
  waiting: Map<number, unknown>
}
